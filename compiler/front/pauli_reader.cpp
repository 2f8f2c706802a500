// One pass over the text, line by line; nothing is allocated per line but what the sum stores.
#include "compiler/front/pauli_reader.hpp"

#include <algorithm>
#include <cmath>
#include <optional>
#include <string>
#include <string_view>

#include "compiler/base/numbers.hpp"
#include "compiler/front/text.hpp"

namespace farrier::front {
namespace {

constexpr std::string_view blanks = " \t\r";

bool is_blank(char c) {
  return c == ' ' || c == '\t' || c == '\r';
}

class PauliReader {
 public:
  PauliReader(const base::SourceText& source, double scale, std::uint32_t limit, TermList& terms)
      : source_(source), scale_(scale), terms_(terms), words_(source) {
    extent_.limit = limit;
    origin_.file = terms.file_index(source.name);
  }

  std::uint32_t read() {
    const std::string_view text = source_.text;
    for (std::size_t begin = 0; begin < text.size();) {
      const std::size_t end = std::min(text.find('\n', begin), text.size());
      ++origin_.line;
      read_line(begin, std::min(text.substr(0, end).find('#', begin), end));
      begin = end + 1;
    }
    if (count_ == 0) {
      source_.fail(text.size(), "no term; expected a coefficient and a Pauli string");
    }
    return std::max({extent_.declared, extent_.span, 1U});
  }

 private:
  void read_line(std::size_t begin, std::size_t end) {
    const std::string_view text(source_.text.data(), end);
    std::size_t at = begin;
    while (at < end && is_blank(text[at])) ++at;
    if (at == end) return;
    std::size_t stop = at;
    while (stop < end && !is_blank(text[stop])) ++stop;
    const std::string_view token = text.substr(at, stop - at);
    if (token == "qubits") return read_qubits(at, stop, end);
    const double coefficient = read_coefficient(source_, at, token) * scale_;
    if (!std::isfinite(coefficient)) {
      source_.fail(at, "the coefficient " + in_quotes(token) + " times the scale " +
                           base::shortest(scale_) + " is out of the range of double precision");
    }
    terms_.add(words_.read(stop, end, extent_), coefficient, origin_);
    ++count_;
  }

  void read_qubits(std::size_t keyword, std::size_t begin, std::size_t end) {
    if (extent_.declared > 0) source_.fail(keyword, "'qubits' is given twice; expected one line");
    if (count_ > 0) source_.fail(keyword, "'qubits' after a term; expected it before the terms");
    const std::string_view line(source_.text.data() + begin, end - begin);
    const std::vector<Item> items = split(line, blanks);
    if (items.empty()) source_.fail(begin, "no number after 'qubits'; expected 'qubits 4'");
    if (items.size() > 1) {
      source_.fail(begin + items[1].offset, in_quotes(items[1].text) +
                                                " after the number of qubits; expected the end of "
                                                "the line");
    }
    const std::uint64_t most = extent_.limit > 0 ? extent_.limit : most_qubits;
    const std::optional<std::uint64_t> number = base::parse_unsigned(items[0].text);
    if (!number || *number == 0 || *number > most) {
      source_.fail(begin + items[0].offset, "bad number of qubits " + in_quotes(items[0].text) +
                                                "; expected 1 to " + std::to_string(most));
    }
    extent_.declared = static_cast<std::uint32_t>(*number);
  }

  const base::SourceText& source_;
  double scale_;
  TermList& terms_;
  WordReader words_;
  Extent extent_;
  TermOrigin origin_;
  std::uint64_t count_ = 0;
};

}  // namespace

std::uint32_t read_pauli(const base::SourceText& source, double scale, std::uint32_t limit,
                         TermList& terms) {
  return PauliReader(source, scale, limit, terms).read();
}

}  // namespace farrier::front
