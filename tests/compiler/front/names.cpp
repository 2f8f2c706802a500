// Every word finds its value and every value its word.
#include "compiler/front/names.hpp"

#include <doctest/doctest.h>

using namespace farrier;
using namespace farrier::front;

namespace {

template <typename Value>
void check_words(std::optional<Value> (*parse)(std::string_view),
                 const std::vector<std::string_view>& words,
                 const std::vector<std::string_view>& documented) {
  CHECK(words == documented);
  for (const std::string_view word : words) {
    const std::optional<Value> value = parse(word);
    REQUIRE(value);
    CHECK(to_word(*value) == word);
  }
  CHECK_FALSE(parse(""));
  CHECK_FALSE(parse("Gates"));
}

}  // namespace

TEST_CASE("settings have the documented words") {
  check_words(&parse_objective, objective_words(),
              {"gates", "depth", "duration", "rotations", "error"});
  check_words(&parse_assurance, assurance_words(), {"certified", "average"});
  check_words(&parse_style, style_words(), {"flat", "looped"});
  check_words(&parse_barriers, barriers_words(), {"none", "steps"});
  check_words(&parse_effort, effort_words(), {"low", "normal", "high"});
  check_words(&parse_native, native_words(), {"cx", "cz", "ecr", "iswap", "rzz", "rxx"});
  check_words(&parse_state, state_words(), {"zero", "one", "plus", "minus", "plus-i", "minus-i"});
  check_words(&parse_basis, basis_words(), {"x", "y", "z"});
  check_words(&parse_input_kind, input_kind_words(), {"xml", "pauli", "fcidump"});
}

TEST_CASE("words mean what they say") {
  CHECK(parse_objective("rotations") == Objective::rotations);
  CHECK(parse_state("minus-i") == State::minus_i);
  CHECK(parse_native("iswap") == Native::iswap);
  CHECK(parse_yes_no("yes") == true);
  CHECK(parse_yes_no("no") == false);
  CHECK_FALSE(parse_yes_no("true"));
  CHECK(yes_no_word(true) == "yes");
  CHECK(yes_no_words().size() == 2);
}

TEST_CASE("a style that is chosen for the user has no word") {
  CHECK(to_word(Style::automatic).empty());
}
