// Where the elements and attributes of an XML text stand, and whether the text is well formed.
//
// The XML library keeps no positions of attributes and lets several faults pass: repeated
// attributes, text around the root element, a second root, unknown entities. This scan finds them.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string_view>
#include <vector>

#include "compiler/base/source.hpp"

namespace farrier::front {

/// Offsets of an attribute: its name, and the first byte between its quotes.
struct XmlAttribute {
  std::size_t name_at = 0;
  std::size_t value_at = 0;
};

/// An element's name and the attributes that follow it.
struct XmlElement {
  std::size_t name_at = 0;
  std::uint32_t line = 0;
  std::vector<XmlAttribute> attributes;
};

/// The elements in the order of their start tags. Throws UserError (bad_data) where the text is not
/// well formed, holds a document type declaration, or nests elements deeper than 32.
std::vector<XmlElement> scan_xml(const base::SourceText& source);

/// The element whose name stands at that offset. Throws InternalFault where none does.
const XmlElement& element_at(const std::vector<XmlElement>& elements, std::size_t name_at);

}  // namespace farrier::front
