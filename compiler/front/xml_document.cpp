// The XML library's tree joined with the positions of the scan.
#include "compiler/front/xml_document.hpp"

#include <algorithm>
#include <utility>

#include "compiler/base/numbers.hpp"

namespace farrier::front {
namespace {

std::string value_of(const Attribute& attribute, std::string_view text) {
  return "bad value " + in_quotes(text) + " of '" + std::string(attribute.name) + "'";
}

}  // namespace

void Attribute::fail(std::string message, std::size_t within) const {
  // With entities in it, the value is shorter than its text, and only its start is certain.
  const bool verbatim = source->text.compare(value_at, value.size(), value) == 0;
  source->fail(value_at + (verbatim ? within : 0), std::move(message));
}

std::uint32_t Element::line() const {
  return document_->positions(name_at()).line;
}

std::vector<Element> Element::children() const {
  std::vector<Element> result;
  for (const pugi::xml_node child : node_.children()) {
    if (child.type() == pugi::node_element) result.emplace_back(*document_, child);
  }
  return result;
}

std::optional<Element> Element::child(std::string_view name) const {
  for (const Element& child : children()) {
    if (child.name() == name) return child;
  }
  return std::nullopt;
}

std::vector<Attribute> Element::attributes() const {
  const XmlElement& positions = document_->positions(name_at());
  std::vector<Attribute> result;
  for (const pugi::xml_attribute attribute : node_.attributes()) {
    const XmlAttribute& position = positions.attributes.at(result.size());
    result.push_back({&document_->source(), attribute.name(), attribute.value(), position.name_at,
                      position.value_at});
  }
  return result;
}

std::optional<Attribute> Element::attribute(std::string_view name) const {
  for (const Attribute& attribute : attributes()) {
    if (attribute.name == name) return attribute;
  }
  return std::nullopt;
}

Attribute Element::required(std::string_view name, std::string_view example) const {
  const std::optional<Attribute> found = attribute(name);
  if (!found) {
    fail(tag() + " has no attribute '" + std::string(name) + "'; expected " + std::string(name) +
         "=\"" + std::string(example) + "\"");
  }
  return *found;
}

std::vector<Item> Element::text() const {
  std::vector<Item> result;
  const std::string_view source = document_->source().text;
  for (const pugi::xml_node child : node_.children()) {
    if (child.type() != pugi::node_pcdata && child.type() != pugi::node_cdata) continue;
    const auto begin = static_cast<std::size_t>(child.offset_debug());
    result.push_back({source.substr(begin, source.find('<', begin) - begin), begin});
  }
  return result;
}

void Element::fail(std::string message) const {
  document_->source().fail(name_at(), std::move(message));
}

Diagnostic Element::warning(std::string message) const {
  return document_->source().at(name_at(), std::move(message), Severity::warning);
}

Document::Document(const base::SourceText& source) : source_(source), elements_(scan_xml(source)) {
  const pugi::xml_parse_result result = tree_.load_buffer(source.text.data(), source.text.size(),
                                                          pugi::parse_default, pugi::encoding_utf8);
  if (!result) source.fail(static_cast<std::size_t>(result.offset), result.description());
}

double number_value(const Attribute& attribute) {
  const std::optional<double> value = base::parse_double(attribute.value);
  if (!value) attribute.fail(value_of(attribute, attribute.value) + "; expected a finite number");
  return *value;
}

double positive_value(const Attribute& attribute) {
  const double value = number_value(attribute);
  if (value <= 0.0) {
    attribute.fail(value_of(attribute, attribute.value) + "; expected a number above 0");
  }
  return value;
}

std::uint64_t whole_item(const Attribute& attribute, const Item& item, std::uint64_t least,
                         std::uint64_t most) {
  const std::optional<std::uint64_t> value = base::parse_unsigned(item.text);
  if (!value || *value < least || *value > most) {
    attribute.fail(value_of(attribute, item.text) + "; expected a whole number from " +
                       std::to_string(least) + " to " + std::to_string(most),
                   item.offset);
  }
  return *value;
}

std::uint64_t whole_value(const Attribute& attribute, std::uint64_t least, std::uint64_t most) {
  return whole_item(attribute, Item{attribute.value, 0}, least, most);
}

std::vector<ListedQubit> qubit_list(const Attribute& attribute, std::uint32_t qubits) {
  std::vector<ListedQubit> result;
  const std::vector<Item> items = split(attribute.value, " ,\t");
  if (items.empty()) attribute.fail("no qubit; expected indices, ranges such as 0-3, or all");
  const bool all = items.size() == 1 && items[0].text == "all";
  for (const Item& item : items) {
    const std::size_t dash = std::min(item.text.find('-'), item.text.size());
    const auto first = all ? 0 : base::parse_unsigned(item.text.substr(0, dash));
    const auto last = all                       ? qubits - 1
                      : dash < item.text.size() ? base::parse_unsigned(item.text.substr(dash + 1))
                                                : first;
    if (!first || !last || *first > *last) {
      attribute.fail("bad qubit " + in_quotes(item.text) +
                         "; expected an index, a rising range such as 0-3, or all alone",
                     item.offset);
    }
    if (*last >= qubits) {
      attribute.fail("qubit " + std::to_string(*last) + " is out of range; expected 0 to " +
                         std::to_string(qubits - 1) + " for " + count_of(qubits, "qubit"),
                     item.offset);
    }
    for (std::uint64_t k = *first; k <= *last; ++k) {
      result.push_back({static_cast<std::uint32_t>(k), item.offset});
    }
  }
  return result;
}

}  // namespace farrier::front
