# The verb list alone.
list
