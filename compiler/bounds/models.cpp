// Which bounds a formula has at which level of effort.
#include "compiler/bounds/models.hpp"

#include <utility>

namespace farrier::bounds {

std::vector<ErrorModel> error_models(const Question& question, int level) {
  std::vector<ErrorModel> models;
  // Blocks of one layer commute, so a single layer is exponentiated exactly.
  if (question.layering.layers.size() <= 1) {
    if (level == 0) models.push_back({"exact", {}, 0});
    return models;
  }
  if (level == 0) {
    models.push_back(coarse_model(question));
    if (auto model = published_model(question)) models.push_back(std::move(*model));
  }
  if (auto model = midpoint_model(question, question.formula.order + 2 * level))
    models.push_back(std::move(*model));
  return models;
}

}  // namespace farrier::bounds
