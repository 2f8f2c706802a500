// One rule in the common subset of Make's and Ninja's syntax: a blank and a # are escaped by a
// backslash, a $ is doubled (GNU Make manual, sections 3.1.1 and 4.3; Ninja manual, "depfile").
#include "compiler/back/depfile.hpp"

namespace farrier::back {
namespace {

std::string escaped(const std::string& path) {
  std::string text;
  for (const char character : path) {
    if (character == ' ' || character == '#') text += '\\';
    if (character == '$') text += '$';
    text += character;
  }
  return text;
}

}  // namespace

std::string depfile(const std::string& target, const std::vector<std::string>& inputs) {
  std::string rule = escaped(target) + ":";
  for (const std::string& input : inputs) rule += " \\\n  " + escaped(input);
  return rule + "\n";
}

}  // namespace farrier::back
