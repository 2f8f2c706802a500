// Tables of words; every function below only looks something up in its enum's table.
#include "compiler/front/names.hpp"

namespace farrier::front {
namespace {

template <typename Value>
struct Word {
  std::string_view word;
  Value value;
};

template <typename Value>
using Table = std::vector<Word<Value>>;

template <typename Value>
std::optional<Value> find_value(const Table<Value>& table, std::string_view word) {
  for (const Word<Value>& row : table) {
    if (row.word == word) return row.value;
  }
  return std::nullopt;
}

template <typename Value>
std::string_view find_word(const Table<Value>& table, Value value) {
  for (const Word<Value>& row : table) {
    if (row.value == value) return row.word;
  }
  return {};
}

template <typename Value>
std::vector<std::string_view> all_words(const Table<Value>& table) {
  std::vector<std::string_view> words;
  for (const Word<Value>& row : table) words.push_back(row.word);
  return words;
}

const Table<Objective>& objective_table() {
  static const Table<Objective> table = {{"gates", Objective::gates},
                                         {"depth", Objective::depth},
                                         {"duration", Objective::duration},
                                         {"rotations", Objective::rotations},
                                         {"error", Objective::error}};
  return table;
}

const Table<Assurance>& assurance_table() {
  static const Table<Assurance> table = {{"certified", Assurance::certified},
                                         {"average", Assurance::average}};
  return table;
}

const Table<Style>& style_table() {
  static const Table<Style> table = {{"flat", Style::flat}, {"looped", Style::looped}};
  return table;
}

const Table<Barriers>& barriers_table() {
  static const Table<Barriers> table = {{"none", Barriers::none}, {"steps", Barriers::steps}};
  return table;
}

const Table<Effort>& effort_table() {
  static const Table<Effort> table = {
      {"low", Effort::low}, {"normal", Effort::normal}, {"high", Effort::high}};
  return table;
}

const Table<Native>& native_table() {
  static const Table<Native> table = {{"cx", Native::cx},   {"cz", Native::cz},
                                      {"ecr", Native::ecr}, {"iswap", Native::iswap},
                                      {"rzz", Native::rzz}, {"rxx", Native::rxx}};
  return table;
}

const Table<State>& state_table() {
  static const Table<State> table = {{"zero", State::zero},     {"one", State::one},
                                     {"plus", State::plus},     {"minus", State::minus},
                                     {"plus-i", State::plus_i}, {"minus-i", State::minus_i}};
  return table;
}

const Table<Basis>& basis_table() {
  static const Table<Basis> table = {{"x", Basis::x}, {"y", Basis::y}, {"z", Basis::z}};
  return table;
}

const Table<InputKind>& input_kind_table() {
  static const Table<InputKind> table = {
      {"xml", InputKind::xml}, {"pauli", InputKind::pauli}, {"fcidump", InputKind::fcidump}};
  return table;
}

const Table<bool>& yes_no_table() {
  static const Table<bool> table = {{"yes", true}, {"no", false}};
  return table;
}

}  // namespace

std::optional<Objective> parse_objective(std::string_view word) {
  return find_value(objective_table(), word);
}
std::string_view to_word(Objective value) {
  return find_word(objective_table(), value);
}
const std::vector<std::string_view>& objective_words() {
  static const std::vector<std::string_view> words = all_words(objective_table());
  return words;
}

std::optional<Assurance> parse_assurance(std::string_view word) {
  return find_value(assurance_table(), word);
}
std::string_view to_word(Assurance value) {
  return find_word(assurance_table(), value);
}
const std::vector<std::string_view>& assurance_words() {
  static const std::vector<std::string_view> words = all_words(assurance_table());
  return words;
}

std::optional<Style> parse_style(std::string_view word) {
  return find_value(style_table(), word);
}
std::string_view to_word(Style value) {
  return find_word(style_table(), value);
}
const std::vector<std::string_view>& style_words() {
  static const std::vector<std::string_view> words = all_words(style_table());
  return words;
}

std::optional<Barriers> parse_barriers(std::string_view word) {
  return find_value(barriers_table(), word);
}
std::string_view to_word(Barriers value) {
  return find_word(barriers_table(), value);
}
const std::vector<std::string_view>& barriers_words() {
  static const std::vector<std::string_view> words = all_words(barriers_table());
  return words;
}

std::optional<Effort> parse_effort(std::string_view word) {
  return find_value(effort_table(), word);
}
std::string_view to_word(Effort value) {
  return find_word(effort_table(), value);
}
const std::vector<std::string_view>& effort_words() {
  static const std::vector<std::string_view> words = all_words(effort_table());
  return words;
}

std::optional<Native> parse_native(std::string_view word) {
  return find_value(native_table(), word);
}
std::string_view to_word(Native value) {
  return find_word(native_table(), value);
}
const std::vector<std::string_view>& native_words() {
  static const std::vector<std::string_view> words = all_words(native_table());
  return words;
}

std::optional<State> parse_state(std::string_view word) {
  return find_value(state_table(), word);
}
std::string_view to_word(State value) {
  return find_word(state_table(), value);
}
const std::vector<std::string_view>& state_words() {
  static const std::vector<std::string_view> words = all_words(state_table());
  return words;
}

std::optional<Basis> parse_basis(std::string_view word) {
  return find_value(basis_table(), word);
}
std::string_view to_word(Basis value) {
  return find_word(basis_table(), value);
}
const std::vector<std::string_view>& basis_words() {
  static const std::vector<std::string_view> words = all_words(basis_table());
  return words;
}

std::optional<InputKind> parse_input_kind(std::string_view word) {
  return find_value(input_kind_table(), word);
}
std::string_view to_word(InputKind value) {
  return find_word(input_kind_table(), value);
}
const std::vector<std::string_view>& input_kind_words() {
  static const std::vector<std::string_view> words = all_words(input_kind_table());
  return words;
}

std::optional<bool> parse_yes_no(std::string_view word) {
  return find_value(yes_no_table(), word);
}
std::string_view yes_no_word(bool value) {
  return find_word(yes_no_table(), value);
}
const std::vector<std::string_view>& yes_no_words() {
  static const std::vector<std::string_view> words = all_words(yes_no_table());
  return words;
}

}  // namespace farrier::front
