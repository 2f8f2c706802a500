// The 64-bit FNV-1a digest, byte by byte as in draft-eastlake-fnv.
#include "compiler/base/fnv.hpp"

#include <bit>

namespace farrier::base {

void Fnv1a::bytes(std::string_view data) {
  constexpr std::uint64_t prime = 0x100000001b3ULL;
  for (const char c : data) {
    state_ ^= static_cast<unsigned char>(c);
    state_ *= prime;
  }
}

void Fnv1a::word(std::uint64_t value) {
  char buffer[8];
  for (unsigned k = 0; k < 8; ++k) buffer[k] = static_cast<char>((value >> (8U * k)) & 0xffU);
  bytes({buffer, 8});
}

void Fnv1a::field(std::string_view data) {
  word(data.size());
  bytes(data);
}

void Fnv1a::number(double value) {
  word(std::bit_cast<std::uint64_t>(value == 0.0 ? 0.0 : value));
}

std::string Fnv1a::hex() const {
  constexpr std::string_view digits = "0123456789abcdef";
  std::string text(16, '0');
  for (unsigned k = 0; k < 16; ++k) text[15 - k] = digits[(state_ >> (4U * k)) & 0xfU];
  return text;
}

}  // namespace farrier::base
