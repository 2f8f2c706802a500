# A block of two qubits is one exact circuit, global phase included.
compile pair.pauli --time 2
