# A dependency file needs a target.
compile bell.pauli --time 1 --depfile circuit.d
