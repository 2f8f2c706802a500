// Which elements and attributes a job file may hold, as a table.
#pragma once

#include <string_view>
#include <vector>

#include "compiler/front/xml_document.hpp"

namespace farrier::front {

/// One kind of element.
struct ElementRule {
  std::string_view name;
  std::vector<std::string_view> attributes;
  std::vector<std::string_view> children;
  bool repeats = false;  ///< may stand several times beside each other
  bool text = false;     ///< holds text
};

const std::vector<ElementRule>& job_grammar();

/// Checks a job file's elements and attributes against the table, in the order of the text. Throws
/// UserError (bad_data) that points at the first that does not belong.
void check_grammar(const Document& document);

}  // namespace farrier::front
