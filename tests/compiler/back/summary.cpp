// Summary, survey and facts, as XML read back by an XML reader and as text.
#include "compiler/back/summary.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <pugixml.hpp>

#include "compiler/back/text.hpp"
#include "compiler/base/numbers.hpp"
#include "sample.hpp"

using namespace farrier;

namespace {

pugi::xml_document parsed(const std::string& text) {
  pugi::xml_document document;
  const pugi::xml_parse_result outcome = document.load_string(text.c_str());
  REQUIRE_MESSAGE(outcome, outcome.description());
  return document;
}

std::string attribute(const pugi::xml_node& node, const char* name) {
  REQUIRE_MESSAGE(node.attribute(name), name);
  return node.attribute(name).value();
}

void check_width(const std::string& text) {
  for (const std::string& line : sample::lines(text)) {
    CHECK_MESSAGE(back::columns(line) <= back::line_width, line);
    if (!line.empty()) CHECK_MESSAGE(line.back() != ' ', line);
  }
}

}  // namespace

TEST_CASE("the summary as XML, to the letter") {
  CHECK(back::summary_xml(sample::result(), {"out.qasm"}) ==
        R"(<?xml version="1.0" encoding="UTF-8"?>
<summary program="farrier" version="0.1.0" verb="compile" job="ladder-quench" digest="0123456789abcdef">
  <hamiltonian qubits="3" terms="3" max-weight="2" norm1-time="3.5" groups="2" />
  <point index="1" time="-2">
    <plan formula="strang" order="2" steps="4" layers="2" stages="1" />
    <error assurance="certified" metric="spectral norm" bound="0.000987655" tolerance="0.001" />
    <contribution name="leading" value="0.0007" method="windows of 8 qubits" counts="yes">
      <contribution name="bulk" value="0.0006" method="shift-invariant" counts="no" />
      <contribution name="edges" value="0.000100000000001" method="" counts="no" />
    </contribution>
    <contribution name="next order" value="0.000200000000001" method="1-norm" counts="yes" />
    <contribution name="remainder" value="8.70000000001e-05" method="anticommuting sets" counts="yes" />
    <contribution name="rounding" value="6.54321e-07" method="" counts="yes" />
    <yardstick name="published commutator bound" steps="12" />
    <circuit file="out.qasm" style="flat" gates="36" one-qubit-gates="20" two-qubit-gates="16" rotations="12" t-rotations="11" depth="30" two-qubit-depth="14" qubits="3" swaps="0" layout-in="0 1 2" layout-out="1 0 2" />
    <step two-qubit-gates="4" two-qubit-depth="3" />
    <gate name="h" count="8" />
    <gate name="rz" count="12" />
    <gate name="cx" count="16" />
  </point>
</summary>
)");
}

TEST_CASE("contributions that count add up to the bound, shares to their summand") {
  const pugi::xml_document document = parsed(back::summary_xml(sample::result(), {}));
  const pugi::xml_node point = document.child("summary").child("point");
  double sum = 0.0;
  double shares = 0.0;
  for (const pugi::xml_node node : point.children("contribution")) {
    CHECK(attribute(node, "counts") == "yes");
    sum += base::parse_double(attribute(node, "value")).value();
    for (const pugi::xml_node share : node.children("contribution")) {
      CHECK(attribute(share, "counts") == "no");
      shares += base::parse_double(attribute(share, "value")).value();
    }
  }
  CHECK(sum == doctest::Approx(9.87654321e-4).epsilon(1e-11));
  CHECK(sum >= 9.87654321e-4);
  CHECK(shares == doctest::Approx(7e-4).epsilon(1e-11));
  CHECK_FALSE(point.child("circuit").attribute("file"));
}

TEST_CASE("a printed bound is not below the value and stays within the tolerance") {
  Result result = sample::result();
  const double bound = std::nextafter(1e-3, 0.0);
  result.points[0].plan.certificate.bound = bound;
  const pugi::xml_document document = parsed(back::summary_xml(result, {}));
  const std::string text =
      attribute(document.child("summary").child("point").child("error"), "bound");
  CHECK(base::parse_double(text).value() >= bound);
  CHECK(base::parse_double(text).value() <= 1e-3);
}

