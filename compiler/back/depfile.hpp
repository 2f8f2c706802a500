// The dependencies of a circuit, as Make and Ninja read them.
#pragma once

#include <string>
#include <vector>

namespace farrier::back {

/// One rule: the target depends on the inputs. Names are escaped as GNU Make needs it.
std::string depfile(const std::string& target, const std::vector<std::string>& inputs);

}  // namespace farrier::back
