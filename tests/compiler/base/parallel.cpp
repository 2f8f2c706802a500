// The loop visits every index once, whatever the number of threads, and fails by rule.
#include "compiler/base/parallel.hpp"

#include <doctest/doctest.h>

#include <atomic>
#include <stdexcept>
#include <string>
#include <vector>

using namespace farrier::base;

namespace {

struct WithThreads {
  explicit WithThreads(unsigned count) : former(set_threads(count)) {}
  WithThreads(const WithThreads&) = delete;
  WithThreads& operator=(const WithThreads&) = delete;
  ~WithThreads() { set_threads(former); }
  unsigned former;
};

}  // namespace

TEST_CASE("set threads returns the former number and allows no zero") {
  const WithThreads three(3);
  CHECK(threads() == 3);
  CHECK(set_threads(0) == 3);
  CHECK(threads() == 1);
}

TEST_CASE("parallel for visits every index once") {
  for (const unsigned count : {1U, 2U, 7U}) {
    const WithThreads some(count);
    for (const std::size_t size : {std::size_t{0}, std::size_t{1}, std::size_t{5000}}) {
      std::vector<int> visits(size, 0);
      parallel_for(size, [&](std::size_t k) { ++visits[k]; });
      CHECK(visits == std::vector<int>(size, 1));
    }
  }
}

TEST_CASE("parallel for rethrows the failure of the lowest index") {
  for (const unsigned count : {1U, 4U}) {
    const WithThreads some(count);
    for (int round = 0; round < 200; ++round) {
      std::string caught;
      try {
        parallel_for(100, [](std::size_t k) {
          if (k % 10 == 3) throw std::runtime_error(std::to_string(k));
        });
      } catch (const std::runtime_error& error) {
        caught = error.what();
      }
      CHECK(caught == "3");
    }
  }
}

TEST_CASE("parallel for works inside itself") {
  const WithThreads some(4);
  std::atomic<int> visits{0};
  parallel_for(20, [&](std::size_t) { parallel_for(30, [&](std::size_t) { ++visits; }); });
  CHECK(visits == 600);
}
