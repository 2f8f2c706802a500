# The table of formulas as people see it.
list formulas
