// Products of Pauli strings against Kronecker products of the Pauli matrices, entry by entry: all
// entries are 0, 1, -1, i or -i, so nothing is rounded.
#include "compiler/pauli/strings.hpp"

#include <doctest/doctest.h>

#include <complex>
#include <cstdint>
#include <string>
#include <vector>

#include "tests/support/dense.hpp"
#include "tests/support/random.hpp"

using farrier::Factor;
using farrier::Pauli;
using farrier::to_text;
using farrier::test::dense;
using farrier::test::Matrix;
using farrier::test::Random;
using farrier::test::word;
namespace pauli = farrier::pauli;

namespace {

std::complex<double> power_of_i(unsigned quarter_turns) {
  static constexpr double re[] = {1, 0, -1, 0};
  static constexpr double im[] = {0, 1, 0, -1};
  return {re[quarter_turns], im[quarter_turns]};
}

/// Whether a * b and the commutation of a and b are what the matrices say.
bool agrees(const std::vector<Factor>& a, const std::vector<Factor>& b, std::uint32_t qubits) {
  const pauli::SparseProduct product = pauli::multiply(a, b);
  const Matrix<double> left = dense<double>(a, qubits);
  const Matrix<double> right = dense<double>(b, qubits);
  const Matrix<double> claimed =
      power_of_i(product.quarter_turns) * dense<double>(product.factors, qubits);
  const bool commute = left * right == right * left;
  return claimed == left * right && pauli::commute(a, b) == commute;
}

}  // namespace

TEST_CASE("XY is iZ and so on round") {
  const auto product = [](const char* a, const char* b) {
    const pauli::SparseProduct result = pauli::multiply(word(a), word(b));
    return std::to_string(result.quarter_turns) + " " + to_text(result.factors);
  };
  CHECK(product("X", "Y") == "1 Z0");
  CHECK(product("Y", "Z") == "1 X0");
  CHECK(product("Z", "X") == "1 Y0");
  CHECK(product("Y", "X") == "3 Z0");
  CHECK(product("Z", "Z") == "0 I");
  CHECK(product("I", "Y") == "0 Y0");
  CHECK(product("XY", "YX") == "0 Z0 Z1");   // (iZ)(-iZ)
  CHECK(product("XX", "YY") == "2 Z0 Z1");   // (iZ)(iZ)
  CHECK(product("XIZ", "IYI") == "0 X0 Y1 Z2");
}

TEST_CASE("products of two qubits agree with the matrices in all 256 cases") {
  std::vector<std::vector<Factor>> strings;
  for (unsigned first = 0; first < 4; ++first)
    for (unsigned second = 0; second < 4; ++second) {
      std::vector<Factor>& string = strings.emplace_back();
      if (first != 0) string.emplace_back(0U, static_cast<Pauli>(first));
      if (second != 0) string.emplace_back(1U, static_cast<Pauli>(second));
    }
  for (const auto& a : strings)
    for (const auto& b : strings) CHECK(agrees(a, b, 2));
}

TEST_CASE("products of random strings agree with the matrices") {
  Random random(11);
  for (std::uint32_t qubits = 2; qubits <= 6; ++qubits)
    for (int k = 0; k < 40; ++k) {
      const auto a = farrier::test::random_string(random, qubits);
      const auto b = farrier::test::random_string(random, qubits);
      INFO(to_text(a), " times ", to_text(b));
      CHECK(agrees(a, b, qubits));
    }
}

TEST_CASE("strings on far qubits commute and multiply without a phase") {
  const std::vector<Factor> near = word("XYZ");
  const std::vector<Factor> far = farrier::test::shifted(near, Factor::max_qubit - 2);
  CHECK(pauli::commute(near, far));
  const pauli::SparseProduct product = pauli::multiply(far, near);
  CHECK(product.quarter_turns == 0);
  REQUIRE(product.factors.size() == 6);
  CHECK(product.factors.front() == near.front());
  CHECK(product.factors.back() == far.back());
}
