# A misspelt verb gets the nearest one.
compil bell.pauli --time 1
