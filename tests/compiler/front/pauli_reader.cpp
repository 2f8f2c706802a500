// Text Pauli sums: what they mean, and how each kind of mistake is reported.
#include "compiler/front/pauli_reader.hpp"

#include <doctest/doctest.h>

#include <string>

#include "tests/compiler/front/support.hpp"

using namespace farrier;
using namespace farrier::test;

TEST_CASE("the documented example reads as documented") {
  const Job job = pauli(
      "# comment to the end of the line\n"
      "qubits 4            # optional\n"
      " 0.25  X0 X1        # sparse\n"
      "-1.5e-1  ZZIX       # dense\n"
      " 2.0   I            # the constant\n");
  CHECK(job.hamiltonian.qubits == 4);
  CHECK(terms(job) == "0.25 X0 X1; -0.15 Z0 Z1 X3");
  CHECK(job.hamiltonian.sum.constant() == 2.0);
  CHECK(job.warnings.empty());
}

TEST_CASE("the number of qubits is declared dense or one more than the highest index") {
  CHECK(pauli("1 X2 Z0\n").hamiltonian.qubits == 3);
  CHECK(pauli("1 XIII\n").hamiltonian.qubits == 4);
  CHECK(pauli("qubits 9\n1 X2\n").hamiltonian.qubits == 9);
  CHECK(pauli("1 X0 I7\n").hamiltonian.qubits == 8);
  CHECK(pauli("1 X1\n1 IIII\n").hamiltonian.qubits == 4);
  CHECK(pauli("2 I\n").hamiltonian.qubits == 1);
  CHECK(pauli("1 X1073741823\n").hamiltonian.qubits == 1073741824U);
}

TEST_CASE("factors come in any order and identities are ignored") {
  CHECK(terms(pauli("1 Z3 X0 I2 Y1\n")) == "1 X0 Y1 Z3");
  CHECK(terms(pauli("1 X007\n")) == "1 X7");
  CHECK(pauli("qubits 4\n1 IIII\n0.5 I0 I3\n0.25 I\n").hamiltonian.sum.constant() == 1.75);
}

TEST_CASE("repeated terms add up and zero terms vanish") {
  CHECK(terms(pauli("1 X0 X1\n0.5 Z0\n2 X1 X0\n0 Y0\n")) == "3 X0 X1; 0.5 Z0");
  CHECK(terms(pauli("1 XX\n2 X0 X1\n")) == "3 X0 X1");
}

TEST_CASE("layout of lines does not matter") {
  const std::string plain = terms(pauli("1 X0\n2 Z1\n"));
  CHECK(terms(pauli("1 X0\r\n2 Z1\r\n")) == plain);
  CHECK(terms(pauli("1 X0\n2 Z1")) == plain);
  CHECK(terms(pauli("\n\n\t1\tX0  \n   \n# x\n2 Z1# y")) == plain);
  CHECK(terms(pauli("\xef\xbb\xbf"
                    "1 X0\n2 Z1\n")) == plain);
}

TEST_CASE("coefficients may carry a sign an exponent or a vanishing imaginary part") {
  CHECK(terms(pauli("+1.5e+2 X0\n")) == "150 X0");
  CHECK(terms(pauli(".5 X0\n")) == "0.5 X0");
  CHECK(terms(pauli("1+0i X0\n")) == "1 X0");
  CHECK(terms(pauli("-2.5e-1-0.0i X0\n")) == "-0.25 X0");
  CHECK(terms(pauli("3e-1+0e-3i X0\n")) == "0.3 X0");
}

TEST_CASE("each term remembers its first line") {
  const Job job = pauli("# one\n1 Z1\n1 X0\n2 Z1\n");
  REQUIRE(job.hamiltonian.origins.size() == 2);
  CHECK(job.hamiltonian.files == std::vector<std::string>{"input.pauli"});
  CHECK(to_text(job.hamiltonian.sum.factors(0)) == "X0");
  CHECK(job.hamiltonian.origins[0].line == 3);
  CHECK(job.hamiltonian.origins[1].line == 2);
}

