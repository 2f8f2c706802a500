# An option given twice is no matter of taste.
compile bell.pauli --time 1 --time 2
