#!/bin/sh
# Other people's projects that use farrier:
#   run.sh find_package|add_subdirectory|build_step SOURCE BUILD SCRATCH FLAGS
# where SOURCE is the repository, BUILD a finished build of it, SCRATCH a folder for this test, and
# FLAGS what the build gave the compiler (a library with sanitizers needs a program with them).
set -eu
consumer=$1
source=$2
build=$3
scratch=$4
flags=$5

rm -rf "$scratch"
mkdir -p "$scratch"
case $consumer in
  find_package)
    cmake --install "$build" --prefix "$scratch/prefix" >"$scratch/install.log"
    cmake -S "$source/tests/packaging/find_package" -B "$scratch/build" \
      -DCMAKE_PREFIX_PATH="$scratch/prefix" -DCMAKE_CXX_FLAGS="$flags"
    cmake --build "$scratch/build"
    "$scratch/build/consumer"
    "$scratch/prefix/bin/farrier" --version
    ;;
  add_subdirectory)
    cmake -S "$source/tests/packaging/add_subdirectory" -B "$scratch/build"
    cmake --build "$scratch/build" --target farrier_base
    cmake --build "$scratch/build" --target help | grep -w consumer
    ;;
  build_step)
    # The circuit follows its term file, and is left alone where nothing has changed.
    cp -R "$source/samples/build-step" "$scratch/source"
    cmake -S "$scratch/source" -B "$scratch/build" -D farrier="$build/farrier"
    cmake --build "$scratch/build"
    cp -p "$scratch/build/calibration.qasm" "$scratch/first.qasm"
    cmake --build "$scratch/build"
    [ -z "$(find "$scratch/build/calibration.qasm" -newer "$scratch/first.qasm")" ]
    sleep 1
    echo '0.5 Y0' >>"$scratch/source/stray-fields.pauli"
    cmake --build "$scratch/build"
    if cmp "$scratch/build/calibration.qasm" "$scratch/first.qasm"; then
      echo "the circuit did not follow its term file" >&2
      exit 1
    fi
    ;;
  *)
    echo "no such consumer: $consumer" >&2
    exit 64
    ;;
esac
rm -rf "$scratch"
