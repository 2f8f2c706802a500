# Options are not completed.
compile bell.pauli --time 1 --toler 1e-3
