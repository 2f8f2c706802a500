// Each list is a table of some other room, column by column, with its sources.
#include "compiler/driver/lists.hpp"

#include <algorithm>
#include <farrier/circuit.hpp>
#include <farrier/diagnostic.hpp>
#include <farrier/formula.hpp>

#include "compiler/back/text.hpp"
#include "compiler/base/numbers.hpp"
#include "compiler/front/lattice.hpp"
#include "compiler/front/names.hpp"
#include "compiler/front/text.hpp"
#include "compiler/front/units.hpp"
#include "passes/table.hpp"

namespace farrier::driver {
namespace {

using Rows = std::vector<std::vector<std::string>>;

std::string formulas() {
  Rows rows;
  for (const Formula& formula : formula_table())
    rows.push_back({std::string(formula.name), std::to_string(formula.order),
                    std::to_string(formula.stages()), formula.symmetric ? "yes" : "no",
                    std::string(formula.source)});
  return back::table({{"formula"}, {"order", true}, {"stages", true}, {"symmetric"}, {"source"}},
                     rows);
}

std::string passes_in_order() {
  Rows rows;
  for (const auto& pass : passes::pass_table())
    rows.push_back(
        {std::to_string(rows.size() + 1), std::string(pass.name), std::string(pass.description)});
  return back::table({{"", true}, {"pass"}, {"what it does"}}, rows);
}

std::string shapes() {
  Rows rows;
  for (const front::ShapeInfo& shape : front::shape_table()) {
    std::string directions;
    for (const std::string_view direction : shape.directions)
      directions += (directions.empty() ? "" : " ") + std::string(direction);
    const std::string periodic = shape.always_periodic   ? "always"
                                 : shape.may_be_periodic ? "may be"
                                                         : "no";
    rows.push_back({std::string(shape.name), std::string(shape.size),
                    directions.empty() ? "-" : directions, periodic, std::string(shape.numbering)});
  }
  return back::table(
      {{"shape"}, {"size"}, {"directions"}, {"periodic"}, {"numbering of the sites"}}, rows);
}

std::string units() {
  Rows rows;
  for (const front::Unit& unit : front::unit_table()) {
    const bool rate = unit.kind == front::UnitKind::rate;
    const std::string power = unit.power == 0 ? "" : "e" + std::to_string(unit.power);
    rows.push_back({std::string(unit.word), rate ? "Hamiltonian" : "time",
                    base::shortest(unit.mantissa) + power + (rate ? " rad/s" : " s"),
                    std::string(unit.source)});
  }
  return back::table({{"unit"}, {"of"}, {"is"}, {"source"}}, rows);
}

std::string natives() {
  Rows rows;
  for (const GateInfo& gate : gate_table()) {
    if (std::ranges::find(front::native_words(), gate.name) == front::native_words().end())
      continue;
    const bool standard = gate.definition.empty();
    rows.push_back({std::string(gate.name),
                    standard ? "OpenQASM 3 specification" : "common practice, no source",
                    std::string(standard ? "in stdgates.inc" : gate.definition)});
  }
  return back::table({{"gate"}, {"source"}, {"definition in the text"}}, rows);
}

}  // namespace

const std::vector<ListInfo>& list_table() {
  static const std::vector<ListInfo> table = {{"formulas", formulas},
                                              {"passes", passes_in_order},
                                              {"shapes", shapes},
                                              {"units", units},
                                              {"natives", natives}};
  return table;
}

std::string list_text(const std::string& name) {
  std::vector<std::string_view> names;
  for (const ListInfo& list : list_table()) {
    if (list.name == name) return list.text();
    names.push_back(list.name);
  }
  throw UserError(ExitCode::usage, "there is no list of " + front::in_quotes(name) + "; " +
                                       front::nearest_of(name, names));
}

}  // namespace farrier::driver
