// An XML document with positions: elements and attributes that can point at themselves.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <pugixml.hpp>
#include <string>
#include <string_view>
#include <vector>

#include "compiler/base/source.hpp"
#include "compiler/front/text.hpp"
#include "compiler/front/xml_text.hpp"

namespace farrier::front {

/// An attribute as it stands in the text. Valid as long as its document.
struct Attribute {
  const base::SourceText* source = nullptr;
  std::string_view name;
  std::string_view value;
  std::size_t name_at = 0;
  std::size_t value_at = 0;

  /// Throws UserError (bad_data) that points at the value, or at a place within it.
  [[noreturn]] void fail(std::string message, std::size_t within = 0) const;
};

class Document;

/// An element. Valid as long as its document.
class Element {
 public:
  Element(const Document& document, pugi::xml_node node) : document_(&document), node_(node) {}

  [[nodiscard]] std::string_view name() const { return node_.name(); }
  /// "<name>", for messages.
  [[nodiscard]] std::string tag() const { return "<" + std::string(name()) + ">"; }
  [[nodiscard]] std::uint32_t line() const;
  [[nodiscard]] std::vector<Element> children() const;
  [[nodiscard]] std::optional<Element> child(std::string_view name) const;
  [[nodiscard]] std::vector<Attribute> attributes() const;
  [[nodiscard]] std::optional<Attribute> attribute(std::string_view name) const;
  /// The attribute of that name; fails where it is missing, and shows the example.
  [[nodiscard]] Attribute required(std::string_view name, std::string_view example) const;
  /// The pieces of text between the element's children, with their offsets in the source.
  [[nodiscard]] std::vector<Item> text() const;
  /// Throws UserError (bad_data) that points at the element's name.
  [[noreturn]] void fail(std::string message) const;
  /// A warning that points at the element's name.
  [[nodiscard]] Diagnostic warning(std::string message) const;

 private:
  [[nodiscard]] std::size_t name_at() const {
    return static_cast<std::size_t>(node_.offset_debug());
  }

  const Document* document_;
  pugi::xml_node node_;
};

/// A well-formed document.
class Document {
 public:
  /// Throws UserError (bad_data) where the text is not well formed.
  explicit Document(const base::SourceText& source);

  [[nodiscard]] Element root() const { return {*this, tree_.document_element()}; }
  [[nodiscard]] const base::SourceText& source() const { return source_; }
  [[nodiscard]] const XmlElement& positions(std::size_t name_at) const {
    return element_at(elements_, name_at);
  }

 private:
  const base::SourceText& source_;
  std::vector<XmlElement> elements_;
  pugi::xml_document tree_;
};

// Values of attributes; each fails at the value where it is not what was asked for.

double number_value(const Attribute& attribute);
double positive_value(const Attribute& attribute);
std::uint64_t whole_value(const Attribute& attribute, std::uint64_t least, std::uint64_t most);
/// As whole_value, for one piece of the attribute's value.
std::uint64_t whole_item(const Attribute& attribute, const Item& item, std::uint64_t least,
                         std::uint64_t most);

template <typename Value>
Value word_item(const Attribute& attribute, const Item& item,
                std::optional<Value> (*parse)(std::string_view),
                const std::vector<std::string_view>& words) {
  const std::optional<Value> value = parse(item.text);
  if (!value) {
    attribute.fail("unknown value " + in_quotes(item.text) + " of '" + std::string(attribute.name) +
                       "'; " + nearest_of(item.text, words),
                   item.offset);
  }
  return *value;
}

template <typename Value>
Value word_value(const Attribute& attribute, std::optional<Value> (*parse)(std::string_view),
                 const std::vector<std::string_view>& words) {
  return word_item(attribute, Item{attribute.value, 0}, parse, words);
}

/// A qubit of a list, and where in the attribute's value it is named.
struct ListedQubit {
  std::uint32_t qubit = 0;
  std::size_t offset = 0;
};

/// Indices and ranges such as "0-3", separated by blanks or commas, or "all"; in the order of the
/// list. Fails on indices that are not below `qubits` and on an empty list.
std::vector<ListedQubit> qubit_list(const Attribute& attribute, std::uint32_t qubits);

}  // namespace farrier::front
