# The table of natives as people see it.
list natives
