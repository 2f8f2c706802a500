// Texts for people: one line, limited width, aligned columns.
#include "compiler/back/text.hpp"

#include <doctest/doctest.h>

#include "sample.hpp"

using namespace farrier;

TEST_CASE("one line: control characters and separators become spaces") {
  CHECK(back::one_line("a\nb\r\tc") == "a b  c");
  CHECK(back::one_line(std::string("a\0b\x1b\x7f", 5)) == "a b  ");
  // NEL, LINE SEPARATOR and PARAGRAPH SEPARATOR end lines too (Unicode, UAX 14, class BK and NL).
  CHECK(back::one_line("a\xc2\x85"
                       "b\xe2\x80\xa8"
                       "c\xe2\x80\xa9") == "a b c ");
  CHECK(back::one_line("\xc3\xa4 \xc2\xb5s \xe2\x80\xa6") == "\xc3\xa4 \xc2\xb5s \xe2\x80\xa6");
}

TEST_CASE("one line: bytes that are no UTF-8 become question marks") {
  CHECK(back::one_line("a\xff"
                       "b\xc3") == "a?b?");
  CHECK(back::one_line("\x80\x80") == "??");
}

TEST_CASE("qubit lists") {
  CHECK(back::joined({}).empty());
  CHECK(back::joined({3, 1, 2}) == "3 1 2");
  CHECK(back::ranges({0, 1, 2, 5, 7, 8}) == "0-2 5 7 8");
  CHECK(back::ranges({}).empty());
}

TEST_CASE("six digits") {
  CHECK(back::six_digits(52.3456789) == "52.3457");
  CHECK(back::six_digits(2.0) == "2");
  CHECK(back::six_digits(1.5e-9) == "1.5e-09");
}

TEST_CASE("wrapped lines stay within the width and are indented below their lead") {
  std::string text;
  for (int k = 0; k < 40; ++k) text += "words ";
  std::string out;
  back::append_item(out, "label", text);
  const auto rows = sample::lines(out);
  REQUIRE(rows.size() == 4);
  CHECK(rows[0].substr(0, 19) == "  label      words ");
  for (std::size_t k = 0; k < rows.size(); ++k) {
    CHECK(rows[k].size() <= back::line_width);
    CHECK(rows[k].back() != ' ');
    if (k + 1 < rows.size()) CHECK(rows[k].size() + 6 > back::line_width);
  }
  CHECK(rows[1].substr(0, 18) == "             words");
}

TEST_CASE("a word longer than the line stays whole") {
  std::string out;
  back::append_wrapped(out, "- ", std::string(100, 'x') + " y");
  CHECK(out == "- " + std::string(100, 'x') + "\n  y\n");
}

TEST_CASE("a table has aligned columns and no trailing spaces") {
  const std::string text = back::table({{"name"}, {"two\nlines", true}, {"rest"}},
                                       {{"\xc2\xb5", "1", "x"}, {"longer", "1000000", ""}});
  CHECK(text ==
        "            two\n"
        "name      lines  rest\n"
        "\xc2\xb5             1  x\n"
        "longer  1000000\n");
}
