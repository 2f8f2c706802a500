// Help and diagnostics as a person sees them. Limits: a screen of 80 columns; 24 lines for the
// program's own help (the size of a VT100 screen).
#include "compiler/driver/text.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cstdlib>
#include <string>

using namespace farrier;
using namespace farrier::driver;

namespace {

std::size_t lines(const std::string& text) {
  return static_cast<std::size_t>(std::ranges::count(text, '\n'));
}

std::size_t widest(const std::string& text) {
  std::size_t width = 0;
  for (std::size_t from = 0; from < text.size();) {
    const std::size_t end = text.find('\n', from);
    width = std::max(width, end - from);
    from = end + 1;
  }
  return width;
}

}  // namespace

TEST_CASE("the program's help fits one screen and names every verb") {
  const std::string help = program_help();
  CHECK(lines(help) <= 24);
  CHECK(widest(help) <= 80);
  for (const VerbInfo& verb : verb_table()) CHECK(help.find(verb.name) != std::string::npos);
}

TEST_CASE("help of a verb shows each of its options on a line of its own") {
  for (const VerbInfo& verb : verb_table()) {
    const std::string help = verb_help(verb.verb);
    std::size_t options = 0;
    for (const OptionInfo& option : option_table()) {
      const bool shown = help.find("--" + std::string(option.name) + " ") != std::string::npos;
      const bool taken =
          verb.available && (option.verbs & only(verb.verb)) != 0 && option.available();
      INFO(verb.name << " " << option.name);
      CHECK((shown == taken || !verb.available));
      if (taken) ++options;
    }
    INFO(help);
    CHECK(widest(help) <= 80);
    CHECK(lines(help) <= options + 7);
  }
}

TEST_CASE("the example in the help of a verb is a command line that is understood") {
  for (const VerbInfo& verb : verb_table()) {
    if (!verb.available) continue;
    std::vector<std::string> words;
    const std::string example(verb.example);
    for (std::size_t from = 0; from < example.size();) {
      const std::size_t end = std::min(example.find(' ', from), example.size());
      words.push_back(example.substr(from, end - from));
      from = end + 1;
    }
    REQUIRE(words.front() == "farrier");
    words.erase(words.begin());
    CHECK(parse(words).verb == verb.verb);
  }
}

TEST_CASE("only the severity of a diagnostic is coloured") {
  const Diagnostic diagnostic{Severity::error, "error: x.pauli", 2, 1, "no such letter", "Q0"};
  CHECK(diagnostic_text(diagnostic, false) ==
        "farrier: error: x.pauli:2:1: error: no such letter\nQ0\n^\n");
  CHECK(diagnostic_text(diagnostic, true) ==
        "farrier: error: x.pauli:2:1: \033[1;31merror:\033[0m no such letter\nQ0\n^\n");
}

TEST_CASE("no colour where standard error is no terminal") {
  if (!error_is_terminal()) CHECK(!error_wants_colour());
}

TEST_CASE("no colour with NO_COLOR") {
  ::setenv("NO_COLOR", "1", 1);
  CHECK(!error_wants_colour());
  ::unsetenv("NO_COLOR");
}
