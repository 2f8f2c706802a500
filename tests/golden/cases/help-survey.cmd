# The screen of options of survey.
survey --help
