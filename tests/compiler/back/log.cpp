// The pass log as text and as XML.
#include "compiler/back/log.hpp"

#include <doctest/doctest.h>

#include <pugixml.hpp>

#include "compiler/back/text.hpp"
#include "compiler/base/numbers.hpp"
#include "sample.hpp"

using namespace farrier;

TEST_CASE("the log as text, to the letter") {
  CHECK(back::log_text(sample::result()) ==
        R"(ladder-quench, time -2 us
  merge_terms                                                            0.12 ms
    adds up equal terms
    - 3 terms, none of them twice
  cancel_gates                                                            1.50 s
    removes gates that undo each other
    gates 38 -> 36, two-qubit-gates 18 -> 16, depth 30, rotations 12
  all passes                                                              1.50 s
  certificate: at most 0.000987655, certified in spectral norm, the sum of
    + 0.0007 leading (windows of 8 qubits)
        of which 0.0006 bulk (shift-invariant)
        of which 0.000100001 edges
    + 0.000200001 next order (1-norm)
    + 8.70001e-05 remainder (anticommuting sets)
    + 6.54321e-07 rounding
  yardstick: 12 steps by the published commutator bound
)");
}

TEST_CASE("the log as XML, to the letter and without times") {
  Result result = sample::result();
  const std::string text = back::log_xml(result, "compile");
  CHECK(text ==
        R"(<?xml version="1.0" encoding="UTF-8"?>
<log program="farrier" version="0.1.0" verb="compile" job="ladder-quench">
  <point index="1" time="-2">
    <pass name="merge_terms" description="adds up equal terms">
      <note>3 terms, none of them twice</note>
    </pass>
    <pass name="cancel_gates" description="removes gates that undo each other">
      <before gates="38" two-qubit-gates="18" depth="30" rotations="12" />
      <after gates="36" two-qubit-gates="16" depth="30" rotations="12" />
    </pass>
    <certificate assurance="certified" metric="spectral norm" bound="0.000987655">
      <contribution name="leading" value="0.0007" method="windows of 8 qubits" counts="yes">
        <contribution name="bulk" value="0.0006" method="shift-invariant" counts="no" />
        <contribution name="edges" value="0.000100000000001" method="" counts="no" />
      </contribution>
      <contribution name="next order" value="0.000200000000001" method="1-norm" counts="yes" />
      <contribution name="remainder" value="8.70000000001e-05" method="anticommuting sets" counts="yes" />
      <contribution name="rounding" value="6.54321e-07" method="" counts="yes" />
    </certificate>
    <yardstick name="published commutator bound" steps="12" />
  </point>
</log>
)");
  for (PassEntry& pass : result.points[0].log) pass.seconds = 77.0;
  CHECK(back::log_xml(result, "compile") == text);
}

TEST_CASE("notes with markup and control characters come back from XML") {
  Result result = sample::result();
  result.points[0].log[0].notes = {"a < b && c\n]]> \x02"};
  pugi::xml_document document;
  REQUIRE(document.load_string(back::log_xml(result, "compile").c_str()));
  CHECK(std::string(document.child("log").child("point").child("pass").child_value("note")) ==
        "a < b && c ]]>  ");
}

TEST_CASE("long notes are wrapped") {
  Result result = sample::result();
  std::string note;
  for (int k = 0; k < 60; ++k) note += "window " + std::to_string(k) + " ";
  result.points[0].log[0].notes = {note};
  for (const std::string& line : sample::lines(back::log_text(result))) {
    CHECK(back::columns(line) <= back::line_width);
  }
}

TEST_CASE("a result without points is an empty log") {
  Result result;
  result.job = "dimer";
  CHECK(back::log_text(result).empty());
  CHECK(back::log_xml(result, "inspect")
            .find("<log program=\"farrier\" version=\"0.1.0\" verb=\"inspect\" job=\"dimer\" />") !=
        std::string::npos);
}
