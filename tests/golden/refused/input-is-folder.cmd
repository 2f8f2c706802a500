# A folder is no input.
compile . --time 1
