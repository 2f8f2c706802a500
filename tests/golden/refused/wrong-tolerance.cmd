# A tolerance of zero cannot be met.
compile bell.pauli --time 1 --tolerance 0