TEST_CASE("without a tolerance none is claimed") {
  Result result = sample::result();
  result.settings.budget.tolerance.reset();
  const pugi::xml_document document = parsed(back::summary_xml(result, {}));
  CHECK_FALSE(document.child("summary").child("point").child("error").attribute("tolerance"));
  CHECK(back::summary_text(result, {}).find("tolerance none") != std::string::npos);
}

TEST_CASE("the metric is named") {
  Certificate certificate;
  CHECK(back::metric_words(certificate) == "spectral norm");
  certificate.up_to_phase = true;
  CHECK(back::metric_words(certificate) == "spectral norm up to a global phase");
  certificate.assurance = Assurance::average;
  CHECK(back::metric_words(certificate) ==
        "root mean square over random states up to a global phase");
  CHECK(back::assurance_word(Assurance::average) == "average");
}

TEST_CASE("parts that differ make a mixed plan") {
  Plan plan;
  CHECK(back::headline(plan).formula == "exact");
  CHECK(back::headline(plan).order == 0);
  CHECK(back::headline(plan).steps == 1);
  plan.parts = {sample::part("exact", 0, 1, {0, 1}), sample::part("suzuki-4", 4, 3, {2, 3}),
                sample::part("strang", 2, 9, {4, 5})};
  const back::Headline words = back::headline(plan);
  CHECK(words.formula == "mixed");
  CHECK(words.order == 2);
  CHECK(words.steps == 9);
  CHECK(words.layers == 2);
  plan.parts.erase(plan.parts.begin(), plan.parts.begin() + 2);
  CHECK(back::headline(plan).formula == "strang");

  Result result = sample::result();
  result.points[0].plan.parts = {sample::part("exact", 0, 1, {0, 1}),
                                 sample::part("strang", 2, 9, {2, 3})};
  const pugi::xml_document document = parsed(back::summary_xml(result, {}));
  const pugi::xml_node part = document.child("summary").child("point").child("part");
  CHECK(attribute(part, "qubits") == "0 1");
  CHECK(attribute(part, "terms") == "4");
  CHECK(attribute(part, "formula") == "exact");
  CHECK(attribute(part, "reason") == "commuting");
  CHECK(attribute(part, "bound") == "0");
  CHECK_FALSE(part.next_sibling("part").attribute("reason"));
}

TEST_CASE("odd names survive in XML") {
  Result result = sample::result();
  result.job = "a<b>&\"c'\n\x01 \xc2\xb5";
  const std::string text = back::summary_xml(result, {"x<1>&\".qasm"});
  const pugi::xml_document document = parsed(text);
  CHECK(attribute(document.child("summary"), "job") == "a<b>&\"c'   \xc2\xb5");
  CHECK(attribute(document.child("summary").child("point").child("circuit"), "file") ==
        "x<1>&\".qasm");
  CHECK(text.find("&#") == std::string::npos);  // XML 1.0 has no reference to control characters
}

TEST_CASE("the summary as text, to the letter") {
  CHECK(back::summary_text(sample::result(), {"out.qasm"}) ==
        R"(ladder-quench: 3 qubits, 3 terms of weight up to 2
  time       -2 us (times the 1-norm of H: 3.5 rad)
  plan       strang of order 2, 4 steps, 2 layers
  error      0.000987655 at most, certified in spectral norm; tolerance 0.001
             0.0007 leading (windows of 8 qubits)
             0.000200001 next order (1-norm)
             8.70001e-05 remainder (anticommuting sets)
             6.54321e-07 rounding
  yardsticks 12 steps by the published commutator bound
  two-qubit  16, 4 a step; depth 14
  gates      36; depth 30
  rotations  12, 11 of them by no multiple of pi/4
  circuit    flat, out.qasm
)");
}

