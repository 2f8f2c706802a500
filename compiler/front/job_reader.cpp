// One function for each element of a job file; what belongs where is checked before, by the table
// in grammar.cpp.
#include "compiler/front/job_reader.hpp"

#include <algorithm>
#include <farrier/formula.hpp>
#include <limits>
#include <optional>
#include <utility>

#include "compiler/front/grammar.hpp"
#include "compiler/front/hamiltonian_reader.hpp"
#include "compiler/front/names.hpp"
#include "compiler/front/units.hpp"
#include "compiler/front/xml_document.hpp"

namespace farrier::front {
namespace {

constexpr std::uint64_t any = std::numeric_limits<std::uint64_t>::max();
constexpr std::uint64_t most_steps = 1'000'000'000'000'000;

const Unit& unit_value(const Attribute& attribute, UnitKind kind) {
  const Unit* unit = find_unit(attribute.value, kind);
  if (unit == nullptr) {
    attribute.fail("unknown unit " + in_quotes(attribute.value) + "; " +
                   nearest_of(attribute.value, unit_words(kind)));
  }
  return *unit;
}

/// The factor that removes both units; both are given or neither.
double read_units(const Element& hamiltonian, const std::optional<Element>& evolution, Job& job) {
  const auto rate = hamiltonian.attribute("unit");
  const auto time = evolution ? evolution->attribute("unit") : std::nullopt;
  const Unit* rate_unit = rate ? &unit_value(*rate, UnitKind::rate) : nullptr;
  const Unit* time_unit = time ? &unit_value(*time, UnitKind::time) : nullptr;
  if (rate && !time) {
    rate->fail(
        "the Hamiltonian has a unit but the time has none; expected a 'unit' of <evolution>");
  }
  if (time && !rate) {
    time->fail(
        "the time has a unit but the Hamiltonian has none; expected a 'unit' of <hamiltonian>");
  }
  if (!rate) return 1.0;
  job.time_unit = time->value;
  return radians_per_time(*rate_unit, *time_unit);
}

void read_name(const Element& root, Job& job) {
  const auto attribute = root.attribute("name");
  if (!attribute) return;
  const bool control = std::any_of(attribute->value.begin(), attribute->value.end(),
                                   [](char c) { return static_cast<unsigned char>(c) < 0x20; });
  if (attribute->value.empty() || control) attribute->fail("bad name; expected a line of text");
  job.name = attribute->value;
}

void read_evolution(const Element& element, Job& job) {
  if (const auto time = element.attribute("time")) job.times = {number_value(*time)};
}

void read_budget(const Element& element, Job& job) {
  Budget& budget = job.budget;
  if (const auto found = element.attribute("tolerance")) budget.tolerance = positive_value(*found);
  if (const auto found = element.attribute("assurance")) {
    budget.assurance = word_value(*found, &parse_assurance, assurance_words());
  }
  if (const auto found = element.attribute("up-to-phase")) {
    budget.up_to_phase = word_value(*found, &parse_yes_no, yes_no_words());
  }
  if (const auto found = element.attribute("minimise")) {
    budget.minimise = word_value(*found, &parse_objective, objective_words());
  }
  if (const auto found = element.attribute("max-two-qubit-gates")) {
    budget.max_two_qubit_gates = whole_value(*found, 0, any);
  }
  if (const auto found = element.attribute("max-depth")) {
    budget.max_depth = whole_value(*found, 0, any);
  }
}

/// The pieces of a list that must hold something, each once.
std::vector<Item> list_items(const Attribute& attribute) {
  std::vector<Item> items = split(attribute.value, ", \t");
  if (items.empty()) attribute.fail("'" + std::string(attribute.name) + "' is an empty list");
  for (std::size_t k = 0; k < items.size(); ++k) {
    for (std::size_t before = 0; before < k; ++before) {
      if (items[before].text != items[k].text) continue;
      attribute.fail(in_quotes(items[k].text) + " is given twice; expected it once",
                     items[k].offset);
    }
  }
  return items;
}

void read_formulas(const Attribute& attribute, Restriction& restriction) {
  std::vector<std::string_view> known;
  for (const Formula& formula : formula_table()) known.push_back(formula.name);
  known.emplace_back("exact");
  for (const Item& item : list_items(attribute)) {
    if (item.text == "tuned") {
      attribute.fail("formula 'tuned' is not available in this version", item.offset);
    }
    if (item.text != "exact" && find_formula(item.text) == nullptr) {
      attribute.fail(
          "unknown formula " + in_quotes(item.text) + "; " + nearest_of(item.text, known),
          item.offset);
    }
    restriction.formulas.emplace_back(item.text);
  }
}

void read_orders(const Attribute& attribute, Restriction& restriction) {
  for (const Item& item : list_items(attribute)) {
    const auto order = static_cast<int>(whole_item(attribute, item, 1, 1000));
    const auto& table = formula_table();
    const bool known = std::any_of(table.begin(), table.end(), [order](const Formula& formula) {
      return formula.order == order;
    });
    if (!known) {
      attribute.fail("no formula has order " + std::to_string(order) +
                         "; expected an order that 'farrier list formulas' shows",
                     item.offset);
    }
    restriction.orders.push_back(order);
  }
}

void read_restriction(const Element& element, Job& job) {
  if (const auto found = element.attribute("formula")) read_formulas(*found, job.restriction);
  if (const auto found = element.attribute("order")) read_orders(*found, job.restriction);
  if (const auto found = element.attribute("steps")) {
    job.restriction.steps = whole_value(*found, 1, most_steps);
  }
}

void read_preparation(const Element& element, Job& job) {
  job.prepares = true;
  std::vector<bool> named(job.hamiltonian.qubits, false);
  for (const Element& child : element.children()) {
    const std::optional<State> state = parse_state(child.name());
    if (!state) throw InternalFault("state element without a state");
    const Attribute list = child.required("qubits", "0 1");
    for (const ListedQubit& listed : qubit_list(list, job.hamiltonian.qubits)) {
      if (named[listed.qubit]) {
        list.fail("qubit " + std::to_string(listed.qubit) + " is prepared twice; expected it once",
                  listed.offset);
      }
      named[listed.qubit] = true;
      if (*state != State::zero) job.preparation.push_back({listed.qubit, *state});
    }
  }
  std::sort(job.preparation.begin(), job.preparation.end(),
            [](const Prepared& a, const Prepared& b) { return a.qubit < b.qubit; });
}

void read_measurement(const Element& element, Job& job) {
  Measurement measurement;
  if (const auto found = element.attribute("basis")) {
    measurement.basis = word_value(*found, &parse_basis, basis_words());
  }
  const std::uint32_t qubits = job.hamiltonian.qubits;
  std::vector<bool> named(qubits, !element.attribute("qubits"));
  if (const auto found = element.attribute("qubits")) {
    for (const ListedQubit& listed : qubit_list(*found, qubits)) {
      if (named[listed.qubit]) {
        found->fail(
            "qubit " + std::to_string(listed.qubit) + " is measured twice; expected it once",
            listed.offset);
      }
      named[listed.qubit] = true;
    }
  }
  for (std::uint32_t k = 0; k < qubits; ++k) {
    if (named[k]) measurement.qubits.push_back(k);
  }
  job.measurement = std::move(measurement);
}

void read_output(const Element& element, Job& job) {
  OutputChoice& output = job.output;
  if (const auto found = element.attribute("style")) {
    output.style = word_value(*found, &parse_style, style_words());
  }
  if (const auto found = element.attribute("native")) {
    output.native = word_value(*found, &parse_native, native_words());
  }
  if (const auto found = element.attribute("relabel")) {
    output.relabel = word_value(*found, &parse_yes_no, yes_no_words());
  }
  if (const auto found = element.attribute("barriers")) {
    output.barriers = word_value(*found, &parse_barriers, barriers_words());
  }
}

void read_search(const Element& element, Job& job) {
  if (const auto found = element.attribute("effort")) {
    job.search.effort = word_value(*found, &parse_effort, effort_words());
  }
  if (const auto found = element.attribute("seed")) job.search.seed = whole_value(*found, 0, any);
}

/// What reads an element that may be left out, once the Hamiltonian is known.
struct Section {
  std::string_view name;
  void (*read)(const Element&, Job&);
};

constexpr Section sections[] = {
    {"evolution", read_evolution}, {"budget", read_budget},       {"restrict", read_restriction},
    {"prepare", read_preparation}, {"measure", read_measurement}, {"output", read_output},
    {"search", read_search},
};

}  // namespace

Job read_job_file(const base::SourceText& source, const std::string& directory) {
  const Document document(source);
  check_grammar(document);
  const Element root = document.root();
  Job job;
  read_name(root, job);
  const std::optional<Element> hamiltonian = root.child("hamiltonian");
  if (!hamiltonian) root.fail("<job> has no <hamiltonian>; expected one");
  const double factor = read_units(*hamiltonian, root.child("evolution"), job);
  HamiltonianText text = read_hamiltonian(*hamiltonian, source, directory, job.warnings);
  job.hamiltonian = to_hamiltonian(std::move(text.terms), text.qubits, factor, job.warnings);
  for (const Section& section : sections) {
    if (const auto element = root.child(section.name)) section.read(*element, job);
  }
  return job;
}

}  // namespace farrier::front
