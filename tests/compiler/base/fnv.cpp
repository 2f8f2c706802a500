// FNV-1a against the vectors that draft-eastlake-fnv (appendix, "FNV test vectors") publishes.
#include "compiler/base/fnv.hpp"

#include <doctest/doctest.h>

#include <string_view>

using farrier::base::Fnv1a;

namespace {

std::uint64_t of(std::string_view text) {
  Fnv1a digest;
  digest.bytes(text);
  return digest.value();
}

}  // namespace

TEST_CASE("FNV-1a gives the published values") {
  CHECK(of("") == 0xcbf29ce484222325ULL);
  CHECK(of("a") == 0xaf63dc4c8601ec8cULL);
  CHECK(of("foobar") == 0x85944171f73967e8ULL);
}

TEST_CASE("FNV-1a in hexadecimal has 16 digits") {
  Fnv1a digest;
  CHECK(digest.hex() == "cbf29ce484222325");
  digest.bytes("foobar");
  CHECK(digest.hex() == "85944171f73967e8");
}

TEST_CASE("FNV-1a words go in least significant byte first") {
  Fnv1a words;
  words.word(0x7261626f6f66ULL);  // "foobar" and two NUL bytes
  CHECK(words.value() == of(std::string_view("foobar\0\0", 8)));
}

TEST_CASE("FNV-1a fields do not run into each other") {
  Fnv1a one;
  one.field("ab");
  one.field("c");
  Fnv1a other;
  other.field("a");
  other.field("bc");
  CHECK(one.value() != other.value());
}

TEST_CASE("FNV-1a takes the IEEE bits of a number and one zero") {
  Fnv1a number;
  number.number(1.0);
  Fnv1a bits;
  bits.word(0x3ff0000000000000ULL);  // IEEE 754 binary64 of 1
  CHECK(number.value() == bits.value());
  Fnv1a negative;
  negative.number(-0.0);
  Fnv1a positive;
  positive.number(0.0);
  CHECK(negative.value() == positive.value());
}
