# What inspect says of a small Hamiltonian.
inspect trio.pauli
