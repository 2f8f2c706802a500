// What the rows of the table of formulas are made of.
#include "compiler/formulas/rows.hpp"

#include <cstddef>
#include <utility>

namespace farrier::formulas {

std::vector<double> strang_composition(const std::vector<double>& weights) {
  std::vector<double> ramps;
  for (const double weight : weights) {
    ramps.push_back(weight / 2);
    ramps.push_back(weight / 2);
  }
  return ramps;
}

std::vector<double> mirrored_strang(std::vector<double> weights) {
  double sum = 0.0;
  for (const double weight : weights) sum += weight;
  const std::vector<double> backwards(weights.rbegin(), weights.rend());
  weights.push_back(1.0 - 2.0 * sum);
  weights.insert(weights.end(), backwards.begin(), backwards.end());
  return strang_composition(weights);
}

std::vector<double> mirrored_ramps(std::vector<double> half) {
  const std::vector<double> backwards(half.rbegin(), half.rend());
  half.insert(half.end(), backwards.begin(), backwards.end());
  return half;
}

std::vector<double> from_two_operators(const std::vector<double>& a, const std::vector<double>& b) {
  std::vector<double> ramps;
  double previous = 0.0;
  double sum = 0.0;
  for (std::size_t k = 0; k < a.size() + b.size(); ++k) {
    previous = (k % 2 == 0 ? a[k / 2] : b[k / 2]) - previous;
    sum += previous;
    ramps.push_back(previous);
  }
  ramps.push_back(0.5 - sum);
  return mirrored_ramps(std::move(ramps));
}

}  // namespace farrier::formulas
