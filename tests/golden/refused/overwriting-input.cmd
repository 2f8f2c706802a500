# The circuit must not replace its own input.
compile bell.pauli --time 1 -o bell.pauli
