// What every XML writer of this room needs.
#include "compiler/back/xml.hpp"

#include <farrier/version.hpp>
#include <sstream>

#include "compiler/back/text.hpp"
#include "compiler/base/numbers.hpp"

namespace farrier::back {

void set(pugi::xml_node node, const char* name, std::string_view value) {
  node.append_attribute(name).set_value(one_line(value).c_str());
}

void set_count(pugi::xml_node node, const char* name, std::uint64_t value) {
  set(node, name, std::to_string(value));
}

void set_number(pugi::xml_node node, const char* name, double value) {
  set(node, name, base::shortest(value));
}

pugi::xml_node add_root(pugi::xml_document& document, const char* name, std::string_view verb,
                        std::string_view job) {
  pugi::xml_node declaration = document.append_child(pugi::node_declaration);
  set(declaration, "version", "1.0");
  set(declaration, "encoding", "UTF-8");
  pugi::xml_node root = document.append_child(name);
  set(root, "program", "farrier");
  set(root, "version", version);
  set(root, "verb", verb);
  set(root, "job", job);
  return root;
}

pugi::xml_node add_point(pugi::xml_node root, std::size_t index, double time) {
  pugi::xml_node point = root.append_child("point");
  set_count(point, "index", index);
  set_number(point, "time", time);
  return point;
}

void add_contributions(pugi::xml_node parent, const Certificate& certificate) {
  constexpr int digits = 12;  // so that the sum agrees with the bound in every digit shown of it
  pugi::xml_node summand = parent;
  for (const Contribution& contribution : certificate.contributions) {
    pugi::xml_node node = (contribution.counts ? parent : summand).append_child("contribution");
    if (contribution.counts) summand = node;
    set(node, "name", contribution.name);
    set(node, "value", base::rounded_up(contribution.value, digits));
    set(node, "method", contribution.method);
    set(node, "counts", contribution.counts ? "yes" : "no");
  }
}

void add_yardsticks(pugi::xml_node parent, const Plan& plan) {
  for (const Yardstick& yardstick : plan.yardsticks) {
    pugi::xml_node node = parent.append_child("yardstick");
    set(node, "name", yardstick.name);
    set_count(node, "steps", yardstick.steps);
  }
}

std::string document_text(const pugi::xml_document& document) {
  std::ostringstream out;
  document.save(out, "  ", pugi::format_indent, pugi::encoding_utf8);
  return std::move(out).str();
}

}  // namespace farrier::back
