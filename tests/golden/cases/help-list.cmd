# The screen of options of list.
list --help
