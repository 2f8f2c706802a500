# An input format that is not in this version says so.
compile bell.pauli --time 1 --input-kind fcidump
