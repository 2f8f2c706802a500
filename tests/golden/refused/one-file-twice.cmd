# Two outputs of one name.
compile bell.pauli --time 1 -o same.out --summary ./same.out
