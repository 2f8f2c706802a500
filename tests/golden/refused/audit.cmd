# A verb that is not in this version says so.
audit bell.qasm --against bell.pauli
