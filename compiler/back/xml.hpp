// What every XML writer of this room needs. Numbers become text by <charconv>, never by pugixml,
// whose own conversion depends on the locale.
#pragma once

#include <cstdint>
#include <farrier/plan.hpp>
#include <pugixml.hpp>
#include <string>
#include <string_view>

namespace farrier::back {

/// Sets an attribute; the value is kept to one line of valid UTF-8.
void set(pugi::xml_node node, const char* name, std::string_view value);
void set_count(pugi::xml_node node, const char* name, std::uint64_t value);
/// The shortest text that reads back as the same double.
void set_number(pugi::xml_node node, const char* name, double value);

/// The root element with the attributes that every document carries.
pugi::xml_node add_root(pugi::xml_document& document, const char* name, std::string_view verb,
                        std::string_view job);
/// A <point> with index and time.
pugi::xml_node add_point(pugi::xml_node root, std::size_t index, double time);
/// A <contribution> for each summand, rounded up to 12 digits; shares lie inside theirs.
void add_contributions(pugi::xml_node parent, const Certificate& certificate);
void add_yardsticks(pugi::xml_node parent, const Plan& plan);

/// The document as UTF-8 text, indented by two spaces.
std::string document_text(const pugi::xml_document& document);

}  // namespace farrier::back
