// Dependencies as Make and Ninja read them. Escapes: GNU Make manual, sections 3.1.1 and 4.3; the
// whole way through a build is tested in tests/packaging.
#include "compiler/back/depfile.hpp"

#include <doctest/doctest.h>

using farrier::back::depfile;

TEST_CASE("a depfile is one rule with an input a line") {
  CHECK(depfile("a.qasm", {"job.xml", "terms/extra.pauli"}) ==
        "a.qasm: \\\n  job.xml \\\n  terms/extra.pauli\n");
}

TEST_CASE("a circuit without input files has a rule of its own") {
  CHECK(depfile("a.qasm", {}) == "a.qasm:\n");
}

TEST_CASE("blanks and signs that Make knows are escaped in a depfile") {
  CHECK(depfile("two words.qasm", {"a$b.pauli", "#1.pauli"}) ==
        "two\\ words.qasm: \\\n  a$$b.pauli \\\n  \\#1.pauli\n");
}
