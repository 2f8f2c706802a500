# An option that the verb does not use names those that do.
survey bell.pauli --time 1 --style flat
