#!/bin/sh
# Golden tests of the built program: run.sh PROGRAM [malformed|refused|cases]...
#   malformed/NAME.{pauli,xml}  input that must be refused, compiled with --time 1
#   refused/NAME.cmd            a command line that must be refused
#   cases/NAME.cmd              a command line whose standard output must be as expected
# A .cmd file holds a comment that says what it guards, then the words behind `farrier`, as for a
# shell. Beside each stands NAME.expected: the standard output; for what must be refused, the exit
# status in the first line and then what stands on standard error. Every command runs in the folder
# of its file. With BLESS=1 in the environment the expected files are rewritten.
set -eu
program=$(CDPATH='' cd -- "$(dirname -- "$1")" && pwd)/$(basename -- "$1")
shift
[ $# -gt 0 ] || set -- malformed refused cases
CDPATH='' cd -- "$(dirname -- "$0")"
top=$(pwd)
scratch=$(mktemp -d)
trap 'rm -rf "$scratch"' EXIT
passed=0
failed=0

fail() {
  echo "FAILED $name: $1"
  failed=$((failed + 1))
}

# Compares $scratch/found with an expected file, or blesses it.
compare() {
  if [ "${BLESS:-}" = 1 ]; then
    cp "$scratch/found" "$1"
    passed=$((passed + 1))
  elif [ ! -f "$1" ]; then
    fail "there is no $1; BLESS=1 writes it"
  elif diff -u "$1" "$scratch/found"; then
    passed=$((passed + 1))
  else
    fail "not as expected"
  fi
}

# Runs the program with the words given; standard output and error go to $scratch, and so may -o.
run() {
  status=0
  "$program" "$@" >"$scratch/stdout" 2>"$scratch/stderr" </dev/null || status=$?
}

# What a refused command leaves: status, messages, and nothing else.
check_refused() {
  { echo "$status" && cat "$scratch/stderr"; } >"$scratch/found"
  if [ "$status" -eq 0 ]; then
    fail "was not refused"
  elif [ -s "$scratch/stdout" ]; then
    fail "wrote to standard output"
  elif [ -n "$(ls -A "$scratch/out")" ]; then
    fail "left a file behind"
    rm -rf "$scratch/out"/*
  else
    compare "$1"
  fi
}

malformed() {
  for input in *.pauli *.xml; do
    [ -f "$input" ] || continue
    name=malformed/$input
    run compile "$input" --time 1 -o "$scratch/out/circuit.qasm"
    check_refused "${input%.*}.expected"
  done
}

# The words of a .cmd file may name $out, a folder for what the command writes.
commands() {
  for file in *.cmd; do
    [ -f "$file" ] || continue
    name=$kind/$file
    if ! head -n 1 "$file" | grep -q '^# .'; then
      fail "its first line does not say what it guards"
      continue
    fi
    # shellcheck disable=SC2034  # the words may name it
    out=$scratch/out
    eval "set -- $(sed 1d "$file")"
    run "$@"
    if [ "$kind" = refused ]; then
      check_refused "${file%.cmd}.expected"
    elif [ "$status" -ne 0 ]; then
      fail "exit status $status"
      cat "$scratch/stderr"
    else
      cp "$scratch/stdout" "$scratch/found"
      compare "${file%.cmd}.expected"
    fi
  done
}

mkdir "$scratch/out"
for kind; do
  cd "$top/$kind"
  case $kind in
    malformed) malformed ;;
    *) commands "$kind" ;;
  esac
done
echo "$passed passed, $failed failed"
[ "$failed" -eq 0 ] && [ "$passed" -gt 0 ]
