# What is not in this version says so.
compile bell.pauli --time 1 --device bench.xml
