// The one place that states farrier's version; CMakeLists.txt reads it from here.
#pragma once

namespace farrier {

inline constexpr const char* version = "0.1.0";

}  // namespace farrier
