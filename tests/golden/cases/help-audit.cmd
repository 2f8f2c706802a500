# The screen of options of audit.
audit --help
