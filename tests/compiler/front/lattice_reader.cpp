// Lattices in job files: strengths, disorder against a direct use of the generator, and mistakes.
#include "compiler/front/lattice_reader.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <map>
#include <random>

#include "tests/compiler/front/support.hpp"

using namespace farrier;
using test::terms;
using test::xml;
using test::xml_message;

namespace {

std::string lattice(const std::string& attributes, const std::string& children) {
  return test::job_text("<hamiltonian><lattice " + attributes + ">" + children +
                        "</lattice></hamiltonian>");
}

/// The value that the documentation promises for the next draw.
double draw(std::mt19937_64& generator, double low, double high) {
  return low + (high - low) * (double(generator() >> 11) / 9007199254740992.0);  // 2^53
}

std::map<std::string, double> by_string(const Job& job) {
  std::map<std::string, double> result;
  const PauliSum& sum = job.hamiltonian.sum;
  for (std::size_t k = 0; k < sum.size(); ++k) {
    result[to_text(sum.factors(k))] = sum.coefficient(k);
  }
  return result;
}

}  // namespace

TEST_CASE("couplings and fields become terms") {
  CHECK(terms(xml(lattice("shape='chain' size='3'", "<bond xx='1' zz='-2'/><site z='0.25'/>"))) ==
        "1 X0 X1; 0.25 Z0; -2 Z0 Z1; 1 X1 X2; 0.25 Z1; -2 Z1 Z2; 0.25 Z2");
  CHECK(terms(xml(lattice("shape='ring' size='3' first='2'", "<bond yy='1'/>"))) ==
        "1 Y2 Y3; 1 Y2 Y4; 1 Y3 Y4");
  CHECK(terms(xml(lattice("shape='ladder' size='2'", "<bond along='rung' zz='1'/>"))) ==
        "1 Z0 Z1; 1 Z2 Z3");
  CHECK(terms(xml(lattice("shape='chain' size='4'", "<bond distance='2' zz='1'/>"))) ==
        "1 Z0 Z2; 1 Z1 Z3");
  CHECK(
      terms(xml(lattice("shape='complete' size='3'", "<bond zz='1'/><pair zz='1' power='3'/>"))) ==
      "2 Z0 Z1; 2 Z0 Z2; 2 Z1 Z2");
  CHECK(xml(lattice("shape='grid' size='3 2' first='4'", "<bond zz='1'/>")).hamiltonian.qubits ==
        10);
}

TEST_CASE("pairs fall off with a power of the distance") {
  // 1/2^3 and 1/3^3.
  CHECK(terms(xml(lattice("shape='chain' size='4'", "<pair zz='1' power='3'/>"))) ==
        "1 Z0 Z1; 0.125 Z0 Z2; 0.037037037037037035 Z0 Z3; 1 Z1 Z2; 0.125 Z1 Z3; 1 Z2 Z3");
  // On a ring of five no pair is further than two.
  CHECK(terms(xml(lattice("shape='ring' size='5'", "<pair zz='8' power='3' reach='2'/>"))) ==
        "8 Z0 Z1; 1 Z0 Z2; 1 Z0 Z3; 8 Z0 Z4; 8 Z1 Z2; 1 Z1 Z3; 1 Z1 Z4; 8 Z2 Z3; 1 Z2 Z4; "
        "8 Z3 Z4");
  // The diagonal of a square: sqrt(2) in the plane, two bonds in the graph.
  const auto plane = by_string(xml(lattice("shape='grid' size='2 2'", "<pair zz='1' power='6'/>")));
  CHECK(plane.at("Z0 Z3") == 0.125);
  const auto graph =
      by_string(xml(lattice("shape='grid' size='2 2'", "<pair zz='1' power='1' metric='graph'/>")));
  CHECK(graph.at("Z0 Z3") == 0.5);
  CHECK(terms(xml(lattice("shape='grid' size='2 2'", "<pair xx='1' reach='1.4'/>"))) ==
        terms(xml(lattice("shape='grid' size='2 2'", "<bond xx='1'/>"))));
  CHECK(by_string(xml(lattice("shape='grid' size='2 2'", "<pair zz='1'/>"))).size() == 6);
}

