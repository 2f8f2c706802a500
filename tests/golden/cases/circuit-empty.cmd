# No time, no gates.
compile trio.pauli --time 0
