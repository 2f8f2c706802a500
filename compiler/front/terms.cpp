// Coefficients and Pauli words, and the way from a list of terms to a Hamiltonian.
#include "compiler/front/terms.hpp"

#include <algorithm>
#include <cmath>
#include <optional>
#include <utility>

#include "compiler/base/numbers.hpp"
#include "compiler/front/text.hpp"

namespace farrier::front {
namespace {

constexpr std::string_view digits = "0123456789";

bool is_blank(char c) {
  return c == ' ' || c == '\t' || c == '\r' || c == '\n';
}

std::optional<Pauli> letter_of(char c) {
  switch (c) {
    case 'I':
      return Pauli::i;
    case 'X':
      return Pauli::x;
    case 'Y':
      return Pauli::y;
    case 'Z':
      return Pauli::z;
    default:
      return std::nullopt;
  }
}

/// The imaginary part of "a+bi" and where the real part ends; none where the token is no such form.
struct ComplexSplit {
  std::string_view real;
  std::string_view imaginary;  ///< without the i
};

std::optional<ComplexSplit> split_complex(std::string_view token) {
  if (token.empty() || token.back() != 'i') return std::nullopt;
  token.remove_suffix(1);
  std::size_t sign = token.size();
  while (sign > 0) {
    --sign;
    const bool exponent = sign > 0 && (token[sign - 1] == 'e' || token[sign - 1] == 'E');
    if ((token[sign] == '+' || token[sign] == '-') && !exponent) break;
  }
  return ComplexSplit{token.substr(0, sign), token.substr(sign)};
}

std::optional<double> imaginary_value(std::string_view text) {
  if (text.empty() || text == "+") return 1.0;
  if (text == "-") return -1.0;
  return base::parse_double(text);
}

bool names_no_number(std::string_view token) {
  if (!token.empty() && (token[0] == '+' || token[0] == '-')) token.remove_prefix(1);
  std::string lower(token.substr(0, 9));
  for (char& c : lower) {
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  }
  return lower == "nan" || lower == "inf" || lower == "infinity";
}

/// Merging and scaling stay finite where the sum of all magnitudes does.
void refuse_overflow(const Hamiltonian& hamiltonian, const std::vector<TermOrigin>& origins,
                     double factor) {
  const PauliSum& sum = hamiltonian.sum;
  if (std::isfinite(sum.one_norm() * factor) && std::isfinite(sum.constant() * factor)) return;
  Diagnostic diagnostic;
  diagnostic.file = hamiltonian.files[0];
  diagnostic.message = "the terms add up beyond the range of double precision; expected less";
  std::size_t largest = 0;
  for (std::size_t k = 1; k < sum.size(); ++k) {
    if (std::abs(sum.coefficient(k)) > std::abs(sum.coefficient(largest))) largest = k;
  }
  if (!std::isfinite(sum.one_norm() * factor)) {
    diagnostic.file = hamiltonian.files[origins[largest].file];
    diagnostic.line = origins[largest].line;
  }
  throw UserError(ExitCode::bad_data, diagnostic);
}

}  // namespace

void TermList::add(std::span<const Factor> factors, double coefficient, TermOrigin origin) {
  sum.add(factors, coefficient);
  if (!factors.empty()) origins.push_back(origin);
  ++read;
}

std::uint32_t TermList::file_index(const std::string& name) {
  const auto found = std::find(files.begin(), files.end(), name);
  const auto index = static_cast<std::uint32_t>(found - files.begin());
  if (found == files.end()) files.push_back(name);
  return index;
}

Hamiltonian to_hamiltonian(TermList terms, std::uint32_t qubits, double factor,
                           std::vector<Diagnostic>& warnings) {
  Hamiltonian hamiltonian;
  hamiltonian.qubits = qubits;
  hamiltonian.files = std::move(terms.files);
  hamiltonian.sum = std::move(terms.sum);
  PauliSum& sum = hamiltonian.sum;
  const bool had_strings = !sum.empty();
  refuse_overflow(hamiltonian, terms.origins, factor);
  const std::vector<std::uint32_t> first = sum.merge();
  sum.scale(factor);
  hamiltonian.origins.reserve(first.size());
  for (const std::uint32_t index : first) hamiltonian.origins.push_back(terms.origins[index]);

  if (sum.empty() && (had_strings || sum.constant() == 0.0)) {
    warnings.push_back(Diagnostic{Severity::warning, hamiltonian.files[0], 0, 0,
                                  "the terms cancel to nothing; the evolution is the identity",
                                  ""});
  }
  return hamiltonian;
}

double read_coefficient(const base::SourceText& source, std::size_t offset,
                        std::string_view token) {
  if (const std::optional<double> value = base::parse_double(token)) return *value;
  if (names_no_number(token)) {
    source.fail(offset,
                "the coefficient " + in_quotes(token) + " is not finite; expected a number");
  }
  if (const std::optional<ComplexSplit> parts = split_complex(token)) {
    const std::optional<double> real = parts->real.empty() ? 0.0 : base::parse_double(parts->real);
    const std::optional<double> imaginary = imaginary_value(parts->imaginary);
    if (real && imaginary) {
      if (*imaginary == 0.0) return *real;
      source.fail(offset, "the coefficient " + in_quotes(token) +
                              " has an imaginary part, so the operator would not be Hermitian; "
                              "expected a real number");
    }
  }
  source.fail(offset, "bad coefficient " + in_quotes(token) +
                          "; expected a number in the range of double precision, such as -0.25");
}

std::uint32_t Extent::bound() const {
  std::uint32_t bound = 0;
  for (const std::uint32_t value : {limit, declared, dense}) {
    if (value > 0 && (bound == 0 || value < bound)) bound = value;
  }
  return bound;
}

std::span<const Factor> WordReader::read(std::size_t begin, std::size_t end, Extent& extent) {
  const std::string_view text(source_.text.data(), end);
  named_.clear();
  std::string_view alone;
  bool first = true;
  for (std::size_t at = begin; at < end; first = false) {
    while (at < end && is_blank(text[at])) ++at;
    if (at == end) break;
    std::size_t stop = at;
    while (stop < end && !is_blank(text[stop])) ++stop;
    const std::string_view word = text.substr(at, stop - at);
    if (!alone.empty()) {
      source_.fail(at, in_quotes(word) + " after the dense word " + in_quotes(alone) +
                           "; expected one dense word, or letters with indices such as X0");
    }
    if (first && word.find_first_of(digits) == std::string_view::npos) {
      alone = word;
      read_dense(at, word, extent);
    } else {
      read_sparse(at, word, extent);
    }
    at = stop;
  }
  if (first)
    source_.fail(begin, "no Pauli string; expected words such as X0 X1, or one word such as ZZIX");
  collect();
  return factors_;
}

void WordReader::refuse_letter(std::size_t offset, std::string_view word) const {
  std::string upper(word);
  for (char& c : upper) {
    if (c == 'i' || (c >= 'x' && c <= 'z')) c = static_cast<char>(c - 'a' + 'A');
  }
  if (upper != word && upper.find_first_not_of("IXYZ0123456789") == std::string::npos) {
    source_.fail(offset,
                 "lower-case letter in " + in_quotes(word) + "; expected " + in_quotes(upper));
  }
  source_.fail(offset, "unknown Pauli letter in " + in_quotes(word) + "; expected I, X, Y or Z");
}

void WordReader::check_length(std::size_t begin, std::size_t length, Extent& extent) const {
  const std::string what = "dense word of " + count_of(length, "letter");
  if (extent.declared > 0 && length != extent.declared) {
    source_.fail(begin, what + " for " + count_of(extent.declared, "qubit") + "; expected " +
                            count_of(extent.declared, "letter"));
  }
  if (extent.dense > 0 && length != extent.dense) {
    source_.fail(begin, what + " after one of " + std::to_string(extent.dense) + "; expected " +
                            count_of(extent.dense, "letter"));
  }
  const std::uint64_t most = extent.limit > 0 ? extent.limit : most_qubits;
  if (length > most) {
    source_.fail(begin, what + " for " + count_of(most, "qubit") + "; expected no more than " +
                            std::to_string(most));
  }
  if (length < extent.span) {
    source_.fail(begin, what + ", but an earlier term names qubit " +
                            std::to_string(extent.span - 1) + "; expected " +
                            count_of(extent.span, "letter") + " or more");
  }
}

void WordReader::read_dense(std::size_t begin, std::string_view word, Extent& extent) {
  for (std::size_t k = 0; k < word.size(); ++k) {
    const std::optional<Pauli> letter = letter_of(word[k]);
    if (!letter) refuse_letter(begin + k, word);
    if (*letter != Pauli::i) named_.push_back({static_cast<std::uint32_t>(k), *letter, begin + k});
  }
  if (word == "I") return;  // the constant, for any number of qubits
  check_length(begin, word.size(), extent);
  if (extent.dense == 0) extent.dense_at = begin;
  extent.dense = static_cast<std::uint32_t>(word.size());
  extent.span = std::max(extent.span, extent.dense);
}

void WordReader::read_sparse(std::size_t begin, std::string_view word, Extent& extent) {
  const std::optional<Pauli> letter = letter_of(word[0]);
  const std::string_view index = word.substr(1);
  if (!letter) refuse_letter(begin, word);
  const std::optional<std::uint64_t> qubit = base::parse_unsigned(index);
  if (!qubit && (index.empty() || index.find_first_not_of(digits) != std::string_view::npos)) {
    source_.fail(begin, "bad qubit index in " + in_quotes(word) +
                            "; expected a letter and a decimal index, such as X0");
  }
  if (!qubit || *qubit > Factor::max_qubit) {
    source_.fail(begin, "the qubit index in " + in_quotes(word) +
                            " is too large; expected at most " + std::to_string(Factor::max_qubit));
  }
  const std::uint32_t bound = extent.bound();
  if (bound > 0 && *qubit >= bound) {
    source_.fail(begin, "qubit index " + std::to_string(*qubit) + " is out of range; expected " +
                            (bound == 1 ? "0" : "0 to " + std::to_string(bound - 1)) + " for " +
                            count_of(bound, "qubit"));
  }
  const auto value = static_cast<std::uint32_t>(*qubit);
  extent.span = std::max(extent.span, value + 1);
  named_.push_back({value, *letter, begin});
}

void WordReader::collect() {
  const auto by_qubit = [](const Named& a, const Named& b) {
    return a.qubit != b.qubit ? a.qubit < b.qubit : a.offset < b.offset;
  };
  if (!std::is_sorted(named_.begin(), named_.end(), by_qubit)) {
    std::sort(named_.begin(), named_.end(), by_qubit);
  }
  const Named* repeated = nullptr;
  factors_.clear();
  for (std::size_t k = 0; k < named_.size(); ++k) {
    const bool again = k > 0 && named_[k - 1].qubit == named_[k].qubit;
    if (again && (repeated == nullptr || named_[k].offset < repeated->offset))
      repeated = &named_[k];
    if (named_[k].letter != Pauli::i) factors_.emplace_back(named_[k].qubit, named_[k].letter);
  }
  if (repeated != nullptr) {
    source_.fail(repeated->offset, "qubit " + std::to_string(repeated->qubit) +
                                       " is named twice in one term; expected each qubit once");
  }
}

}  // namespace farrier::front
