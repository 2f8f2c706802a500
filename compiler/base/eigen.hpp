// The only way into Eigen: fixed cache sizes, so that blocking, and with it rounding, never depends
// on the machine.
#pragma once

#include <Eigen/Dense>

namespace farrier::base {

/// Call once at the start of a program's numerical work; idempotent.
inline void fix_eigen_blocking() {
  Eigen::setCpuCacheSizes(32 * 1024, 256 * 1024, 2 * 1024 * 1024);
}

}  // namespace farrier::base
