# The table of shapes as people see it.
list shapes
