#!/bin/sh
# From a fresh checkout on Debian 12 to a first circuit: installs what is missing, builds farrier
# in build/release, compiles the ladder quench, and shows circuit, summary and pass log.
set -eu
CDPATH='' cd -- "$(dirname -- "$0")/.."
# shellcheck source=samples/setup.sh
. samples/setup.sh

need g++ cmake make libboost-program-options-dev libeigen3-dev libpugixml-dev
build_tree build/release -DFARRIER_TESTS=OFF

job=samples/ladder-quench.xml
circuit=build/release/ladder-quench.qasm
echo "\$ farrier compile $job -o $circuit --explain"
build/release/farrier compile "$job" -o "$circuit" --explain
echo
echo "\$ head -n 36 $circuit"
head -n 36 "$circuit"
