#!/bin/sh
# How the built program behaves towards files, streams, signals and terminals:
# command_line.sh PROGRAM. Exit codes are BSD's sysexits; 128 + signal is the shell's convention.
set -eu
program=$(CDPATH='' cd -- "$(dirname -- "$1")" && pwd)/$(basename -- "$1")
scratch=$(mktemp -d)
trap 'rm -rf "$scratch"' EXIT
cd "$scratch"
unset NO_COLOR
passed=0
failed=0

# check WHAT COMMAND...: the command has to succeed.
check() {
  what=$1
  shift
  if "$@"; then
    passed=$((passed + 1))
  else
    echo "FAILED $what"
    failed=$((failed + 1))
  fi
}

# farrier WORDS...: runs the program; its status goes to $status, its streams to stdout and stderr.
farrier() {
  status=0
  "$program" "$@" >stdout 2>stderr </dev/null || status=$?
}

empty() { [ ! -s "$1" ]; }
filled() { [ -s "$1" ]; }
absent() { [ ! -e "$1" ]; }

cat >pair.pauli <<'END'
1.0 X0 X1
0.5 Z0
0.25 Y1
END
cat >chain.pauli <<'END'
1.0 X0 X1
1.0 Z1 Z2
0.5 Z0
0.3 X2
END
cat >job.xml <<'END'
<job name="pair">
  <hamiltonian><terms file="pair.pauli"/></hamiltonian>
  <evolution time="2"/>
  <budget tolerance="1e-2"/>
</job>
END

# Where things go.
farrier compile pair.pauli --time 1
check 'compile succeeds' [ "$status" -eq 0 ]
check 'the circuit goes to standard output' grep -q '^OPENQASM 3.0;' stdout
check 'the summary goes to standard error' filled stderr
cp stdout circuit.expected
farrier compile pair.pauli --time 1 -q -o circuit.qasm
check 'quiet says nothing' empty stderr
check 'with --output nothing goes to standard output' empty stdout
check 'the file holds the same circuit' cmp circuit.expected circuit.qasm
farrier compile pair.pauli --time 1 -q -o /dev/stdout
check 'a device is written to directly' cmp circuit.expected stdout
check 'no temporary is left' [ "$(find . -name '*circuit*' | wc -l)" -eq 2 ]
farrier compile pair.pauli --time 1 --summary s.xml --log l.xml -o circuit.qasm
check 'the summary is XML' grep -q '<summary ' s.xml
check 'the log is XML' grep -q '<?xml\|<log' l.xml
farrier inspect pair.pauli
check 'facts go to standard output' filled stdout
farrier survey pair.pauli --time 1
check 'a survey goes to standard output' filled stdout

# The same bytes for any thread count, folder and way of writing the options.
for words in '--threads 1' '--threads 2' '--progress never' '--explain' '--skip-check'; do
  # shellcheck disable=SC2086  # words are words
  farrier compile pair.pauli --time 1 $words
  check "$words changes no byte" cmp circuit.expected stdout
done
mkdir elsewhere
(cd elsewhere && "$program" compile ../pair.pauli --time=1.0 -q >../stdout)
check 'the folder changes no byte' cmp circuit.expected stdout
farrier compile pair.pauli --time -1 -q
cp stdout negative.qasm
farrier compile pair.pauli --time=-1 -q
check 'a negative time may stand behind a blank' cmp negative.qasm stdout
"$program" inspect - <pair.pauli >stdout
check 'standard input is read' filled stdout

# The job file and the command line.
farrier compile job.xml --explain
check 'a job brings its time along' [ "$status" -eq 0 ]
farrier compile job.xml --tolerance 1e-3 --explain
check 'the log says what was replaced' grep -q -e '--tolerance 0.001 replaces 0.01' stderr
odd='a $b #c.xml'
cp job.xml "$odd"
farrier compile "$odd" -o 'out file.qasm' --depfile out.d -q
cat >depfile.expected <<'END'
out\ file.qasm: \
  a\ $$b\ \#c.xml \
  pair.pauli
END
check 'the depfile names job and term files' diff depfile.expected out.d

# Links are followed, and what a link points to is replaced whole.
printf 'old' >target.qasm
ln -s target.qasm link.qasm
farrier compile pair.pauli --time 1 -q -o link.qasm
check 'a link stays a link' [ -L link.qasm ]
check 'its target is replaced' cmp circuit.expected target.qasm

# Failures.
printf 'old' >kept.qasm
farrier compile chain.pauli --time 1 --formula strang --steps 1 --tolerance 1e-9 -o kept.qasm
check 'a budget that cannot be met ends with 1' [ "$status" -eq 1 ]
check 'an old file survives a failure' [ "$(cat kept.qasm)" = old ]
if [ -e /dev/full ]; then
  farrier compile pair.pauli --time 1 -o /dev/full
  check 'a full device ends with 74' [ "$status" -eq 74 ]
fi
{ sleep 0.2; farrier_to_pipe=0; "$program" list units 2>stderr || farrier_to_pipe=$?
  echo "$farrier_to_pipe" >pipe_status; } | :
check 'a closed pipe ends with 74' [ "$(cat pipe_status)" -eq 74 ]
farrier compile pair.pauli --time 1 -o no/such/folder.qasm
check 'an output that cannot be created ends with 73' [ "$status" -eq 73 ]
farrier compile missing.pauli --time 1
check 'a missing input ends with 66' [ "$status" -eq 66 ]

# A signal ends the program as the signal would, and leaves nothing behind.
mkfifo input.pauli
"$program" compile input.pauli --time 1 -o never.qasm 2>/dev/null &
pid=$!
sleep 0.3
kill -TERM "$pid"
status=0
wait "$pid" 2>/dev/null || status=$?
check 'a signal ends with 128 and its number' [ "$status" -eq 143 ]
check 'nothing was written' absent never.qasm

# Progress and colour.
farrier compile pair.pauli --time 1 -o circuit.qasm --progress always
check 'progress is shown where it is wanted' grep -q '^farrier: compiling pair$' stderr
farrier compile pair.pauli --time 1 -o circuit.qasm
check 'and not where no terminal is' sh -c '! grep -q "^farrier: compiling" stderr'
escape=$(printf '\033')
farrier compile missing.pauli --time 1
check 'no colour without a terminal' sh -c "! grep -q '$escape' stderr"
if command -v script >/dev/null; then
  TERM=xterm script -qec "'$program' compile missing.pauli --time 1" /dev/null >terminal </dev/null ||
    :
  check 'colour on a terminal' grep -q "$escape" terminal
  NO_COLOR=1 TERM=xterm script -qec "'$program' compile missing.pauli --time 1" /dev/null \
    >terminal </dev/null || :
  check 'no colour with NO_COLOR' sh -c "! grep -q '$escape' terminal"
fi

echo "$passed passed, $failed failed"
[ "$failed" -eq 0 ]
