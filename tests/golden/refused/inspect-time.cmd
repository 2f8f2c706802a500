# Facts need no time.
inspect bell.pauli --time 1