TEST_CASE("the digest does not depend on the order of terms or on their spelling") {
  const std::string one = digest(pauli("1 X0 X1\n0.5 Z2\n2 I\n").hamiltonian);
  CHECK(digest(pauli("2 III\n0.5 IIZ\n1 X1 X0\n").hamiltonian) == one);
  CHECK(digest(pauli("5e-1 Z2\n0.5 X0 X1\n2 I\n0.5 X0 X1\n").hamiltonian) == one);
  CHECK(digest(pauli("qubits 4\n1 X0 X1\n0.5 Z2\n2 I\n").hamiltonian) != one);
  CHECK(digest(pauli("1 X0 X1\n0.5 Z2\n").hamiltonian) != one);
}

TEST_CASE("a sum that cancels to nothing is the identity with a warning") {
  for (const char* text : {"1 X0\n-1 X0\n", "0 Z1\n", "0 I\n", "1 X0\n-1 X0\n3 I\n"}) {
    const Job job = pauli(text);
    CHECK(job.hamiltonian.sum.empty());
    REQUIRE(job.warnings.size() == 1);
    CHECK(job.warnings[0].severity == Severity::warning);
    CHECK(job.warnings[0].file == "input.pauli");
    CHECK(job.warnings[0].message == "the terms cancel to nothing; the evolution is the identity");
  }
  CHECK(pauli("2 I\n").warnings.empty());
}

TEST_CASE("mistakes in text Pauli sums are shown where they stand") {
  const struct {
    const char* text;
    const char* expected;
  } cases[] = {
      {"", "65 1:1: error: no term; expected a coefficient and a Pauli string"},
      {"# only\n", "65 2:1: error: no term; expected a coefficient and a Pauli string"},
      {"1\n",
       "65 1:2: error: no Pauli string; expected words such as X0 X1, or one word such as ZZIX"},
      {"1 # X0\n",
       "65 1:2: error: no Pauli string; expected words such as X0 X1, or one word such as ZZIX"},
      {"1 X0\n 1 X1 Z2 X1 Z2\n",
       "65 2:10: error: qubit 1 is named twice in one term; expected each qubit once"},
      {"1 X3 I3\n", "65 1:6: error: qubit 3 is named twice in one term; expected each qubit once"},
      {"qubits 2\n1 X2\n",
       "65 2:3: error: qubit index 2 is out of range; expected 0 to 1 for 2 "
       "qubits"},
      {"qubits 1\n1 X0 I1\n",
       "65 2:6: error: qubit index 1 is out of range; expected 0 for 1 qubit"},
      {"1 X1073741824\n",
       "65 1:3: error: the qubit index in 'X1073741824' is too large; expected at most 1073741823"},
      {"1 X-1\n",
       "65 1:3: error: bad qubit index in 'X-1'; expected a letter and a decimal index, "
       "such as X0"},
      {"1 X0x\n",
       "65 1:3: error: bad qubit index in 'X0x'; expected a letter and a decimal index, "
       "such as X0"},
      {"1 X0 Z\n",
       "65 1:6: error: bad qubit index in 'Z'; expected a letter and a decimal index, "
       "such as X0"},
      {"1 x0\n", "65 1:3: error: lower-case letter in 'x0'; expected 'X0'"},
      {"1 ZiX\n", "65 1:4: error: lower-case letter in 'ZiX'; expected 'ZIX'"},
      {"1 ZQX\n", "65 1:4: error: unknown Pauli letter in 'ZQX'; expected I, X, Y or Z"},
      {"1 0X\n", "65 1:3: error: unknown Pauli letter in '0X'; expected I, X, Y or Z"},
      {"1 X 0\n",
       "65 1:5: error: '0' after the dense word 'X'; expected one dense word, or "
       "letters with indices such as X0"},
      {"qubits 3\n1 ZZ\n",
       "65 2:3: error: dense word of 2 letters for 3 qubits; expected 3 "
       "letters"},
      {"1 ZZ\n1 XXX\n",
       "65 2:3: error: dense word of 3 letters after one of 2; expected 2 "
       "letters"},
      {"1 Z4\n1 XXX\n",
       "65 2:3: error: dense word of 3 letters, but an earlier term names qubit "
       "4; expected 5 letters or more"},
      {"1 XXX\n1 Z3\n",
       "65 2:3: error: qubit index 3 is out of range; expected 0 to 2 for 3 qubits"},
      {"X0 X1\n",
       "65 1:1: error: bad coefficient 'X0'; expected a number in the range of double "
       "precision, such as -0.25"},
      {"1,5 X0\n",
       "65 1:1: error: bad coefficient '1,5'; expected a number in the range of double "
       "precision, such as -0.25"},
      {"0.5X0\n",
       "65 1:1: error: bad coefficient '0.5X0'; expected a number in the range of "
       "double precision, such as -0.25"},
      {"NaN X0\n", "65 1:1: error: the coefficient 'NaN' is not finite; expected a number"},
      {"-Infinity X0\n",
       "65 1:1: error: the coefficient '-Infinity' is not finite; expected a number"},
      {"1e999 X0\n",
       "65 1:1: error: bad coefficient '1e999'; expected a number in the range of "
       "double precision, such as -0.25"},
      {"1+2i X0\n",
       "65 1:1: error: the coefficient '1+2i' has an imaginary part, so the operator "
       "would not be Hermitian; expected a real number"},
      {"-i X0\n",
       "65 1:1: error: the coefficient '-i' has an imaginary part, so the operator "
       "would not be Hermitian; expected a real number"},
      {"qubits\n1 X0\n", "65 1:7: error: no number after 'qubits'; expected 'qubits 4'"},
      {"qubits 0\n1 X0\n", "65 1:8: error: bad number of qubits '0'; expected 1 to 1073741824"},
      {"qubits -4\n1 X0\n", "65 1:8: error: bad number of qubits '-4'; expected 1 to 1073741824"},
      {"qubits 4 5\n1 X0\n",
       "65 1:10: error: '5' after the number of qubits; expected the end of the line"},
      {"qubits 4\nqubits 4\n", "65 2:1: error: 'qubits' is given twice; expected one line"},
      {"1 X0\nqubits 4\n", "65 2:1: error: 'qubits' after a term; expected it before the terms"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.text);
    CHECK(pauli_message(row.text) == row.expected);
  }
}

