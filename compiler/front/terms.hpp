// Terms on their way from files into a Hamiltonian.
#pragma once

#include <cstdint>
#include <farrier/hamiltonian.hpp>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "compiler/base/source.hpp"

namespace farrier::front {

/// The most qubits that a Hamiltonian can have.
constexpr std::uint64_t most_qubits = std::uint64_t{Factor::max_qubit} + 1;

/// Terms as they are read, unmerged and in the user's unit.
struct TermList {
  PauliSum sum;
  std::vector<TermOrigin> origins;  ///< one for each term of the sum
  std::vector<std::string> files;
  std::uint64_t read = 0;  ///< how many terms were read, constants among them

  void add(std::span<const Factor> factors, double coefficient, TermOrigin origin);
  /// The index of a file's name, which is appended where it is new.
  std::uint32_t file_index(const std::string& name);
};

/// Merges the terms and multiplies them by `factor`. Warns where they cancel to nothing; throws
/// UserError (bad_data) where they add up beyond the range of double precision.
Hamiltonian to_hamiltonian(TermList terms, std::uint32_t qubits, double factor,
                           std::vector<Diagnostic>& warnings);

/// A finite coefficient, or a + bi with b = 0; else throws a UserError that points at `offset`.
double read_coefficient(const base::SourceText& source, std::size_t offset, std::string_view token);

/// What is known of the number of qubits while words are read; 0 stands for nothing yet.
struct Extent {
  std::uint32_t limit = 0;     ///< indices and dense words must not reach beyond it
  std::uint32_t declared = 0;  ///< dense words must have exactly this length
  std::uint32_t dense = 0;     ///< length of the dense words that were read
  std::size_t dense_at = 0;    ///< where the first of them stands
  std::uint32_t span = 0;      ///< 1 + the highest index that was named

  /// Sparse indices must lie below it; 0: no bound yet.
  [[nodiscard]] std::uint32_t bound() const;
};

/// Reads the Pauli words of terms; keeps its buffers from one term to the next.
class WordReader {
 public:
  explicit WordReader(const base::SourceText& source) : source_(source) {}

  /// Reads source.text[begin, end), in which blanks separate words. Returns the string's factors,
  /// which stay valid until the next call. Throws UserError that points at the word that is wrong.
  std::span<const Factor> read(std::size_t begin, std::size_t end, Extent& extent);

 private:
  struct Named {
    std::uint32_t qubit;
    Pauli letter;
    std::size_t offset;
  };

  void read_dense(std::size_t begin, std::string_view word, Extent& extent);
  void read_sparse(std::size_t begin, std::string_view word, Extent& extent);
  void check_length(std::size_t begin, std::size_t length, Extent& extent) const;
  [[noreturn]] void refuse_letter(std::size_t offset, std::string_view word) const;
  void collect();

  const base::SourceText& source_;
  std::vector<Named> named_;
  std::vector<Factor> factors_;
};

}  // namespace farrier::front
