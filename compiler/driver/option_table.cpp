// The tables of verbs and options. An option is a row: everything that help, errors and the
// canonical command line know of it stands there.
#include <algorithm>
#include <cstddef>
#include <farrier/formula.hpp>
#include <limits>

#include "compiler/base/numbers.hpp"
#include "compiler/driver/options.hpp"
#include "compiler/front/names.hpp"
#include "compiler/front/text.hpp"

namespace farrier::driver {
namespace {

constexpr Verbs compile_only = only(Verb::compile);
constexpr Verbs audited = only(Verb::compile) | only(Verb::audit);
constexpr Verbs planning = audited | only(Verb::survey);
constexpr Verbs reading = planning | only(Verb::inspect);

using Words = std::vector<std::string_view>;

/// "expected a, b or c"
std::string expected_one_of(const Words& words) {
  std::string text = "expected ";
  for (std::size_t k = 0; k < words.size(); ++k) {
    if (k > 0) text += k + 1 < words.size() ? ", " : " or ";
    text += words[k];
  }
  return text;
}

/// Stores a value that could be parsed; else says what was expected.
template <typename Value, typename Place>
std::string take(const std::optional<Value>& value, Place& place, const std::string& expected) {
  if (!value) return expected;
  place = *value;
  return "";
}

template <typename Value, typename Place>
std::string take(const std::optional<Value>& value, Place& place, const Words& words) {
  return take(value, place, expected_one_of(words));
}

constexpr std::uint64_t any_count = std::numeric_limits<std::uint64_t>::max();
constexpr std::uint64_t most_steps = 1'000'000'000'000'000;

template <typename Place>
std::string take_count(std::string_view text, Place& place, std::uint64_t least,
                       std::uint64_t most) {
  const auto count = base::parse_unsigned(text);
  if (!count || *count < least || *count > most)
    return "expected a whole number from " + std::to_string(least) + " to " + std::to_string(most);
  place = *count;
  return "";
}

std::string take_path(std::string_view text, std::string& place) {
  if (text.empty()) return "expected the name of a file";
  place = text;
  return "";
}

std::string take_time(Job& job, Run&, std::string_view text) {
  if (text.find_first_of(",:") != std::string_view::npos)
    return "several times are not available in this version, expected one";
  const auto time = base::parse_double(text);
  if (!time) return "expected a finite number";
  job.times = {*time};
  return "";
}

std::string take_tolerance(Job& job, Run&, std::string_view text) {
  const auto tolerance = base::parse_double(text);
  if (!tolerance || !(*tolerance > 0.0)) return "expected a finite number above 0";
  job.budget.tolerance = *tolerance;
  return "";
}

std::string take_objective(Job& job, Run&, std::string_view text) {
  return take(front::parse_objective(text), job.budget.minimise, front::objective_words());
}

/// The pieces of a list; what is wrong with it goes to `wrong`.
std::vector<std::string_view> list_items(std::string_view text, const Words& known,
                                         std::string& wrong) {
  std::vector<std::string_view> items;
  for (const front::Item& item : front::split(text, ",")) {
    const std::string where = item.text == text ? "" : "of " + front::in_quotes(item.text) + ", ";
    if (std::ranges::find(known, item.text) == known.end())
      wrong = where + front::nearest_of(item.text, known);
    else if (std::ranges::find(items, item.text) != items.end())
      wrong = front::in_quotes(item.text) + " is given twice, expected once";
    if (!wrong.empty()) return {};
    items.push_back(item.text);
  }
  if (items.empty()) wrong = "expected words with commas between them";
  return items;
}

std::string take_formulas(Job& job, Run&, std::string_view text) {
  if (text == "tuned") return "it is not available in this version";
  Words known = {"exact"};
  for (const Formula& formula : formula_table()) known.push_back(formula.name);
  std::string wrong;
  const auto items = list_items(text, known, wrong);
  job.restriction.formulas.assign(items.begin(), items.end());
  return wrong;
}

std::string take_orders(Job& job, Run&, std::string_view text) {
  std::vector<std::string> known;
  for (const Formula& formula : formula_table()) {
    const std::string order = std::to_string(formula.order);
    if (std::ranges::find(known, order) == known.end()) known.push_back(order);
  }
  std::string wrong;
  job.restriction.orders.clear();
  for (const std::string_view item : list_items(text, {known.begin(), known.end()}, wrong))
    job.restriction.orders.push_back(static_cast<int>(*base::parse_unsigned(item)));
  return wrong;
}

std::string take_threads(Job&, Run& run, std::string_view text) {
  constexpr std::uint64_t most = 1024;
  const auto count = base::parse_unsigned(text);
  if (!count || *count < 1 || *count > most)
    return "expected a whole number from 1 to " + std::to_string(most);
  run.threads = static_cast<unsigned>(*count);
  return "";
}

std::string take_progress(Job&, Run& run, std::string_view text) {
  const Words words = {"auto", "always", "never"};
  constexpr ShowProgress values[] = {ShowProgress::automatic, ShowProgress::always,
                                     ShowProgress::never};
  const auto found = std::ranges::find(words, text);
  if (found == words.end()) return expected_one_of(words);
  run.progress = values[found - words.begin()];
  return "";
}

template <typename List, typename ToText>
std::string joined(const List& list, ToText to_text) {
  std::string text;
  for (const auto& entry : list) text += (text.empty() ? "" : ",") + to_text(entry);
  return text;
}

std::string count_text(const std::optional<std::uint64_t>& count) {
  return count ? std::to_string(*count) : "";
}

}  // namespace

const std::vector<VerbInfo>& verb_table() {
  static const std::vector<VerbInfo> table = {
      {Verb::compile, "compile", "INPUT [options]", "writes the circuit of exp(-i H t)",
       "farrier compile chain.pauli --time 2 --tolerance 1e-4 -o chain.qasm", true},
      {Verb::survey, "survey", "INPUT [options]",
       "compares the alternatives, best first; writes no circuit",
       "farrier survey chain.pauli --time 2 --tolerance 1e-4", true},
      {Verb::inspect, "inspect", "INPUT [options]", "shows facts of the Hamiltonian; needs no time",
       "farrier inspect chain.pauli", true},
      {Verb::audit, "audit", "CIRCUIT --against INPUT [options]",
       "checks a circuit against its Hamiltonian", "farrier audit chain.qasm --against chain.pauli",
       false},
      {Verb::list, "list", "formulas|passes|shapes|units|natives",
       "shows the tables that the other verbs draw on", "farrier list formulas", true},
  };
  return table;
}

const VerbInfo& verb_info(Verb verb) {
  return verb_table()[static_cast<std::size_t>(verb)];
}

const std::vector<OptionInfo>& option_table() {
  static const std::vector<OptionInfo> table = {
      {"against", 0, "INPUT", "the Hamiltonian to check against", "", only(Verb::audit), nullptr,
       nullptr},
      {"input-kind", 0, "KIND", "xml|pauli|fcidump, whatever the suffix says", "", reading,
       [](Job&, Run& run, std::string_view text) {
         return take(front::parse_input_kind(text), run.kind, front::input_kind_words());
       },
       nullptr},
      {"time", 0, "T", "time, in the job's time unit", "", planning, take_time,
       [](const Job& job) { return joined(job.times, base::shortest); }},
      {"tolerance", 0, "EPS", "error budget of the whole evolution", "1e-3", planning,
       take_tolerance,
       [](const Job& job) {
         return job.budget.tolerance ? base::shortest(*job.budget.tolerance) : "";
       }},
      {"assurance", 0, "KIND", "certified|average: of any state, or rms", "certified", planning,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_assurance(text), job.budget.assurance, front::assurance_words());
       },
       [](const Job& job) { return std::string(front::to_word(job.budget.assurance)); }},
      {"up-to-phase", 0, "", "measure the error up to a global phase", "", planning,
       [](Job& job, Run&, std::string_view) {
         job.budget.up_to_phase = true;
         return std::string();
       },
       [](const Job& job) { return std::string(job.budget.up_to_phase ? "yes" : ""); }},
      {"minimise", 0, "WHAT", "gates|depth|duration|rotations|error", "gates", planning,
       take_objective,
       [](const Job& job) { return std::string(front::to_word(job.budget.minimise)); }},
      {"max-two-qubit-gates", 0, "N", "limit on two-qubit gates", "", planning,
       [](Job& job, Run&, std::string_view text) {
         return take_count(text, job.budget.max_two_qubit_gates, 0, any_count);
       },
       [](const Job& job) { return count_text(job.budget.max_two_qubit_gates); }},
      {"max-depth", 0, "N", "limit on the two-qubit depth", "", planning,
       [](Job& job, Run&, std::string_view text) {
         return take_count(text, job.budget.max_depth, 0, any_count);
       },
       [](const Job& job) { return count_text(job.budget.max_depth); }},
      {"formula", 0, "NAME,...", "only these product formulas, or exact", "", planning,
       take_formulas,
       [](const Job& job) {
         return joined(job.restriction.formulas, [](const std::string& name) { return name; });
       }},
      {"order", 0, "P,...", "only product formulas of these orders", "", planning, take_orders,
       [](const Job& job) {
         return joined(job.restriction.orders, [](int order) { return std::to_string(order); });
       }},
      {"steps", 0, "R", "this many steps; the error is reported", "", planning,
       [](Job& job, Run&, std::string_view text) {
         return take_count(text, job.restriction.steps, 1, most_steps);
       },
       [](const Job& job) { return count_text(job.restriction.steps); }},
      {"native", 0, "NAME", "cx|cz|ecr|iswap|rzz|rxx: two-qubit gate", "cx", planning,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_native(text), job.output.native, front::native_words());
       },
       [](const Job& job) { return std::string(front::to_word(job.output.native)); }},
      {"device", 0, "FILE", "route, lower and schedule for this device", "", planning, nullptr,
       nullptr},
      {"style", 0, "STYLE", "flat|looped: every gate, or a loop", "by size", audited,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_style(text), job.output.style, front::style_words());
       },
       [](const Job& job) { return std::string(front::to_word(job.output.style)); }},
      {"relabel", 0, "YES", "yes|no: qubits may end up renamed", "yes if measured", planning,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_yes_no(text), job.output.relabel, front::yes_no_words());
       },
       [](const Job& job) {
         return std::string(job.output.relabel ? front::yes_no_word(*job.output.relabel) : "");
       }},
      {"barriers", 0, "WHERE", "none|steps: barriers between steps", "none", audited,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_barriers(text), job.output.barriers, front::barriers_words());
       },
       [](const Job& job) { return std::string(front::to_word(job.output.barriers)); }},
      {"effort", 0, "EFFORT", "low|normal|high: how hard searches try", "normal", planning,
       [](Job& job, Run&, std::string_view text) {
         return take(front::parse_effort(text), job.search.effort, front::effort_words());
       },
       [](const Job& job) { return std::string(front::to_word(job.search.effort)); }},
      {"seed", 0, "S", "another draw of the searches", "1", planning,
       [](Job& job, Run&, std::string_view text) {
         return take_count(text, job.search.seed, 0, any_count);
       },
       [](const Job& job) { return std::to_string(job.search.seed); }},
      {"threads", 0, "N", "worker threads", "CPUs it may use", reading, take_threads, nullptr},
      {"memory-limit", 0, "SIZE", "refuse what would need more memory", "", reading, nullptr,
       nullptr},
      {"output", 'o', "FILE", "the circuit", "standard output", compile_only,
       [](Job&, Run& run, std::string_view text) { return take_path(text, run.output); }, nullptr},
      {"summary", 0, "FILE", "the summary as XML", "", reading,
       [](Job&, Run& run, std::string_view text) { return take_path(text, run.summary); }, nullptr},
      {"log", 0, "FILE", "the pass log as XML", "", planning,
       [](Job&, Run& run, std::string_view text) { return take_path(text, run.log); }, nullptr},
      {"report", 0, "FILE", "a report as HTML", "", only(Verb::compile) | only(Verb::survey),
       nullptr, nullptr},
      {"depfile", 0, "FILE", "dependencies of --output for Make and Ninja", "", compile_only,
       [](Job&, Run& run, std::string_view text) { return take_path(text, run.depfile); }, nullptr},
      {"share", 0, "K/N", "one of N shares of a sweep", "", compile_only, nullptr, nullptr},
      {"explain", 0, "", "show the pass log with wall times", "", planning,
       [](Job&, Run& run, std::string_view) {
         run.explain = true;
         return std::string();
       },
       nullptr},
      {"skip-check", 0, "", "skip the audit of the circuit", "", compile_only,
       [](Job&, Run&, std::string_view) { return std::string(); }, nullptr},
      {"quiet", 'q', "", "errors only: no summary, no warnings", "", reading,
       [](Job&, Run& run, std::string_view) {
         run.quiet = true;
         return std::string();
       },
       nullptr},
      {"progress", 0, "WHEN", "auto|always|never: show what takes long", "auto", reading,
       take_progress, nullptr},
  };
  return table;
}

}  // namespace farrier::driver
