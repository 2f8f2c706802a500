// A scan of XML 1.0 (Fifth Edition) without document type declarations; section numbers are of that
// recommendation.
#include "compiler/front/xml_text.hpp"

#include <algorithm>
#include <farrier/diagnostic.hpp>
#include <set>
#include <string>
#include <utility>

#include "compiler/front/text.hpp"

namespace farrier::front {
namespace {

constexpr std::string_view blanks = " \t\r\n";
constexpr std::size_t deepest = 32;

bool is_name_byte(char c) {
  return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '_' ||
         c == '-' || c == '.' || c == ':' || static_cast<unsigned char>(c) >= 0x80;
}

bool is_name_start(char c) {
  return is_name_byte(c) && !(c >= '0' && c <= '9') && c != '-' && c != '.';
}

/// The number of a character reference's body, such as "#65" or "#x41", or 0.
std::uint32_t referenced_character(std::string_view body) {
  const bool hexadecimal = body.substr(0, 2) == "#x";
  const std::string_view digits =
      body.substr(std::min<std::size_t>(hexadecimal ? 2 : 1, body.size()));
  std::uint32_t value = 0;
  for (const char c : digits) {
    std::uint32_t digit = 16;
    if (c >= '0' && c <= '9') digit = static_cast<std::uint32_t>(c - '0');
    if (hexadecimal && c >= 'a' && c <= 'f') digit = static_cast<std::uint32_t>(c - 'a' + 10);
    if (hexadecimal && c >= 'A' && c <= 'F') digit = static_cast<std::uint32_t>(c - 'A' + 10);
    if (digit == 16 || value > 0x10ffff) return 0;
    value = value * (hexadecimal ? 16 : 10) + digit;
  }
  return value;
}

/// Section 2.2, production [2].
bool is_character(std::uint32_t value) {
  return value == 0x9 || value == 0xa || value == 0xd || (value >= 0x20 && value <= 0xd7ff) ||
         (value >= 0xe000 && value <= 0xfffd) || (value >= 0x10000 && value <= 0x10ffff);
}

class Scanner {
 public:
  explicit Scanner(const base::SourceText& source) : source_(source), text_(source.text) {}

  std::vector<XmlElement> scan() {
    refuse_control_characters();
    while (at_ < text_.size()) {
      if (text_[at_] != '<') {
        text();
      } else if (starts("<!--")) {
        skip_past("-->", 4, "comment");
      } else if (starts("<![CDATA[")) {
        if (open_.empty()) source_.fail(at_, "text outside the root element; expected none");
        skip_past("]]>", 9, "CDATA section");
      } else if (starts("<?")) {
        skip_past("?>", 2, "processing instruction");
      } else if (starts("<!")) {
        source_.fail(at_, "document type declaration; expected none, farrier does not read them");
      } else if (starts("</")) {
        end_tag();
      } else {
        start_tag();
      }
    }
    if (!open_.empty()) {
      source_.fail(open_.back().second, "<" + std::string(open_.back().first) +
                                            "> is not closed; expected </" +
                                            std::string(open_.back().first) + ">");
    }
    if (elements_.empty()) source_.fail(text_.size(), "no element; expected <job>");
    return std::move(elements_);
  }

 private:
  [[nodiscard]] bool starts(std::string_view with) const {
    return text_.compare(at_, with.size(), with) == 0;
  }

  void refuse_control_characters() const {
    const auto wrong = std::find_if(text_.begin(), text_.end(), [](char c) {
      return static_cast<unsigned char>(c) < 0x20 && blanks.find(c) == std::string_view::npos;
    });
    if (wrong != text_.end()) {
      source_.fail(static_cast<std::size_t>(wrong - text_.begin()),
                   "control character; expected text");
    }
  }

  void skip_past(std::string_view end, std::size_t opening, const char* what) {
    const std::size_t found = text_.find(end, at_ + opening);
    if (found == std::string_view::npos) {
      source_.fail(at_, std::string(what) + " is not closed; expected " + std::string(end));
    }
    at_ = found + end.size();
  }

  /// Text between tags.
  void text() {
    const std::size_t end = std::min(text_.find('<', at_), text_.size());
    const std::size_t visible = text_.find_first_not_of(blanks, at_);
    if (open_.empty() && visible < end) {
      source_.fail(visible, "text outside the root element; expected none");
    }
    check_references(at_, end);
    at_ = end;
  }

  void check_references(std::size_t begin, std::size_t end) const {
    constexpr std::string_view named[] = {"amp", "lt", "gt", "quot", "apos"};
    const std::string_view part = text_.substr(0, end);
    for (std::size_t at = part.find('&', begin); at < end; at = part.find('&', at + 1)) {
      const std::size_t semicolon = part.find(';', at);
      if (semicolon == std::string_view::npos) {
        source_.fail(at, "'&' without an entity; expected &amp;");
      }
      const std::string_view body = part.substr(at + 1, semicolon - at - 1);
      const bool known = std::find(std::begin(named), std::end(named), body) != std::end(named);
      const bool number = body.substr(0, 1) == "#" && is_character(referenced_character(body));
      if (!known && !number) {
        source_.fail(at, "unknown entity " + in_quotes(part.substr(at, semicolon + 1 - at)) +
                             "; expected &amp; &lt; &gt; &quot; &apos; or a character's number");
      }
    }
  }

