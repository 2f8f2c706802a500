# The screen of options of compile.
compile --help
