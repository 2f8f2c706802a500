// The table of a job file's elements, and the walk that checks a document against it.
#include "compiler/front/grammar.hpp"

#include <algorithm>
#include <set>
#include <string>

#include "compiler/front/names.hpp"

namespace farrier::front {
namespace {

/// What a later version reads, so that nobody takes it for a misspelling.
struct Unavailable {
  std::string_view parent;
  std::string_view name;
};

constexpr Unavailable unavailable_elements[] = {
    {"job", "device"},      {"hamiltonian", "fermions"}, {"lattice", "hopping"},
    {"lattice", "density"}, {"lattice", "interaction"},
};

constexpr Unavailable unavailable_attributes[] = {
    {"evolution", "from"},
    {"evolution", "to"},
    {"evolution", "points"},
};

template <std::size_t size>
bool listed(const Unavailable (&list)[size], std::string_view parent, std::string_view name) {
  return std::any_of(std::begin(list), std::end(list), [&](const Unavailable& row) {
    return row.parent == parent && row.name == name;
  });
}

const ElementRule& rule_of(std::string_view name) {
  for (const ElementRule& rule : job_grammar()) {
    if (rule.name == name) return rule;
  }
  throw InternalFault("element without a rule: " + std::string(name));
}

bool contains(const std::vector<std::string_view>& words, std::string_view word) {
  return std::find(words.begin(), words.end(), word) != words.end();
}

void check_attributes(const Element& element, const ElementRule& rule) {
  for (const Attribute& attribute : element.attributes()) {
    if (contains(rule.attributes, attribute.name)) continue;
    const std::string what = "attribute " + in_quotes(attribute.name);
    if (listed(unavailable_attributes, rule.name, attribute.name)) {
      attribute.source->fail(attribute.name_at,
                             what + " of " + element.tag() + " is not available in this version");
    }
    attribute.source->fail(attribute.name_at, "unknown " + what + " in " + element.tag() + "; " +
                                                  nearest_of(attribute.name, rule.attributes));
  }
}

void check_text(const Document& document, const Element& element) {
  for (const Item& item : element.text()) {
    const std::size_t visible = item.text.find_first_not_of(" \t\r\n");
    if (visible == std::string_view::npos) continue;
    const std::string_view word = item.text.substr(visible);
    document.source().fail(item.offset + visible,
                           "text " + in_quotes(word.substr(0, word.find_first_of(" \t\r\n"))) +
                               " in " + element.tag() + "; expected none here");
  }
}

void check_child(const Element& parent, const ElementRule& rule, const Element& child,
                 std::set<std::string_view>& seen) {
  if (listed(unavailable_elements, rule.name, child.name())) {
    child.fail(child.tag() + " is not available in this version");
  }
  if (!contains(rule.children, child.name())) {
    child.fail("unknown element " + child.tag() + " in " + parent.tag() + "; " +
               nearest_of(child.name(), rule.children));
  }
  if (!rule_of(child.name()).repeats && !seen.insert(child.name()).second) {
    child.fail("a second " + child.tag() + " in " + parent.tag() + "; expected one");
  }
}

void check_element(const Document& document, const Element& element) {
  const ElementRule& rule = rule_of(element.name());
  check_attributes(element, rule);
  if (!rule.text) check_text(document, element);
  std::set<std::string_view> seen;
  for (const Element& child : element.children()) {
    check_child(element, rule, child, seen);
    check_element(document, child);
  }
}

std::vector<ElementRule> make_grammar() {
  std::vector<ElementRule> rules = {
      {"job",
       {"name"},
       {"hamiltonian", "evolution", "budget", "restrict", "prepare", "measure", "output",
        "search"}},
      {"hamiltonian", {"qubits", "unit"}, {"term", "terms", "lattice"}},
      {"term", {"coefficient"}, {}, true, true},
      {"terms", {"file", "scale"}, {}, true},
      {"lattice", {"shape", "size", "periodic", "first"}, {"bond", "pair", "site"}, true},
      {"bond", {"xx", "yy", "zz", "along", "distance", "seed"}, {}, true},
      {"pair", {"xx", "yy", "zz", "power", "metric", "reach", "seed"}, {}, true},
      {"site", {"x", "y", "z", "seed"}, {}, true},
      {"evolution", {"time", "unit"}, {}},
      {"budget",
       {"tolerance", "assurance", "up-to-phase", "minimise", "max-two-qubit-gates", "max-depth"},
       {}},
      {"restrict", {"formula", "order", "steps"}, {}},
      {"prepare", {}, state_words()},
      {"measure", {"basis", "qubits"}, {}},
      {"output", {"style", "native", "relabel", "barriers"}, {}},
      {"search", {"effort", "seed"}, {}},
  };
  for (const std::string_view state : state_words()) rules.push_back({state, {"qubits"}, {}, true});
  return rules;
}

}  // namespace

const std::vector<ElementRule>& job_grammar() {
  static const std::vector<ElementRule> rules = make_grammar();
  return rules;
}

void check_grammar(const Document& document) {
  const Element root = document.root();
  if (root.name() != job_grammar().front().name) {
    root.fail("unknown root element " + root.tag() + "; expected <job>");
  }
  check_element(document, root);
}

}  // namespace farrier::front
