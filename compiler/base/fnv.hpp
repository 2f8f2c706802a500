// The 64-bit FNV-1a digest (Fowler, Noll, Vo; offset basis and prime from draft-eastlake-fnv).
#pragma once

#include <cstdint>
#include <string>
#include <string_view>

namespace farrier::base {

class Fnv1a {
 public:
  void bytes(std::string_view data);
  /// Eight bytes, least significant first, whatever the machine's byte order.
  void word(std::uint64_t value);
  /// A length and then the bytes, so that neighbouring fields cannot run into each other.
  void field(std::string_view data);
  /// The bits of the value; -0.0 counts as 0.0.
  void number(double value);

  [[nodiscard]] std::uint64_t value() const { return state_; }
  /// 16 lower-case hexadecimal digits.
  [[nodiscard]] std::string hex() const;

 private:
  std::uint64_t state_ = 0xcbf29ce484222325ULL;
};

}  // namespace farrier::base
