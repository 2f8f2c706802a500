// From the words of the command line to a CommandLine. The only file that knows
// Boost.Program_options.
#include "compiler/driver/options.hpp"

#include <algorithm>
#include <boost/program_options.hpp>
#include <filesystem>

#include "compiler/base/suggest.hpp"

namespace farrier::driver {
namespace {

namespace po = boost::program_options;

[[noreturn]] void refuse(const std::string& message) {
  throw UserError(ExitCode::usage, message);
}

/// "a", "a and b", "a, b and c"
std::string listed(const std::vector<std::string>& words) {
  std::string text;
  for (std::size_t k = 0; k < words.size(); ++k) {
    if (k > 0) text += k + 1 < words.size() ? ", " : " and ";
    text += words[k];
  }
  return text;
}

std::string dashed(const OptionInfo& option) {
  return "--" + std::string(option.name);
}

Verb find_verb(const std::string& word) {
  std::vector<std::string_view> names;
  std::vector<std::string> texts;
  for (const VerbInfo& info : verb_table()) {
    if (info.name == word) return info.verb;
    names.push_back(info.name);
    texts.emplace_back(info.name);
  }
  const std::string_view near = base::nearest(word, names);
  if (!near.empty())
    refuse("'" + word + "' is no verb; the nearest one is '" + std::string(near) + "'");
  refuse("'" + word + "' is no verb; expected one of " + listed(texts));
}

const OptionInfo& find_option(std::string_view name) {
  const auto row = std::ranges::find(option_table(), name, &OptionInfo::name);
  if (row == option_table().end()) throw InternalFault("an option without a row was parsed");
  return *row;
}

/// What an abbreviation begins, or else the nearest by spelling.
std::string_view nearest_option(std::string_view word, const std::vector<std::string_view>& names) {
  if (word.size() < 4 || !word.starts_with("--")) return "";
  const auto begun =
      std::ranges::find_if(names, [word](std::string_view name) { return name.starts_with(word); });
  return begun != names.end() ? *begun : base::nearest(word, names);
}

/// Refuses a word that looks like an option and is none, with the nearest option of the verb.
[[noreturn]] void refuse_unknown(Verb verb, const std::string& token) {
  const std::string word = token.substr(0, token.find('='));
  std::vector<std::string> names = {"--help"};
  for (const OptionInfo& option : option_table())
    if ((option.verbs & only(verb)) != 0) names.push_back(dashed(option));
  const std::vector<std::string_view> views(names.begin(), names.end());
  const std::string_view near = nearest_option(word, views);
  const std::string verb_name(verb_info(verb).name);
  if (!near.empty())
    refuse(word + " is no option of " + verb_name + "; the nearest one is " + std::string(near));
  refuse(word + " is no option of " + verb_name + "; `farrier " + verb_name +
         " --help` shows those that are");
}

/// Whether the verb takes the option, and this version has it.
void check_taken(Verb verb, const OptionInfo& option) {
  if ((option.verbs & only(verb)) == 0) {
    std::vector<std::string> takers;
    for (const VerbInfo& info : verb_table())
      if ((option.verbs & only(info.verb)) != 0) takers.emplace_back(info.name);
    refuse(dashed(option) + " is no option of " + std::string(verb_info(verb).name) +
           "; it belongs to " + listed(takers));
  }
  if (!option.available()) refuse(dashed(option) + " is not available in this version");
}

[[noreturn]] void refuse_without_value(const OptionInfo& option) {
  refuse(dashed(option) + " needs a value; expected " + dashed(option) + " " +
         std::string(option.argument));
}

/// The value of one option as the words gave it.
std::string value_of(const po::option& parsed, const OptionInfo& option) {
  if (parsed.value.empty()) return "";
  const bool attached = parsed.original_tokens.size() == 1;
  if (!attached && parsed.value.front().starts_with("--")) refuse_without_value(option);
  return parsed.value.front();
}

[[noreturn]] void refuse_syntax(const po::invalid_command_line_syntax& error) {
  const std::string name = error.get_option_name();
  if (error.kind() == po::invalid_syntax::extra_parameter)
    refuse(name + " takes no value; expected the option alone");
  refuse_without_value(find_option(name.substr(name.find_first_not_of('-'))));
}

std::vector<po::option> split_words(const std::vector<std::string>& words) {
  po::options_description known;
  for (const OptionInfo& option : option_table()) {
    std::string name(option.name);
    if (option.letter != 0) name += std::string(",") + option.letter;
    if (option.argument.empty())
      known.add_options()(name.c_str(), "");
    else
      known.add_options()(name.c_str(), po::value<std::string>(), "");
  }
  constexpr int style =
      po::command_line_style::unix_style & ~po::command_line_style::allow_guessing;
  try {
    return po::command_line_parser(words)
        .options(known)
        .style(style)
        .allow_unregistered()
        .run()
        .options;
  } catch (const po::invalid_command_line_syntax& error) {
    refuse_syntax(error);
  } catch (const po::error& error) {
    refuse(error.what());
  }
}

void set_operand(CommandLine& line, const std::string& word) {
  if (!line.operand.empty())
    refuse("'" + word + "' is one word too many; expected `farrier " +
           std::string(verb_info(*line.verb).name) + " " +
           std::string(verb_info(*line.verb).operands) + "`");
  line.operand = word;
}

void add_option(CommandLine& line, const po::option& parsed) {
  const OptionInfo& option = find_option(parsed.string_key);
  check_taken(*line.verb, option);
  for (const GivenOption& given : line.options)
    if (given.option == &option) refuse(dashed(option) + " is given twice; expected it once");
  const GivenOption given{&option, value_of(parsed, option)};
  Job scratch;
  const std::string wrong = option.apply(scratch, line.run, given.value);
  if (!wrong.empty()) refuse(dashed(option) + " cannot be '" + given.value + "'; " + wrong);
  line.options.push_back(given);
}

bool asks_for_help(const std::vector<std::string>& words) {
  return std::ranges::any_of(
      words, [](const std::string& word) { return word == "--help" || word == "-h"; });
}

std::string canonical_command(const CommandLine& line, const Job& job) {
  std::string text(verb_info(*line.verb).name);
  text += " " + std::filesystem::path(line.operand).filename().string();
  for (const GivenOption& given : line.options) {
    if (!given.option->changes_circuit()) continue;
    text.append(" ").append(dashed(*given.option));
    if (!given.option->argument.empty()) text.append(" ").append(given.option->show(job));
  }
  return text;
}

}  // namespace

CommandLine parse(const std::vector<std::string>& words) {
  CommandLine line;
  if (words.empty()) refuse("no verb is given; `farrier --help` shows them");
  line.version = words.front() == "--version";
  if (line.version) return line;
  line.help = words.front() == "--help" || words.front() == "-h";
  if (line.help) return line;
  if (words.front().starts_with("-"))
    refuse(words.front() +
           " stands where the verb should be; expected `farrier VERB INPUT [options]`");

  line.verb = find_verb(words.front());
  const VerbInfo& info = verb_info(*line.verb);
  const std::vector<std::string> rest(words.begin() + 1, words.end());
  line.help = asks_for_help(rest);
  if (line.help) return line;
  if (!info.available)
    refuse("the verb " + std::string(info.name) + " is not available in this version");

  for (const po::option& parsed : split_words(rest)) {
    if (parsed.unregistered)
      refuse_unknown(*line.verb, parsed.original_tokens.front());
    else if (parsed.position_key >= 0)
      for (const std::string& word : parsed.value) set_operand(line, word);
    else
      add_option(line, parsed);
  }
  if (line.operand.empty())
    refuse("nothing stands behind " + std::string(info.name) + "; expected `farrier " +
           std::string(info.name) + " " + std::string(info.operands) + "`");
  std::ranges::sort(line.options, {}, &GivenOption::option);
  return line;
}

std::vector<std::string> apply_options(const CommandLine& line, Job& job) {
  std::vector<std::string> overrides;
  Run scratch;
  for (const GivenOption& given : line.options) {
    const OptionInfo& option = *given.option;
    if (!option.changes_circuit()) continue;
    const std::string before = option.show(job);
    option.apply(job, scratch, given.value);
    const std::string after = option.show(job);
    if (before != after && before != option.show(Job()))
      overrides.push_back(dashed(option) + " " + after + " replaces " + before +
                          " of the job file");
  }
  job.command = canonical_command(line, job);
  return overrides;
}

}  // namespace farrier::driver
