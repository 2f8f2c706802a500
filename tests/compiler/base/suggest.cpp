// Nearest words; distances are counted by hand (Levenshtein 1966: insert, delete, replace).
#include "compiler/base/suggest.hpp"

#include <doctest/doctest.h>

#include <string>

using farrier::base::nearest;

TEST_CASE("nearest finds one wrong letter") {
  CHECK(nearest("tolerence", {"time", "tolerance", "assurance"}) == "tolerance");
}

TEST_CASE("nearest takes the first of equals") {
  CHECK(nearest("bat", {"cat", "hat"}) == "cat");
}

TEST_CASE("nearest allows two edits in short words") {
  CHECK(nearest("xy", {"abcd", "x"}) == "x");
  CHECK(nearest("ab", {"cd"}) == "cd");
  CHECK(nearest("ab", {"cde"}).empty());
}

TEST_CASE("nearest stays below half the length of long words") {
  // kitten to sitting: 3 edits, and 6 letters allow no more than 2.
  CHECK(nearest("kitten", {"sitting"}).empty());
  // Seven letters allow three edits.
  CHECK(nearest("sitting", {"kitten"}) == "kitten");
}

TEST_CASE("nearest is quick about absurd words") {
  CHECK(nearest(std::string(10'000'000, 'a'), {"time", "tolerance"}).empty());
}

TEST_CASE("nearest of nothing is nothing") {
  CHECK(nearest("word", {}).empty());
}
