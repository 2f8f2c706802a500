# A misspelt option gets the nearest one.
compile bell.pauli --tolerence 1e-3
