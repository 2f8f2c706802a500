// The table of passes: names, and the order of kinds that the runner relies on.
#include "passes/table.hpp"

#include <doctest/doctest.h>

#include <set>
#include <string>

using namespace farrier::passes;

TEST_CASE("names differ and every row has a line of description") {
  std::set<std::string> names;
  for (const Pass& pass : pass_table()) {
    CHECK(names.emplace(pass.name).second);
    CHECK_FALSE(pass.description.empty());
    CHECK(pass.description.size() <= 60);
  }
}

TEST_CASE("passes on the Hamiltonian come first - then on the plan - then on the circuit") {
  std::size_t last = 0;
  int builders = 0;
  for (const Pass& pass : pass_table()) {
    CHECK(pass.run.index() >= last);
    last = pass.run.index();
    if (std::holds_alternative<BuildPass>(pass.run)) ++builders;
  }
  CHECK(builders == 1);
}