TEST_CASE("the text of a point stays short and narrow whatever the plan") {
  Result result = sample::result();
  Plan& plan = result.points[0].plan;
  for (int k = 0; k < 30; ++k) {
    plan.parts.push_back(sample::part("suzuki-4", 4, 3, {2, 3}));
    plan.certificate.contributions.push_back({"more", 1e-9, "1-norm", true});
    plan.yardsticks.push_back({"published tail bound", 20});
  }
  const std::string text = back::summary_text(result, {"out.qasm"});
  CHECK(sample::lines(text).size() <= 22);
  CHECK(text.find("in 30 more") != std::string::npos);
  CHECK(text.find("and 28 parts more") != std::string::npos);
  check_width(text);
}

TEST_CASE("the survey as text, to the letter") {
  CHECK(back::survey_text(sample::result()) ==
        R"(ladder-quench: 3 qubits, 3 terms of weight up to 2

time -2 us, tolerance 0.001
                                               certified  two-qubit                two-qubit
rank  formula  layering  layer order  steps        error      gates  gates  depth      depth  rotations  verdict
   1  strang   pairs     as given         4  0.000987655         16     36     30         14         12  chosen
   2  lie      pairs     as given         4  0.000987655          -      -      -          -          -  more gates
)");
}

TEST_CASE("the survey as XML has a row a candidate") {
  const pugi::xml_document document = parsed(back::survey_xml(sample::result()));
  const pugi::xml_node root = document.child("summary");
  CHECK(attribute(root, "verb") == "survey");
  const pugi::xml_node first = root.child("point").child("candidate");
  CHECK(attribute(first, "rank") == "1");
  CHECK(attribute(first, "formula") == "strang");
  CHECK(attribute(first, "order") == "2");
  CHECK(attribute(first, "steps") == "4");
  CHECK(attribute(first, "layering") == "pairs");
  CHECK(attribute(first, "layer-order") == "as given");
  CHECK(attribute(first, "bound") == "0.000987655");
  CHECK(attribute(first, "two-qubit-gates") == "16");
  CHECK(attribute(first, "verdict") == "chosen");
  const pugi::xml_node second = first.next_sibling("candidate");
  CHECK(attribute(second, "rank") == "2");
  CHECK_FALSE(second.attribute("two-qubit-gates"));
  CHECK(attribute(second, "step-two-qubit-gates") == "4");
  CHECK_FALSE(second.next_sibling());
}

TEST_CASE("the facts as text, to the letter") {
  CHECK(back::facts_text(sample::facts()) ==
        R"(ladder-quench: 6 qubits, 7 terms of weight up to 2
  digest     0123456789abcdef
  constant   -0.5
  1-norm     1.75 rad a time unit
  terms      3 of weight 1, 4 of weight 2
  groups     2 of commuting terms
  pairs      4 of qubits that share a term, in 2 layers
  parts      qubits 0-3
             qubits 5
  structure  none found, which does not mean that there is none
)");
  Facts facts = sample::facts();
  facts.structure = {"all terms commute"};
  facts.pair_layers = 0;
  facts.components.assign(100, {0});
  const std::string text = back::facts_text(facts);
  CHECK(text.find("  structure  all terms commute\n") != std::string::npos);
  CHECK(text.find("share a term\n") != std::string::npos);
  CHECK(text.find("and 94 parts more\n") != std::string::npos);
  check_width(text);
}

TEST_CASE("the facts as XML, to the letter") {
  Facts facts = sample::facts();
  facts.structure = {"all terms commute"};
  CHECK(back::facts_xml(facts) ==
        R"(<?xml version="1.0" encoding="UTF-8"?>
<summary program="farrier" version="0.1.0" verb="inspect" job="ladder-quench" digest="0123456789abcdef">
  <hamiltonian qubits="6" terms="7" max-weight="2" constant="-0.5" norm1="1.75" groups="2" interacting-pairs="4" pair-layers="2" />
  <weight letters="1" terms="3" />
  <weight letters="2" terms="4" />
  <component qubits="0 1 2 3" />
  <component qubits="5" />
  <structure found="all terms commute" />
</summary>
)");
}

TEST_CASE("times and tolerances as text") {
  CHECK(back::time_text(0.1, "us") == "0.1 us");
  CHECK(back::time_text(-1.0, "") == "-1");
  CHECK(back::tolerance_text({}) == "none");
  CHECK(back::tolerance_text(1e-3) == "0.001");
}
