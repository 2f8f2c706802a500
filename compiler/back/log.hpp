// The pass log: what every pass saw and did, and how the certificate adds up.
#pragma once

#include <farrier/compile.hpp>
#include <string>
#include <string_view>

namespace farrier::back {

/// For people, 80 columns wide, with wall times.
std::string log_text(const Result& result);

/// For programs, without wall times, so that it is the same for every run.
std::string log_xml(const Result& result, std::string_view verb);

}  // namespace farrier::back
