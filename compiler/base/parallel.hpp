// Work in fixed chunks, so that results never depend on the number of threads.
#pragma once

#include <cstddef>
#include <functional>

namespace farrier::base {

/// Sets how many threads parallel_for uses at most (at least 1); returns the former number.
unsigned set_threads(unsigned count);
unsigned threads();

/// Calls body(i) for every i in [0, count), on up to threads() threads, in any order; the body of
/// one i must not depend on that of another. The first exception (by index) is rethrown.
void parallel_for(std::size_t count, const std::function<void(std::size_t)>& body);

}  // namespace farrier::base
