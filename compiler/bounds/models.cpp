// Which bounds a formula has at which level of effort.
#include "compiler/bounds/models.hpp"

#include <optional>
#include <utility>

namespace farrier::bounds {
namespace {

/// Orders beyond the formula's own that dense series are carried to, at level 1 and at level 2.
constexpr int dense_degree = 8;
constexpr int deep_dense_degree = 14;

}  // namespace

std::vector<ErrorModel> error_models(const Question& question, int level) {
  std::vector<ErrorModel> models;
  // Blocks of one layer commute, so a single layer is exponentiated exactly.
  if (question.layering.layers.size() <= 1) {
    if (level == 0) models.push_back({"exact", {}, 0});
    return models;
  }
  const int order = question.formula.order;
  const bool dense = dense_fits(question.hamiltonian, question.layering);
  if (level == 0) {
    models.push_back(coarse_model(question));
    if (auto model = published_model(question)) models.push_back(std::move(*model));
  }
  std::optional<ErrorModel> model;
  if (!dense)
    model = midpoint_model(question, order + 2 * level);
  else if (level == 1)
    model = dense_model(question, order + dense_degree, 2);
  else if (level == 2)
    model = dense_model(question, order + deep_dense_degree, 3);
  if (model) models.push_back(std::move(*model));
  return models;
}

}  // namespace farrier::bounds
