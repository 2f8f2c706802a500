// Numbers to text and back. Exact decimal expansions are those of IEEE 754 binary64.
#include "compiler/base/numbers.hpp"

#include <doctest/doctest.h>

#include <bit>
#include <cmath>
#include <limits>
#include <random>

using namespace farrier::base;

TEST_CASE("shortest text reads back as the same double") {
  CHECK(shortest(0.5) == "0.5");
  CHECK(shortest(1e-5) == "1e-05");
  CHECK(shortest(3.0) == "3");
  CHECK(shortest(0.1 + 0.2) == "0.30000000000000004");
  std::mt19937_64 random(5);
  for (int k = 0; k < 20000; ++k) {
    const double value = std::bit_cast<double>(random());
    if (!std::isfinite(value)) continue;
    CHECK(parse_double(shortest(value)) == value);
  }
}

TEST_CASE("rounded up is exact where few digits suffice") {
  CHECK(rounded_up(0.0) == "0");
  CHECK(rounded_up(1.0) == "1");
  CHECK(rounded_up(0.5) == "0.5");
  CHECK(rounded_up(123456.0) == "123456");
  CHECK(rounded_up(1200.0, 2) == "1.2e+03");
}

TEST_CASE("rounded up goes up at the last digit and carries") {
  // The double nearest to 0.1 is 0.1000000000000000055511151231257827...
  CHECK(rounded_up(0.1) == "0.100001");
  CHECK(rounded_up(1.0 / 3.0) == "0.333334");
  CHECK(rounded_up(0.00087) == "0.000870001");
  CHECK(rounded_up(999999.5) == "1e+06");
  CHECK(rounded_up(9.9999999e-9) == "1e-08");
  CHECK(rounded_up(1.23456789e-7) == "1.23457e-07");
  CHECK(rounded_up(2.0 / 3.0, 3) == "0.667");
  CHECK(rounded_up(std::numeric_limits<double>::denorm_min(), 3) == "4.95e-324");
}

TEST_CASE("rounded up is never below and less than one digit above") {
  std::mt19937_64 random(11);
  std::uniform_real_distribution<double> exponent(-300.0, 300.0);
  for (int k = 0; k < 20000; ++k) {
    const double value = std::pow(10.0, exponent(random));
    for (const int digits : {6, 9, 17}) {
      const double read = parse_double(rounded_up(value, digits)).value();
      CHECK(read >= value);
      CHECK(read <= value * (1.0 + 1.1 * std::pow(10.0, 1 - digits) + 3e-16));
    }
  }
}

TEST_CASE("rounded up within adds digits to stay within the limit") {
  CHECK(rounded_up_within(0.00087, 0.001) == "0.000870001");
  CHECK(rounded_up_within(0.00099999996, 0.001) == "0.001");
  CHECK(rounded_up_within(0.00012345678, 0.0001234568) == "0.0001234568");
  // Above the limit there is nothing to stay within.
  CHECK(rounded_up_within(0.1, 0.05) == "0.100001");
  std::mt19937_64 random(3);
  std::uniform_real_distribution<double> uniform(0.0, 1.0);
  for (int k = 0; k < 20000; ++k) {
    const double value = uniform(random);
    CHECK(parse_double(rounded_up_within(value, value)) == value);
    const double limit = std::nextafter(value, 2.0);
    const double read = parse_double(rounded_up_within(value, limit)).value();
    CHECK(read >= value);
    CHECK(read <= limit);
  }
}

TEST_CASE("parse double takes the whole text or nothing") {
  CHECK(parse_double("0.25") == 0.25);
  CHECK(parse_double("+1.5e-1") == 0.15);
  CHECK(parse_double("-2") == -2.0);
  CHECK(parse_double(".5") == 0.5);
  CHECK(parse_double("5.") == 5.0);
  for (const char* text : {"", "+", "-", "+-1", "--1", "1 ", " 1", "1x", "0x10", "1,5", "1e", "inf",
                           "-inf", "nan", "infinity", "1e400", "e5", "."}) {
    CAPTURE(text);
    CHECK_FALSE(parse_double(text));
  }
}

TEST_CASE("parse unsigned takes the whole text or nothing") {
  CHECK(parse_unsigned("0") == 0);
  CHECK(parse_unsigned("007") == 7);
  CHECK(parse_unsigned("18446744073709551615") == 18446744073709551615ULL);
  for (const char* text : {"", "-1", "+1", "1.0", "1 ", " 1", "18446744073709551616", "0x1"}) {
    CAPTURE(text);
    CHECK_FALSE(parse_unsigned(text));
  }
}
