# A runnable program: reset, preparation, evolution, basis change, measurement.
compile run.xml
