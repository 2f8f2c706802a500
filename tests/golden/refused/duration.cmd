# An objective that needs a device says so.
compile bell.pauli --time 1 --minimise duration
