# A table that does not exist.
list formulae
