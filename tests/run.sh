#!/bin/sh
# Builds farrier with its tests in build/tests and runs them. Installs what is missing first.
#   --all    also the tests labelled long
#   --lean   without them (the default)
set -eu
CDPATH='' cd -- "$(dirname -- "$0")/.."
# shellcheck source=samples/setup.sh
. samples/setup.sh

left_out='-LE long'
for argument; do
  case $argument in
    --all) left_out= ;;
    --lean) left_out='-LE long' ;;
    *)
      echo "usage: tests/run.sh [--all | --lean]" >&2
      exit 64
      ;;
  esac
done

need g++ cmake make libboost-program-options-dev libeigen3-dev libpugixml-dev doctest-dev \
  python3-scipy
build_tree build/tests -DFARRIER_TESTS=ON

# The verdict of ctest is repeated as the last line, below its table of labels and times.
cd build/tests
# shellcheck disable=SC2086  # the option is split into two words on purpose
{ ctest --output-on-failure -j "$(nproc)" $left_out 2>&1 && echo passed; } |
  awk '
    { last = $0 }
    last != "passed" { print; fflush() }
    /tests passed/ { verdict = $0 }
    END {
      print (verdict == "" ? "no test was run" : verdict)
      exit last == "passed" && verdict != "" ? 0 : 1
    }'