TEST_CASE("the generator is the one that the language standard fixes") {
  std::mt19937_64 generator;
  generator.discard(9999);
  CHECK(generator() == 9981545732273789042ULL);  // [rand.predef]
}

TEST_CASE("fields are drawn site by site and letter by letter") {
  const auto found = by_string(
      xml(lattice("shape='chain' size='5'", "<site z='-1..1' y='0.5' x='2..2.5' seed='7'/>")));
  std::mt19937_64 generator(7);
  for (int site = 0; site < 5; ++site) {
    const std::string index = std::to_string(site);
    CHECK(found.at("X" + index) == draw(generator, 2.0, 2.5));
    CHECK(found.at("Y" + index) == 0.5);
    CHECK(found.at("Z" + index) == draw(generator, -1.0, 1.0));
  }
}

TEST_CASE("couplings are drawn bond by bond and the seed is one where none is given") {
  const auto found =
      by_string(xml(lattice("shape='ring' size='4'", "<bond xx='0..1' zz='-2..-1'/>")));
  std::mt19937_64 generator(1);
  for (const char* bond : {"0 1", "1 2", "2 3", "0 3"}) {
    const std::string a(1, bond[0]);
    const std::string b(1, bond[2]);
    CHECK(found.at("X" + a + " X" + b) == draw(generator, 0.0, 1.0));
    CHECK(found.at("Z" + a + " Z" + b) == draw(generator, -2.0, -1.0));
  }
  const auto pairs =
      by_string(xml(lattice("shape='chain' size='3'", "<pair zz='1..2' power='2' seed='5'/>")));
  std::mt19937_64 other(5);
  CHECK(pairs.at("Z0 Z1") == draw(other, 1.0, 2.0));
  CHECK(pairs.at("Z0 Z2") == draw(other, 1.0, 2.0) / 4.0);
  CHECK(pairs.at("Z1 Z2") == draw(other, 1.0, 2.0));
}

TEST_CASE("each element has its own generator") {
  const Job one =
      xml(lattice("shape='chain' size='6'", "<site x='0..1' seed='3'/><site z='0..1' seed='3'/>"));
  const auto found = by_string(one);
  for (int site = 0; site < 6; ++site) {
    CHECK(found.at("X" + std::to_string(site)) == found.at("Z" + std::to_string(site)));
  }
}

TEST_CASE("terms of lattices remember the line of their element") {
  const Job job =
      xml("<job>\n<hamiltonian>\n<lattice shape='chain' size='2'>\n<bond zz='1'/>\n"
          "<site x='1'/>\n</lattice>\n</hamiltonian>\n</job>");
  CHECK(terms(job) == "1 X0; 1 Z0 Z1; 1 X1");
  CHECK(job.hamiltonian.origins[0].line == 5);
  CHECK(job.hamiltonian.origins[1].line == 4);
}

TEST_CASE("an element that joins nothing warns") {
  const Job job =
      xml(lattice("shape='chain' size='2'", "<site z='1'/><bond distance='2' zz='1'/>"));
  REQUIRE(job.warnings.size() == 1);
  CHECK(job.warnings[0].message == "<bond> joins no pair of sites");
  CHECK(job.warnings[0].column == 65);
}

