// Error models as functions of time and steps: values by hand, and the search for the least steps
// against a search one by one.
#include "compiler/bounds/error_model.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <cstdint>
#include <farrier/diagnostic.hpp>
#include <limits>
#include <vector>

using farrier::Contribution;
using farrier::bounds::ErrorModel;
using farrier::bounds::least_steps;
using farrier::bounds::most_steps;
using farrier::bounds::tightest;

namespace {

const ErrorModel strang{"strang", {{"leading", "1-norm", 3.0, 3, 2}, {"rest", "1-norm", 5.0, 5, 4}}};
const ErrorModel lie{"lie", {{"leading", "1-norm", 2.0, 2, 1}}};
const ErrorModel exact{"exact", {}};

}  // namespace

TEST_CASE("the error of a model is the sum of its terms and rounded up") {
  // 3 t^3 / r^2 + 5 t^5 / r^4
  CHECK(strang.error(1.0, 1) == doctest::Approx(8.0).epsilon(1e-13));
  CHECK(strang.error(1.0, 1) >= 8.0);
  CHECK(strang.error(2.0, 4) == doctest::Approx(3.0 * 8 / 16 + 5.0 * 32 / 256).epsilon(1e-13));
  CHECK(strang.error(2.0, 4) >= 3.0 * 8 / 16 + 5.0 * 32 / 256);
  CHECK(exact.error(17.0, 1) == 0.0);
  CHECK(strang.error(0.0, 3) == 0.0);
}

TEST_CASE("the error is that of the inverse evolution too") {
  CHECK(strang.error(-2.0, 4) == strang.error(2.0, 4));
  CHECK(strang.least_steps(-2.0, 1e-3, most_steps) == strang.least_steps(2.0, 1e-3, most_steps));
}

TEST_CASE("the error is never below its value in long double") {
  const ErrorModel model{"m", {{"a", "", 0.1, 7, 6}, {"b", "", 1.0 / 3, 11, 10}, {"c", "", 1e-15, 1, 0}}};
  for (int k = 1; k < 200; ++k) {
    const double time = 0.1 * k;
    const auto steps = static_cast<std::uint64_t>(1 + k * k % 37);
    const long double t = time;
    const long double r = static_cast<long double>(steps);
    const long double value = static_cast<long double>(0.1) * std::pow(t, 7.0L) / std::pow(r, 6.0L) +
                              static_cast<long double>(1.0 / 3) * std::pow(t, 11.0L) / std::pow(r, 10.0L) +
                              static_cast<long double>(1e-15) * t;
    CHECK(model.error(time, steps) >= value);
    CHECK(model.error(time, steps) <= value * 1.0000001L);
  }
}

TEST_CASE("neither a long time nor many steps overflow on the way") {
  const ErrorModel model{"m", {{"a", "", 1.0, 13, 12}}};
  CHECK(model.error(1e30, std::uint64_t{1} << 50) ==
        doctest::Approx(1e30 * std::pow(1e30 * 0x1p-50, 12)));
  CHECK(model.error(1e-30, 1) == doctest::Approx(0.0));
  CHECK(std::isfinite(lie.error(1e100, 1)));
}

TEST_CASE("contributions add up to the error") {
  const std::vector<Contribution> contributions = strang.contributions(1.3, 7);
  REQUIRE(contributions.size() == 2);
  CHECK(contributions[0].name == "leading");
  CHECK(contributions[1].name == "rest");
  CHECK(contributions[0].method == "1-norm");
  CHECK(contributions[0].counts);
  CHECK(contributions[0].value == doctest::Approx(3.0 * std::pow(1.3, 3) / 49).epsilon(1e-13));
  CHECK(contributions[0].value + contributions[1].value ==
        doctest::Approx(strang.error(1.3, 7)).epsilon(1e-13));
  CHECK(exact.contributions(1.0, 1).empty());
}

TEST_CASE("the least steps are enough and one less is not") {
  for (const ErrorModel& model : {lie, strang})
    for (double tolerance = 20.0; tolerance > 1e-9; tolerance /= 3.7) {
      const std::uint64_t steps = model.least_steps(1.7, tolerance, most_steps);
      REQUIRE(steps > 0);
      CHECK(model.error(1.7, steps) <= tolerance);
      if (steps > 1) CHECK(model.error(1.7, steps - 1) > tolerance);
    }
}

TEST_CASE("the least steps agree with a search one by one") {
  for (const double tolerance : {10.0, 1.0, 0.1, 0.01, 0.001}) {
    std::uint64_t steps = 1;
    while (strang.error(1.7, steps) > tolerance) ++steps;
    CHECK(strang.least_steps(1.7, tolerance, most_steps) == steps);
    CHECK(strang.least_steps(1.7, tolerance, steps) == steps);
    CHECK(strang.least_steps(1.7, tolerance, steps - 1) == 0);
  }
}

TEST_CASE("a tolerance that no number of steps reaches") {
  const ErrorModel model{"m", {{"order conditions", "", 1e-15, 1, 0}}};
  CHECK(model.least_steps(1.0, 1e-16, most_steps) == 0);
  CHECK(model.least_steps(1.0, 1e-14, most_steps) == 1);
  CHECK(lie.least_steps(1.0, 1e-3, 10) == 0);
  CHECK(lie.least_steps(1.0, 0.0, most_steps) == 0);
}

TEST_CASE("nothing to bound takes one step") {
  CHECK(exact.least_steps(5.0, 0.0, most_steps) == 1);
  CHECK(lie.least_steps(0.0, 0.0, most_steps) == 1);
}

TEST_CASE("the tightest model depends on time and steps") {
  // 2 t^2 / r against 3 t^3 / r^2 + ...
  const std::vector<ErrorModel> models = {lie, strang};
  CHECK(tightest(models, 3.0, 1).name == "lie");
  CHECK(tightest(models, 3.0, 1000).name == "strang");
  CHECK_THROWS_AS(tightest({}, 1.0, 1), farrier::InternalFault);
}

TEST_CASE("the least steps over several models are the least of each") {
  const std::vector<ErrorModel> models = {lie, strang};
  for (const double tolerance : {50.0, 5.0, 0.1, 1e-3, 1e-6}) {
    const std::uint64_t expected = std::min(lie.least_steps(3.0, tolerance, most_steps),
                                            strang.least_steps(3.0, tolerance, most_steps));
    CHECK(least_steps(models, 3.0, tolerance) == expected);
    CHECK(least_steps({strang, lie}, 3.0, tolerance) == expected);
  }
  CHECK(least_steps({}, 1.0, 1.0) == 0);
  const ErrorModel hopeless{"m", {{"order conditions", "", 1.0, 1, 0}}};
  CHECK(least_steps({hopeless}, 1.0, 0.5) == 0);
  CHECK(least_steps({hopeless, lie}, 1.0, 0.45) == 5);
}
