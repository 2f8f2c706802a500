# The table of units as people see it.
list units
