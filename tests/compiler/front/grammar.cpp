// What belongs where in a job file.
#include "compiler/front/grammar.hpp"

#include <doctest/doctest.h>

#include <set>

#include "tests/compiler/front/support.hpp"

using namespace farrier;
using namespace farrier::front;
using test::xml_message;

TEST_CASE("the table of elements is closed and without repetition") {
  std::set<std::string_view> names;
  for (const ElementRule& rule : job_grammar()) CHECK(names.insert(rule.name).second);
  std::set<std::string_view> children = {"job"};
  for (const ElementRule& rule : job_grammar()) {
    children.insert(rule.children.begin(), rule.children.end());
  }
  CHECK(children == names);
}

TEST_CASE("what does not belong is shown where it stands") {
  const struct {
    const char* text;
    const char* expected;
  } cases[] = {
      {"<jobs/>", "65 1:2: error: unknown root element <jobs>; expected <job>"},
      {"<job><hamilton/></job>",
       "65 1:7: error: unknown element <hamilton> in <job>; the nearest "
       "known one is 'hamiltonian'"},
      {"<job><x-y-z-x-y-z/></job>",
       "65 1:7: error: unknown element <x-y-z-x-y-z> in <job>; known are hamiltonian, evolution, "
       "budget, restrict, prepare, measure, output, search"},
      {"<job><hamiltonian/><hamiltonian/></job>",
       "65 1:21: error: a second <hamiltonian> in <job>; expected one"},
      {"<job><search/><search/></job>", "65 1:16: error: a second <search> in <job>; expected one"},
      {"<job title='a'/>", "65 1:6: error: unknown attribute 'title' in <job>; known are name"},
      {"<job><evolution times='1'/></job>",
       "65 1:17: error: unknown attribute 'times' in <evolution>; the nearest known one is 'time'"},
      {"<job><prepare qubits='1'/></job>",
       "65 1:15: error: unknown attribute 'qubits' in <prepare>; none is known here"},
      {"<job><prepare><plus-j/></prepare></job>",
       "65 1:16: error: unknown element <plus-j> in <prepare>; the nearest known one is 'plus-i'"},
      {"<job><hamiltonian><bond zz='1'/></hamiltonian></job>",
       "65 1:20: error: unknown element <bond> in <hamiltonian>; known are term, terms, lattice"},
      {"<job>\n text</job>", "65 2:2: error: text 'text' in <job>; expected none here"},
      {"<job><budget><![CDATA[x y]]></budget></job>",
       "65 1:23: error: text 'x' in <budget>; expected none here"},
      {"<job><hamiltonian><term coefficient='1'>X0<b/></term></hamiltonian></job>",
       "65 1:44: error: unknown element <b> in <term>; none is known here"},
      {"<job><device file='a.xml'/></job>",
       "65 1:7: error: <device> is not available in this version"},
      {"<job><hamiltonian><fermions file='a'/></hamiltonian></job>",
       "65 1:20: error: <fermions> is not available in this version"},
      {"<job><hamiltonian><lattice shape='chain' size='2'><hopping/></lattice></hamiltonian></job>",
       "65 1:52: error: <hopping> is not available in this version"},
      {"<job><evolution time='1' points='9'/></job>",
       "65 1:26: error: attribute 'points' of <evolution> is not available in this version"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.text);
    CHECK(xml_message(row.text) == row.expected);
  }
}

TEST_CASE("comments and blanks may stand anywhere") {
  CHECK(xml_message("<?xml version=\"1.0\"?>\n<!-- a --><job> <!-- b -->\n <hamiltonian>\n"
                    "<term coefficient=\"1\"> X0\n </term> <!-- c --> </hamiltonian>\n"
                    "<prepare> </prepare></job>\n<!-- d -->\n") == "accepted");
}
