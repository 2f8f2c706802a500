# The table of passes as people see it.
list passes
