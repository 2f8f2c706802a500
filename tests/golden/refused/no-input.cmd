# A file that does not exist.
compile no-such.pauli --time 1
