# A name that says nothing about its kind.
compile README --time 1