TEST_CASE("mistakes in lattices are shown where they stand") {
  const std::string chain = "shape='chain' size='3'";
  const struct {
    std::string attributes;
    std::string children;
    const char* expected;
  } cases[] = {
      {chain, "", "65 1:20: error: <lattice> is empty; expected <bond>, <pair> or <site>"},
      {"size='3'", "<site z='1'/>",
       "65 1:20: error: <lattice> has no attribute 'shape'; expected shape=\"chain\""},
      {"shape='grid'", "<site z='1'/>",
       "65 1:20: error: <lattice> has no attribute 'size'; expected size=\"4 3\""},
      {"shape='grids' size='3 3'", "<site z='1'/>",
       "65 1:35: error: unknown shape 'grids'; the nearest known one is 'grid'"},
      {"shape='grid' size='3'", "<site z='1'/>",
       "65 1:47: error: bad size '3' of a grid; expected Lx Ly"},
      {"shape='chain' size='3 3'", "<site z='1'/>",
       "65 1:48: error: bad size '3 3' of a chain; expected n"},
      {"shape='grid' size='3 0'", "<site z='1'/>",
       "65 1:49: error: bad value '0' of 'size'; expected a whole number from 1 to 10000000"},
      {"shape='grid' size='9999 9999'", "<site z='1'/>",
       "65 1:47: error: a lattice of 99980001 sites; expected no more than 10000000"},
      {"shape='ring' size='2'", "<site z='1'/>",
       "65 1:47: error: a periodic side of 2; expected 3 or more"},
      {"shape='grid' size='3 2' periodic='yes'", "<site z='1'/>",
       "65 1:49: error: a periodic side of 2; expected 3 or more"},
      {chain + " periodic='maybe'", "<site z='1'/>",
       "65 1:61: error: unknown value 'maybe' of 'periodic'; known are yes, no"},
      {chain + " periodic='yes no'", "<site z='1'/>",
       "65 1:61: error: bad value 'yes no' of 'periodic'; expected yes or no"},
      {"shape='grid' size='3 3' periodic=''", "<site z='1'/>",
       "65 1:62: error: bad value '' of 'periodic'; expected yes or no, once or for each axis"},
      {"shape='ring' size='3' periodic='no'", "<site z='1'/>",
       "65 1:60: error: a ring lattice is always periodic; expected yes"},
      {"shape='complete' size='3' periodic='yes'", "<site z='1'/>",
       "65 1:64: error: a complete lattice is never periodic; expected no"},
      {chain + " first='1073741823'", "<site z='1'/>",
       "65 1:48: error: the lattice reaches qubit 1073741825; expected no more than 1073741823"},
      {chain, "<bond/>", "65 1:52: error: <bond> without a strength; expected 'xx', 'yy' or 'zz'"},
      {chain, "<site seed='1'/>",
       "65 1:52: error: <site> without a strength; expected 'x', 'y' or 'z'"},
      {chain, "<bond z='1'/>",
       "65 1:57: error: unknown attribute 'z' in <bond>; the nearest known "
       "one is 'zz'"},
      {chain, "<bond zz='x'/>", "65 1:61: error: bad value 'x' of 'zz'; expected a finite number"},
      {chain, "<bond zz='1..x'/>",
       "65 1:61: error: bad range '1..x' of 'zz'; expected low..high with low up to high"},
      {chain, "<bond zz='-1e308..1e308'/>",
       "65 1:61: error: bad range '-1e308..1e308' of 'zz'; expected low..high with low up to "
       "high"},
      {chain, "<bond zz='0..1' seed='-1'/>",
       "65 1:73: error: bad value '-1' of 'seed'; expected a whole number from 0 to "
       "18446744073709551615"},
      {chain, "<bond along='leg' zz='1'/>",
       "65 1:64: error: unknown direction 'leg' of a chain; known are x"},
      {chain, "<bond along='x' distance='2' zz='1'/>",
       "65 1:77: error: 'distance' beside 'along'; expected one of them"},
      {chain, "<bond distance='0' zz='1'/>",
       "65 1:67: error: bad value '0' of 'distance'; expected a whole number from 1 to 10000000"},
      {chain, "<pair zz='1' power='-1'/>",
       "65 1:71: error: bad value '-1' of 'power'; expected a number from 0 up"},
      {chain, "<pair zz='1' reach='0'/>",
       "65 1:71: error: bad value '0' of 'reach'; expected a number above 0"},
      {chain, "<pair zz='1' metric='manhattan'/>",
       "65 1:72: error: unknown value 'manhattan' of 'metric'; known are euclid, graph"},
      {"shape='complete' size='10000'", "<bond zz='1'/>",
       "65 1:59: error: <bond> joins more than 20000000 pairs of sites; expected fewer"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.attributes);
    CAPTURE(row.children);
    CHECK(xml_message(lattice(row.attributes, row.children)) == row.expected);
  }
}
