// Quoting, counting, splitting, and the gate that every text passes.
#include "compiler/front/text.hpp"

#include <doctest/doctest.h>

#include "tests/compiler/front/support.hpp"

using namespace farrier;
using namespace farrier::front;

TEST_CASE("quoted words are cut between characters") {
  CHECK(in_quotes("X0") == "'X0'");
  CHECK(in_quotes(std::string(40, 'a')) == "'" + std::string(40, 'a') + "'");
  CHECK(in_quotes(std::string(41, 'a')) == "'" + std::string(40, 'a') + "...'");
  // 39 letters, then one of three bytes that would straddle the cut.
  CHECK(in_quotes(std::string(39, 'a') + "\xe2\x82\xac") == "'" + std::string(39, 'a') + "...'");
}

TEST_CASE("nearest words are offered or all are shown") {
  CHECK(nearest_of("lokal", {"local", "global"}) == "the nearest known one is 'local'");
  CHECK(nearest_of("mhz", {"Hz", "kHz", "MHz"}) == "the nearest known one is 'MHz'");
  CHECK(nearest_of("something", {"x", "y"}) == "known are x, y");
  CHECK(nearest_of("something", {}) == "none is known here");
}

TEST_CASE("counts agree with their nouns") {
  CHECK(count_of(1, "letter") == "1 letter");
  CHECK(count_of(0, "letter") == "0 letters");
  CHECK(count_of(2, "letter") == "2 letters");
}

TEST_CASE("lists are split with offsets and without empty pieces") {
  const std::vector<Item> items = split(" 1, 23 ,,4", " ,");
  REQUIRE(items.size() == 3);
  CHECK(items[0].text == "1");
  CHECK(items[0].offset == 1);
  CHECK(items[1].text == "23");
  CHECK(items[1].offset == 4);
  CHECK(items[2].text == "4");
  CHECK(items[2].offset == 9);
  CHECK(split("", ",").empty());
  CHECK(split(",,", ",").empty());
}

TEST_CASE("a byte order mark is accepted at the start only") {
  CHECK(checked_source("a",
                       "\xef\xbb\xbf"
                       "1 X0")
            .text == "1 X0");
  CHECK(test::pauli_message("\xef\xbb\xbf\n1 X0 \xef\xbb\xbf") ==
        "65 2:6: error: unknown Pauli letter in '\xef\xbb\xbf'; expected I, X, Y or Z");
}

TEST_CASE("what is no text is refused where it starts") {
  CHECK(test::pauli_complaint("1 X0\n1 \xff Z0\n") ==
        "65\nfarrier: input.pauli:2:3: error: invalid UTF-8; expected text in UTF-8\n"
        "1 ? Z0\n  ^\n");
  CHECK(test::xml_complaint(std::string("<job\0/>", 7)) ==
        "65\nfarrier: input.xml:1:5: error: NUL byte; expected text\n<job />\n    ^\n");
}
