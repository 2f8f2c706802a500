// A pool for the length of one call: workers take indices in rising order from one counter.
#include "compiler/base/parallel.hpp"

#include <algorithm>
#include <atomic>
#include <exception>
#include <mutex>
#include <system_error>
#include <thread>
#include <vector>

namespace farrier::base {
namespace {

std::atomic<unsigned> thread_limit{1};
thread_local bool inside_worker = false;

/// What the workers of one call share. Indices are handed out in rising order, so whoever fails
/// first by index has been started before any later one could stop the work.
struct Work {
  std::size_t count = 0;
  const std::function<void(std::size_t)>* body = nullptr;
  std::atomic<std::size_t> next{0};
  std::atomic<bool> failed{false};
  std::mutex mutex;
  std::size_t failed_index = 0;
  std::exception_ptr failure;

  void note_failure(std::size_t index) {
    const std::lock_guard lock(mutex);
    if (!failure || index < failed_index) {
      failure = std::current_exception();
      failed_index = index;
    }
    failed = true;
  }

  void run() {
    const bool outer = inside_worker;
    inside_worker = true;
    while (!failed) {
      const std::size_t index = next.fetch_add(1);
      if (index >= count) break;
      try {
        (*body)(index);
      } catch (...) {
        note_failure(index);
      }
    }
    inside_worker = outer;
  }
};

}  // namespace

unsigned set_threads(unsigned count) {
  return thread_limit.exchange(std::max(count, 1U));
}

unsigned threads() {
  return thread_limit;
}

void parallel_for(std::size_t count, const std::function<void(std::size_t)>& body) {
  Work work;
  work.count = count;
  work.body = &body;
  std::vector<std::thread> helpers;
  // A call from inside a worker stays on its thread, so that the limit holds for nested loops.
  const std::size_t wanted = inside_worker ? 1 : std::min<std::size_t>(threads(), count);
  try {
    for (std::size_t k = 1; k < wanted; ++k) helpers.emplace_back([&work] { work.run(); });
  } catch (const std::system_error&) {
    // Fewer threads than asked for do the same work.
  }
  work.run();
  for (std::thread& helper : helpers) helper.join();
  if (work.failure) std::rethrow_exception(work.failure);
}

}  // namespace farrier::base
