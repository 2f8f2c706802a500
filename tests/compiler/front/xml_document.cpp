// Elements and attributes that point at themselves.
#include "compiler/front/xml_document.hpp"

#include <doctest/doctest.h>

#include "compiler/front/names.hpp"

using namespace farrier;
using namespace farrier::front;

namespace {

/// Runs an action that must fail, and returns "line:column message".
template <typename Action>
std::string complaint(const Action& action) {
  try {
    action();
  } catch (const UserError& error) {
    const Diagnostic& first = error.diagnostics().at(0);
    return std::to_string(first.line) + ":" + std::to_string(first.column) + " " + first.message;
  }
  return "accepted";
}

struct Sample {
  explicit Sample(const std::string& value)
      : source{"a", "<job>\n <x v=\"" + value + "\"/></job>"}, document(source) {}
  [[nodiscard]] Attribute attribute() const {
    return document.root().children().at(0).required("v", "1");
  }
  base::SourceText source;
  Document document;
};

std::string list_of(const std::string& value, std::uint32_t qubits) {
  const Sample sample(value);
  std::string result;
  const std::string wrong = complaint([&] {
    for (const ListedQubit& listed : qubit_list(sample.attribute(), qubits)) {
      result += std::to_string(listed.qubit) + "@" + std::to_string(listed.offset) + " ";
    }
  });
  return wrong == "accepted" ? result : wrong;
}

}  // namespace

TEST_CASE("elements and attributes keep their order and their text") {
  const base::SourceText source{"a",
                                "<job>\n<p a='1' b='&lt;2'/><!-- c --><q>one<r/> two</q></job>"};
  const Document document(source);
  const std::vector<Element> children = document.root().children();
  REQUIRE(children.size() == 2);
  CHECK(children[0].name() == "p");
  CHECK(children[0].tag() == "<p>");
  CHECK(children[0].line() == 2);
  CHECK(children[0].attributes().at(1).value == "<2");
  CHECK_FALSE(children[0].attribute("c"));
  CHECK(document.root().child("q")->name() == "q");
  CHECK_FALSE(document.root().child("z"));
  const std::vector<Item> text = children[1].text();
  REQUIRE(text.size() == 2);
  CHECK(text[0].text == "one");
  CHECK(text[1].text == " two");
  CHECK(source.text.substr(text[1].offset, 4) == " two");
}

TEST_CASE("complaints point at elements attributes and places within values") {
  const Sample sample("one two");
  CHECK(complaint([&] { sample.document.root().fail("m"); }) == "1:2 m");
  CHECK(complaint([&] { sample.attribute().fail("m"); }) == "2:8 m");
  CHECK(complaint([&] { sample.attribute().fail("m", 4); }) == "2:12 m");
  const Sample escaped("&lt;one two");
  CHECK(complaint([&] { escaped.attribute().fail("m", 4); }) == "2:8 m");
  CHECK(complaint([&] { static_cast<void>(sample.document.root().required("size", "4")); }) ==
        "1:2 <job> has no attribute 'size'; expected size=\"4\"");
  const Diagnostic warning = sample.document.root().warning("w");
  CHECK(warning.severity == Severity::warning);
  CHECK(warning.column == 2);
}

TEST_CASE("values are what they are asked to be") {
  CHECK(number_value(Sample("-1e3").attribute()) == -1000.0);
  CHECK(positive_value(Sample("2").attribute()) == 2.0);
  CHECK(whole_value(Sample("7").attribute(), 1, 7) == 7);
  CHECK(word_value(Sample("high").attribute(), &parse_effort, effort_words()) == Effort::high);
  CHECK(complaint([] { number_value(Sample("inf").attribute()); }) ==
        "2:8 bad value 'inf' of 'v'; expected a finite number");
  CHECK(complaint([] { number_value(Sample(" 1").attribute()); }) ==
        "2:8 bad value ' 1' of 'v'; expected a finite number");
  CHECK(complaint([] { positive_value(Sample("-0").attribute()); }) ==
        "2:8 bad value '-0' of 'v'; expected a number above 0");
  CHECK(complaint([] { whole_value(Sample("8").attribute(), 1, 7); }) ==
        "2:8 bad value '8' of 'v'; expected a whole number from 1 to 7");
  CHECK(complaint([] { whole_value(Sample("1.5").attribute(), 1, 7); }) ==
        "2:8 bad value '1.5' of 'v'; expected a whole number from 1 to 7");
  CHECK(complaint([] { word_value(Sample("hihg").attribute(), &parse_effort, effort_words()); }) ==
        "2:8 unknown value 'hihg' of 'v'; the nearest known one is 'high'");
}

TEST_CASE("lists of qubits hold indices ranges or all") {
  CHECK(list_of("1 3 5", 8) == "1@0 3@2 5@4 ");
  CHECK(list_of("5,1,, 2", 8) == "5@0 1@2 2@6 ");
  CHECK(list_of("0-2 7", 8) == "0@0 1@0 2@0 7@4 ");
  CHECK(list_of("3-3", 8) == "3@0 ");
  CHECK(list_of("all", 3) == "0@0 1@0 2@0 ");
  CHECK(list_of("", 8) == "2:8 no qubit; expected indices, ranges such as 0-3, or all");
  CHECK(list_of("1 x", 8) ==
        "2:10 bad qubit 'x'; expected an index, a rising range such as 0-3, or all alone");
  CHECK(list_of("1 all", 8) ==
        "2:10 bad qubit 'all'; expected an index, a rising range such as 0-3, or all alone");
  CHECK(list_of("3-1", 8) ==
        "2:8 bad qubit '3-1'; expected an index, a rising range such as 0-3, or all alone");
  CHECK(list_of("1-", 8) ==
        "2:8 bad qubit '1-'; expected an index, a rising range such as 0-3, or all alone");
  CHECK(list_of("0 1-8", 8) == "2:10 qubit 8 is out of range; expected 0 to 7 for 8 qubits");
  CHECK(list_of("0-18446744073709551615", 8) ==
        "2:8 qubit 18446744073709551615 is out of range; expected 0 to 7 for 8 qubits");
}
