# Nothing at all on the command line.

