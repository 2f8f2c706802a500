# A Pauli sum without a time has nothing to evolve by.
compile bell.pauli
