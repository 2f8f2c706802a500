# The screen of options of inspect.
inspect --help
