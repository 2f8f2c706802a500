# A loop over steps, its first and last layers drawn out of it.
compile trio.pauli --time 1 --formula strang --steps 4 --style looped