TEST_CASE("a mistake comes with its line and a caret") {
  CHECK(pauli_complaint("1 X0\n0.5  Z1 Z1  # twice\n") ==
        "65\nfarrier: input.pauli:2:9: error: qubit 1 is named twice in one term; expected each "
        "qubit once\n0.5  Z1 Z1  # twice\n        ^\n");
}

TEST_CASE("sums that leave double precision are refused at their largest term") {
  CHECK(pauli_message("1 Z0\n1e308 X0\n1e308 X0\n") ==
        "65 2: error: the terms add up beyond the range of double precision; expected less");
  CHECK(pauli_complaint("1 X0\n1e308 I\n1e308 I\n") ==
        "65\nfarrier: input.pauli: error: the terms add up beyond the range of double precision; "
        "expected less\n");
}

TEST_CASE("a limit from outside and a scale hold for the whole text") {
  const base::SourceText source{"part.pauli", "4 Z1\n2 X0\n"};
  front::TermList list;
  CHECK(front::read_pauli(source, 0.5, 3, list) == 2);
  CHECK(list.sum.coefficient(0) == 2.0);
  CHECK(list.sum.coefficient(1) == 1.0);
  CHECK_THROWS_WITH_AS(front::read_pauli(source, 1.0, 1, list),
                       "qubit index 1 is out of range; expected 0 for 1 qubit", UserError);
  const base::SourceText wide{"wide.pauli", "qubits 4\n1 Z1\n"};
  CHECK_THROWS_WITH_AS(front::read_pauli(wide, 1.0, 3, list),
                       "bad number of qubits '4'; expected 1 to 3", UserError);
  const base::SourceText dense{"dense.pauli", "1 ZZZZ\n"};
  CHECK_THROWS_WITH_AS(front::read_pauli(dense, 1.0, 3, list),
                       "dense word of 4 letters for 3 qubits; expected no more than 3", UserError);
  CHECK_THROWS_AS(front::read_pauli(source, 1e308, 3, list), UserError);
}