  std::string_view name(const char* what) {
    const std::size_t begin = at_;
    if (at_ >= text_.size() || !is_name_start(text_[at_])) {
      source_.fail(at_, std::string("no ") + what + " name; expected a letter");
    }
    while (at_ < text_.size() && is_name_byte(text_[at_])) ++at_;
    return text_.substr(begin, at_ - begin);
  }

  bool skip_blanks() {
    const std::size_t begin = at_;
    at_ = std::min(text_.find_first_not_of(blanks, at_), text_.size());
    return at_ > begin;
  }

  void end_tag() {
    const std::size_t begin = at_;
    at_ += 2;
    const std::string_view closed = name("element");
    skip_blanks();
    if (open_.empty() || open_.back().first != closed) {
      const std::string wanted =
          open_.empty() ? "none, no element is open" : "</" + std::string(open_.back().first) + ">";
      source_.fail(begin, "end tag </" + std::string(closed) + ">; expected " + wanted);
    }
    if (!starts(">")) source_.fail(at_, "unfinished end tag; expected >");
    ++at_;
    open_.pop_back();
  }

  void start_tag() {
    const std::size_t begin = at_++;
    if (open_.empty() && !elements_.empty()) {
      source_.fail(begin, "a second root element; expected the end of the file");
    }
    if (open_.size() == deepest) {
      source_.fail(begin,
                   "elements nested deeper than " + std::to_string(deepest) + "; expected fewer");
    }
    XmlElement element;
    element.name_at = at_;
    element.line = line_at(begin);
    const std::string_view opened = name("element");
    attributes(element, opened);
    elements_.push_back(std::move(element));
    const bool empty = starts("/>");
    if (!empty && !starts(">")) {
      source_.fail(at_, "unfinished tag <" + std::string(opened) + ">; expected an attribute or >");
    }
    at_ += empty ? 2 : 1;
    if (!empty) open_.emplace_back(opened, begin);
  }

  /// The line of an offset that is not before that of the last call.
  std::uint32_t line_at(std::size_t offset) {
    const std::string_view passed = text_.substr(counted_, offset - counted_);
    line_ += static_cast<std::uint32_t>(std::count(passed.begin(), passed.end(), '\n'));
    counted_ = offset;
    return line_;
  }

  void attributes(XmlElement& element, std::string_view owner) {
    std::set<std::string_view> seen;
    while (true) {
      const bool separated = skip_blanks();
      if (at_ >= text_.size() || !is_name_start(text_[at_])) return;
      XmlAttribute attribute;
      attribute.name_at = at_;
      if (!separated) source_.fail(at_, "no blank before an attribute; expected one");
      const std::string_view own = name("attribute");
      if (!seen.insert(own).second) {
        source_.fail(attribute.name_at, "attribute " + in_quotes(own) + " is given twice in <" +
                                            std::string(owner) + ">; expected it once");
      }
      attribute.value_at = value(own);
      element.attributes.push_back(attribute);
    }
  }

  /// Reads ="..." and returns the offset between the quotes.
  std::size_t value(std::string_view own) {
    skip_blanks();
    if (!starts("=")) {
      source_.fail(at_, "attribute " + in_quotes(own) + " without a value; expected =\"...\"");
    }
    ++at_;
    skip_blanks();
    if (!starts("\"") && !starts("'")) {
      source_.fail(at_, "the value of " + in_quotes(own) + " is not in quotes; expected =\"...\"");
    }
    const char quote = text_[at_];
    const std::size_t begin = ++at_;
    const std::size_t end = text_.find(quote, begin);
    if (end == std::string_view::npos) {
      source_.fail(begin - 1,
                   "the value of " + in_quotes(own) + " is not closed; expected " + quote);
    }
    const std::size_t less = text_.substr(0, end).find('<', begin);
    if (less != std::string_view::npos) {
      source_.fail(less, "'<' in the value of " + in_quotes(own) + "; expected &lt;");
    }
    check_references(begin, end);
    at_ = end + 1;
    return begin;
  }

  const base::SourceText& source_;
  std::string_view text_;
  std::size_t at_ = 0;
  std::size_t counted_ = 0;  ///< line feeds before this offset are in line_
  std::uint32_t line_ = 1;
  std::vector<std::pair<std::string_view, std::size_t>> open_;
  std::vector<XmlElement> elements_;
};

}  // namespace

std::vector<XmlElement> scan_xml(const base::SourceText& source) {
  return Scanner(source).scan();
}

const XmlElement& element_at(const std::vector<XmlElement>& elements, std::size_t name_at) {
  const auto found = std::lower_bound(
      elements.begin(), elements.end(), name_at,
      [](const XmlElement& element, std::size_t offset) { return element.name_at < offset; });
  if (found == elements.end() || found->name_at != name_at) {
    throw InternalFault("XML scan and XML library disagree about an element");
  }
  return *found;
}

}  // namespace farrier::front
