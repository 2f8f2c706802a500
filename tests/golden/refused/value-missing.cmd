# An option at the end without its value.
compile bell.pauli --time
