// Positions, UTF-8 (RFC 3629, sections 3 and 4) and the shape of a diagnostic.
#include "compiler/base/source.hpp"

#include <doctest/doctest.h>

#include <string>

using namespace farrier;
using namespace farrier::base;

TEST_CASE("positions count lines and bytes from 1") {
  const SourceText source{"a.pauli", "one\ntwo\r\n\nfour"};
  const Diagnostic first = source.at(0, "m");
  CHECK(first.line == 1);
  CHECK(first.column == 1);
  CHECK(first.source_line == "one");
  const Diagnostic second = source.at(6, "m");
  CHECK(second.line == 2);
  CHECK(second.column == 3);
  CHECK(second.source_line == "two");
  const Diagnostic newline = source.at(3, "m");
  CHECK(newline.line == 1);
  CHECK(newline.column == 4);
  const Diagnostic blank = source.at(9, "m");
  CHECK(blank.line == 3);
  CHECK(blank.source_line.empty());
  const Diagnostic end = source.at(1000, "m");
  CHECK(end.line == 4);
  CHECK(end.column == 5);
  CHECK(end.source_line == "four");
}

TEST_CASE("fail throws bad data at the position") {
  const SourceText source{"a.pauli", "x y"};
  try {
    source.fail(2, "unknown word");
    FAIL("nothing thrown");
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::bad_data);
    REQUIRE(error.diagnostics().size() == 1);
    CHECK(to_text(error.diagnostics()[0]) ==
          "farrier: a.pauli:1:3: error: unknown word\nx y\n  ^\n");
  }
}

TEST_CASE("diagnostics leave out what is unknown") {
  Diagnostic diagnostic;
  diagnostic.message = "no time given";
  CHECK(to_text(diagnostic) == "farrier: error: no time given\n");
  diagnostic.file = "job.xml";
  CHECK(to_text(diagnostic) == "farrier: job.xml: error: no time given\n");
  diagnostic.severity = Severity::warning;
  diagnostic.line = 4;
  CHECK(to_text(diagnostic) == "farrier: job.xml:4: warning: no time given\n");
}

TEST_CASE("diagnostics show control characters as spaces and broken bytes as question marks") {
  const SourceText source{"a\x1b", "\tab\x1b[1m\xff\x7f"};
  CHECK(to_text(source.at(1, "bad \x07 word")) ==
        "farrier: a :1:2: error: bad   word\n ab [1m? \n ^\n");
}

TEST_CASE("the caret stands below the character not below the byte") {
  const SourceText source{"a", "\xc3\xa9\xc3\xa9x"};  // two letters of two bytes each
  CHECK(to_text(source.at(4, "m")) == "farrier: a:1:5: error: m\n\xc3\xa9\xc3\xa9x\n  ^\n");
}

TEST_CASE("long lines are cut around the column") {
  const SourceText source{"a", std::string(500, 'p') + "Q" + std::string(500, 'r')};
  CHECK(to_text(source.at(500, "m")) == "farrier: a:1:501: error: m\n..." + std::string(60, 'p') +
                                            "Q" + std::string(39, 'r') + "...\n" +
                                            std::string(63, ' ') + "^\n");
  CHECK(to_text(source.at(0, "m")) ==
        "farrier: a:1:1: error: m\n" + std::string(100, 'p') + "...\n^\n");
  CHECK(to_text(source.at(1000, "m")) == "farrier: a:1:1001: error: m\n..." +
                                             std::string(100, 'r') + "\n" + std::string(102, ' ') +
                                             "^\n");
}

TEST_CASE("well-formed UTF-8 passes") {
  const std::string padding(9, 'a');
  for (const char* text : {"", "plain", "\x01", "\x7f", "\xc2\x80", "\xdf\xbf", "\xe0\xa0\x80",
                           "\xed\x9f\xbf", "\xee\x80\x80", "\xef\xbf\xbf", "\xf0\x90\x80\x80",
                           "\xf4\x8f\xbf\xbf", "0123456789abcdef\xe2\x82\xac"}) {
    CHECK(find_invalid_utf8(padding + text + padding) == std::string::npos);
  }
}

TEST_CASE("ill-formed UTF-8 is found where it starts") {
  for (const char* text :
       {"\x80", "\xbf", "\xc0\x80", "\xc1\xbf", "\xc2", "\xc2x", "\xe0\x80\x80", "\xe0\x9f\xbf",
        "\xed\xa0\x80", "\xed\xbf\xbf", "\xe2\x82", "\xf0\x80\x80\x80", "\xf0\x8f\xbf\xbf",
        "\xf4\x90\x80\x80", "\xf5\x80\x80\x80", "\xff", "\xfe", "\xf0\x9f\x98"}) {
    CAPTURE(text);
    for (std::size_t before = 0; before < 10; ++before) {
      const std::string padding(before, 'a');
      CHECK(find_invalid_utf8(padding + text) == before);
      CHECK(find_invalid_utf8(padding + text + "0123456789") == before);
    }
  }
}

TEST_CASE("NUL is found at any place in a block") {
  for (std::size_t at = 0; at < 20; ++at) {
    std::string text(20, 'a');
    text[at] = '\0';
    CHECK(find_invalid_utf8(text) == at);
  }
}
