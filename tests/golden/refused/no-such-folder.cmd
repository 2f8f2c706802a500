# A circuit that cannot be created leaves nothing behind.
compile bell.pauli --time 1 -o no-such-folder/circuit.qasm
