// Settings of job files: what each element sets, what stands where nothing is said, and mistakes.
#include "compiler/front/job_reader.hpp"

#include <doctest/doctest.h>

#include <numbers>

#include "tests/compiler/front/support.hpp"

using namespace farrier;
using test::terms;
using test::xml;
using test::xml_message;

namespace {

/// A job on four qubits with more elements behind its Hamiltonian.
std::string job(const std::string& rest) {
  return test::job_text("<hamiltonian qubits='4'><term coefficient='1'>X0</term></hamiltonian>\n",
                        rest);
}

std::string with_units(const std::string& rate, const std::string& time) {
  return test::job_text("<hamiltonian" + rate + "><term coefficient='1'>X0</term></hamiltonian>\n",
                        time);
}

}  // namespace

TEST_CASE("the documented job reads as documented") {
  const Job found = xml(R"(<job name="ladder-quench">
  <hamiltonian qubits="8" unit="MHz">
    <term coefficient="0.5">X0 X1</term>
    <lattice shape="ladder" size="4" periodic="no" first="0">
      <bond xx="1" yy="1" zz="0.8"/>
      <site z="0.25"/>
    </lattice>
  </hamiltonian>
  <evolution time="2.0" unit="us"/>
  <budget tolerance="1e-3" assurance="certified" minimise="gates"/>
  <restrict order="2,4"/>
  <prepare><one qubits="1 3 5"/><plus qubits="0"/></prepare>
  <measure basis="z" qubits="all"/>
  <output style="flat" native="cz" relabel="no"/>
  <search effort="high" seed="3"/>
</job>)");
  CHECK(found.name == "ladder-quench");
  CHECK(found.hamiltonian.qubits == 8);
  CHECK(found.hamiltonian.sum.size() == 10 * 3 + 8);
  CHECK(found.hamiltonian.sum.coefficient(0) == 1.5 * 2.0 * std::numbers::pi);
  CHECK(found.time_unit == "us");
  CHECK(found.times == std::vector<double>{2.0});
  CHECK(found.budget.tolerance == 1e-3);
  CHECK(found.budget.assurance == Assurance::certified);
  CHECK(found.budget.minimise == Objective::gates);
  CHECK(found.restriction.orders == std::vector<int>{2, 4});
  CHECK(found.prepares);
  REQUIRE(found.preparation.size() == 4);
  CHECK(found.preparation[0].qubit == 0);
  CHECK(found.preparation[0].state == State::plus);
  CHECK(found.preparation[3].qubit == 5);
  CHECK(found.preparation[3].state == State::one);
  REQUIRE(found.measurement);
  CHECK(found.measurement->basis == Basis::z);
  CHECK(found.measurement->qubits == std::vector<std::uint32_t>{0, 1, 2, 3, 4, 5, 6, 7});
  CHECK(found.output.style == Style::flat);
  CHECK(found.output.native == Native::cz);
  CHECK(found.output.relabel == false);
  CHECK(found.search.effort == Effort::high);
  CHECK(found.search.seed == 3);
  CHECK(found.warnings.empty());
}

TEST_CASE("what is not said stays open") {
  const Job found = xml(job(""));
  CHECK(found.name == "input");
  CHECK(found.time_unit.empty());
  CHECK(found.times.empty());
  CHECK_FALSE(found.budget.tolerance);
  CHECK_FALSE(found.budget.up_to_phase);
  CHECK_FALSE(found.budget.max_depth);
  CHECK_FALSE(found.restriction.any());
  CHECK(found.output.style == Style::automatic);
  CHECK_FALSE(found.output.relabel);
  CHECK(found.output.barriers == Barriers::none);
  CHECK(found.search.effort == Effort::normal);
  CHECK_FALSE(found.prepares);
  CHECK_FALSE(found.measurement);
}

TEST_CASE("budgets and restrictions are taken over") {
  const Job found = xml(job(
      "<budget assurance='average' up-to-phase='yes' minimise='depth' max-two-qubit-gates='100' "
      "max-depth='0'/><restrict formula='lie, strang,exact' order='1' steps='10'/>"
      "<output barriers='steps' relabel='yes'/><evolution time='-1.5'/>"));
  CHECK(found.budget.assurance == Assurance::average);
  CHECK(found.budget.up_to_phase);
  CHECK(found.budget.minimise == Objective::depth);
  CHECK(found.budget.max_two_qubit_gates == 100);
  CHECK(found.budget.max_depth == 0);
  CHECK(found.restriction.formulas == std::vector<std::string>{"lie", "strang", "exact"});
  CHECK(found.restriction.orders == std::vector<int>{1});
  CHECK(found.restriction.steps == 10);
  CHECK(found.output.barriers == Barriers::steps);
  CHECK(found.output.relabel == true);
  CHECK(found.times == std::vector<double>{-1.5});
}

TEST_CASE("preparation is sorted and leaves out zeros") {
  const Job found =
      xml(job("<prepare><minus-i qubits='3'/><zero qubits='2'/><plus-i qubits='1'/>"
              "</prepare><measure basis='y' qubits='2 0'/>"));
  REQUIRE(found.preparation.size() == 2);
  CHECK(found.preparation[0].qubit == 1);
  CHECK(found.preparation[0].state == State::plus_i);
  CHECK(found.preparation[1].qubit == 3);
  CHECK(found.preparation[1].state == State::minus_i);
  CHECK(found.measurement->basis == Basis::y);
  CHECK(found.measurement->qubits == std::vector<std::uint32_t>{0, 2});
  CHECK(xml(job("<prepare/>")).prepares);
  CHECK(xml(job("<measure/>")).measurement->qubits.size() == 4);
}

