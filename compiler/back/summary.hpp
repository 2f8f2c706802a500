// What farrier tells about a finished job: as XML for programs, as text for people.
#pragma once

#include <cstdint>
#include <farrier/compile.hpp>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace farrier::back {

/// A plan in a few words, as the circuit's header and the summary give it. Parts that differ make
/// the formula "mixed", with the lowest order of the parts that are not exact, and the largest
/// number of steps, layers and stages.
struct Headline {
  std::string formula;
  int order = 0;
  std::uint64_t steps = 1;
  std::uint64_t layers = 0;
  std::uint32_t stages = 0;
};
Headline headline(const Plan& plan);

/// "certified" or "average".
std::string_view assurance_word(Assurance assurance);
/// What the error is measured in: "spectral norm", "spectral norm up to a global phase", ...
std::string metric_words(const Certificate& certificate);
/// The bound rounded up, with as many digits as it takes to stay within the tolerance.
std::string bound_text(double bound, const std::optional<double>& tolerance);
/// "none" where there is none.
std::string tolerance_text(const std::optional<double>& tolerance);
/// A time with its unit.
std::string time_text(double time, const std::string& unit);

/// The summary of a compilation. `files` names the circuit's file of each point; a missing or empty
/// name is left out.
std::string summary_xml(const Result& result, const std::vector<std::string>& files);
/// The same for standard error: at most about twenty lines a point.
std::string summary_text(const Result& result, const std::vector<std::string>& files);

/// The candidates of a survey.
std::string survey_xml(const Result& result);
std::string survey_text(const Result& result);

/// The facts of a Hamiltonian.
std::string facts_xml(const Facts& facts);
std::string facts_text(const Facts& facts);

/// The candidate that became the circuit, or nullptr where none was weighed.
const Candidate* chosen_candidate(const Plan& plan);
/// Whether the counts of a candidate are those of a circuit that was built.
bool was_built(const Candidate& candidate);

}  // namespace farrier::back
