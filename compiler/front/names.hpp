// The words that stand for settings in job files and on the command line: one table an enum.
#pragma once

#include <farrier/job.hpp>
#include <farrier/read.hpp>
#include <optional>
#include <string_view>
#include <vector>

namespace farrier::front {

// For each enum: the value of a word (none where the word is unknown), the word of a value (empty
// for a value that is never written, such as Style::automatic), and all words in table order.

std::optional<Objective> parse_objective(std::string_view word);
std::string_view to_word(Objective value);
const std::vector<std::string_view>& objective_words();

std::optional<Assurance> parse_assurance(std::string_view word);
std::string_view to_word(Assurance value);
const std::vector<std::string_view>& assurance_words();

std::optional<Style> parse_style(std::string_view word);
std::string_view to_word(Style value);
const std::vector<std::string_view>& style_words();

std::optional<Barriers> parse_barriers(std::string_view word);
std::string_view to_word(Barriers value);
const std::vector<std::string_view>& barriers_words();

std::optional<Effort> parse_effort(std::string_view word);
std::string_view to_word(Effort value);
const std::vector<std::string_view>& effort_words();

std::optional<Native> parse_native(std::string_view word);
std::string_view to_word(Native value);
const std::vector<std::string_view>& native_words();

std::optional<State> parse_state(std::string_view word);
std::string_view to_word(State value);
const std::vector<std::string_view>& state_words();

std::optional<Basis> parse_basis(std::string_view word);
std::string_view to_word(Basis value);
const std::vector<std::string_view>& basis_words();

std::optional<InputKind> parse_input_kind(std::string_view word);
std::string_view to_word(InputKind value);
const std::vector<std::string_view>& input_kind_words();

/// "yes" and "no".
std::optional<bool> parse_yes_no(std::string_view word);
std::string_view yes_no_word(bool value);
const std::vector<std::string_view>& yes_no_words();

}  // namespace farrier::front