TEST_CASE("units leave radians per time unit") {
  const Job both = xml(with_units(" unit='GHz'", "<evolution unit='ns'/>"));
  CHECK(both.hamiltonian.sum.coefficient(0) == 2.0 * std::numbers::pi);
  CHECK(both.time_unit == "ns");
  CHECK(both.times.empty());
  CHECK(terms(xml(with_units("", "<evolution time='1'/>"))) == "1 X0");
}

TEST_CASE("mistakes in settings are shown where they stand") {
  const struct {
    std::string rest;
    const char* expected;
  } cases[] = {
      {"<evolution time='soon'/>",
       "65 2:18: error: bad value 'soon' of 'time'; expected a finite number"},
      {"<evolution time='nan'/>",
       "65 2:18: error: bad value 'nan' of 'time'; expected a finite number"},
      {"<evolution time='1' from='0'/>",
       "65 2:21: error: attribute 'from' of <evolution> is not available in this version"},
      {"<budget tolerance='-1e-3'/>",
       "65 2:20: error: bad value '-1e-3' of 'tolerance'; expected a number above 0"},
      {"<budget assurance='certain'/>",
       "65 2:20: error: unknown value 'certain' of 'assurance'; known are certified, average"},
      {"<budget up-to-phase='true'/>",
       "65 2:22: error: unknown value 'true' of 'up-to-phase'; known are yes, no"},
      {"<budget minimise='gate'/>",
       "65 2:19: error: unknown value 'gate' of 'minimise'; the nearest known one is 'gates'"},
      {"<budget max-depth='-1'/>",
       "65 2:20: error: bad value '-1' of 'max-depth'; expected a whole number from 0 to "
       "18446744073709551615"},
      {"<restrict formula=''/>", "65 2:20: error: 'formula' is an empty list"},
      {"<restrict formula='lie,strong'/>",
       "65 2:24: error: unknown formula 'strong'; the nearest known one is 'strang'"},
      {"<restrict formula='tuned'/>",
       "65 2:20: error: formula 'tuned' is not available in this version"},
      {"<restrict formula='lie lie'/>", "65 2:24: error: 'lie' is given twice; expected it once"},
      {"<restrict order='2,x'/>",
       "65 2:20: error: bad value 'x' of 'order'; expected a whole number from 1 to 1000"},
      {"<restrict order='999'/>",
       "65 2:18: error: no formula has order 999; expected an order that 'farrier list formulas' "
       "shows"},
      {"<restrict steps='0'/>",
       "65 2:18: error: bad value '0' of 'steps'; expected a whole number from 1 to "
       "1000000000000000"},
      {"<prepare><one qubits='4'/></prepare>",
       "65 2:23: error: qubit 4 is out of range; expected 0 to 3 for 4 qubits"},
      {"<prepare><one/></prepare>",
       "65 2:11: error: <one> has no attribute 'qubits'; expected qubits=\"0 1\""},
      {"<prepare><one qubits='0'/><zero qubits='1 0'/></prepare>",
       "65 2:43: error: qubit 0 is prepared twice; expected it once"},
      {"<measure qubits='1-3 2'/>", "65 2:22: error: qubit 2 is measured twice; expected it once"},
      {"<measure basis='w'/>",
       "65 2:17: error: unknown value 'w' of 'basis'; the nearest known one is 'x'"},
      {"<output style='round'/>",
       "65 2:16: error: unknown value 'round' of 'style'; known are flat, looped"},
      {"<output native='cnot'/>",
       "65 2:17: error: unknown value 'cnot' of 'native'; known are cx, cz, ecr, iswap, rzz, rxx"},
      {"<output relabel='maybe'/>",
       "65 2:18: error: unknown value 'maybe' of 'relabel'; known are yes, no"},
      {"<output barriers='all'/>",
       "65 2:19: error: unknown value 'all' of 'barriers'; known are none, steps"},
      {"<search effort='highest'/>",
       "65 2:17: error: unknown value 'highest' of 'effort'; the nearest known one is 'high'"},
      {"<search seed='1.5'/>",
       "65 2:15: error: bad value '1.5' of 'seed'; expected a whole number from 0 to "
       "18446744073709551615"},
      {"<evolution unit='us'/>",
       "65 2:18: error: the time has a unit but the Hamiltonian has none; expected a 'unit' of "
       "<hamiltonian>"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.rest);
    CHECK(xml_message(job(row.rest)) == row.expected);
  }
}

TEST_CASE("mistakes in names and units are shown where they stand") {
  CHECK(xml_message("<job/>") == "65 1:2: error: <job> has no <hamiltonian>; expected one");
  CHECK(xml_message("<job name=''/>") == "65 1:12: error: bad name; expected a line of text");
  CHECK(xml_message("<job name='a&#10;b'/>") ==
        "65 1:12: error: bad name; expected a line of text");
  const std::string missing =
      "65 1:25: error: the Hamiltonian has a unit but the time has none; expected a 'unit' of "
      "<evolution>";
  CHECK(xml_message(with_units(" unit='MHz'", "")) == missing);
  CHECK(xml_message(with_units(" unit='MHz'", "<evolution time='1'/>")) == missing);
  CHECK(xml_message(with_units(" unit='mhz'", "<evolution unit='us'/>")) ==
        "65 1:25: error: unknown unit 'mhz'; the nearest known one is 'MHz'");
  CHECK(xml_message(with_units(" unit='MHz'", "<evolution unit='MHz'/>")) ==
        "65 2:18: error: unknown unit 'MHz'; known are s, ms, us, ns, ps, fs");
}
