# What is not in this version says so.
compile bell.pauli --time 0.5,1
