// The XML scan: positions, and well-formedness by XML 1.0 (Fifth Edition), sections as named.
#include "compiler/front/xml_text.hpp"

#include <doctest/doctest.h>

#include <string>

using namespace farrier;
using namespace farrier::front;

namespace {

/// "line:column message", or "accepted".
std::string verdict(const std::string& text) {
  try {
    scan_xml(base::SourceText{"input.xml", text});
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::bad_data);
    const Diagnostic& first = error.diagnostics().at(0);
    return std::to_string(first.line) + ":" + std::to_string(first.column) + " " + first.message;
  }
  return "accepted";
}

}  // namespace

TEST_CASE("positions of elements and attributes are those of the text") {
  const base::SourceText source{"a", "<?xml version='1.0'?>\n<job  a = \"1\"\n b='2'>t<x/></job>"};
  const std::vector<XmlElement> elements = scan_xml(source);
  REQUIRE(elements.size() == 2);
  CHECK(source.text.substr(elements[0].name_at, 3) == "job");
  CHECK(elements[0].line == 2);
  REQUIRE(elements[0].attributes.size() == 2);
  CHECK(source.text.substr(elements[0].attributes[0].name_at, 1) == "a");
  CHECK(source.text.substr(elements[0].attributes[0].value_at, 2) == "1\"");
  CHECK(source.text.substr(elements[0].attributes[1].name_at, 1) == "b");
  CHECK(source.text.substr(elements[0].attributes[1].value_at, 2) == "2'");
  CHECK(elements[1].line == 3);
  CHECK(&element_at(elements, elements[1].name_at) == &elements[1]);
  CHECK_THROWS_AS(element_at(elements, 0), InternalFault);
}

TEST_CASE("well-formed documents pass") {
  for (const char* text :
       {"<a/>", "<a></a>", "<a ></a >", " \n<a/>\n ", "<!-- c --><a/><!-- c -->",
        "<a><!-- <b> & --></a>", "<a><![CDATA[<b> &]]></a>", "<a><?p <b> ?></a>",
        "<a b='\"' c=\"'\"/>", "<a b='&lt;&#65;&#x1F600;&apos;'>&amp;&gt;&quot;</a>",
        "<a-b_c.d:e/>", "<\xc3\xa9/>", "<a b='>'/>", "<a>]]></a>"}) {
    CAPTURE(text);
    CHECK(verdict(text) == "accepted");
  }
}

TEST_CASE("what is not well formed is refused where it stands") {
  const struct {
    const char* text;
    const char* expected;
  } cases[] = {
      {"", "1:1 no element; expected <job>"},
      {"  \n", "2:1 no element; expected <job>"},
      {"x<a/>", "1:1 text outside the root element; expected none"},
      {"<a/>\nx", "2:1 text outside the root element; expected none"},
      {"<![CDATA[x]]><a/>", "1:1 text outside the root element; expected none"},
      {"<a/><b/>", "1:5 a second root element; expected the end of the file"},
      {"<a>", "1:1 <a> is not closed; expected </a>"},
      {"<a><b></a>", "1:7 end tag </a>; expected </b>"},
      {"</a>", "1:1 end tag </a>; expected none, no element is open"},
      {"<a></a", "1:7 unfinished end tag; expected >"},
      {"<a", "1:3 unfinished tag <a>; expected an attribute or >"},
      {"<a b='1'", "1:9 unfinished tag <a>; expected an attribute or >"},
      {"<1a/>", "1:2 no element name; expected a letter"},
      {"< a/>", "1:2 no element name; expected a letter"},
      {"<a 1='x'/>", "1:4 unfinished tag <a>; expected an attribute or >"},
      {"<a b/>", "1:5 attribute 'b' without a value; expected =\"...\""},
      {"<a b=1/>", "1:6 the value of 'b' is not in quotes; expected =\"...\""},
      {"<a b='1/>", "1:6 the value of 'b' is not closed; expected '"},
      {"<a b='<'/>", "1:7 '<' in the value of 'b'; expected &lt;"},
      {"<a b='1'c='2'/>", "1:9 no blank before an attribute; expected one"},
      {"<a b='1' b='2'/>", "1:10 attribute 'b' is given twice in <a>; expected it once"},
      {"<a>&</a>", "1:4 '&' without an entity; expected &amp;"},
      {"<a>&nbsp;</a>",
       "1:4 unknown entity '&nbsp;'; expected &amp; &lt; &gt; &quot; &apos; or a character's "
       "number"},
      {"<a b='&#0;'/>",
       "1:7 unknown entity '&#0;'; expected &amp; &lt; &gt; &quot; &apos; or a character's "
       "number"},
      {"<a b='&#xD800;'/>",
       "1:7 unknown entity '&#xD800;'; expected &amp; &lt; &gt; &quot; &apos; or a character's "
       "number"},
      {"<a b='&#99999999999;'/>",
       "1:7 unknown entity '&#99999999999;'; expected &amp; &lt; &gt; &quot; &apos; or a "
       "character's number"},
      {"<a><!-- b</a>", "1:4 comment is not closed; expected -->"},
      {"<!--><a/>", "1:1 comment is not closed; expected -->"},
      {"<a><![CDATA[b</a>", "1:4 CDATA section is not closed; expected ]]>"},
      {"<?xml", "1:1 processing instruction is not closed; expected ?>"},
      {"<!DOCTYPE a><a/>",
       "1:1 document type declaration; expected none, farrier does not read them"},
      {"<a>\x01</a>", "1:4 control character; expected text"},
  };
  for (const auto& row : cases) {
    CAPTURE(row.text);
    CHECK(verdict(row.text) == row.expected);
  }
}

TEST_CASE("elements nest 32 deep and no deeper") {
  const auto nested = [](int depth) {
    std::string open;
    std::string close;
    for (int k = 0; k < depth; ++k) {
      open += "<a>";
      close += "</a>";
    }
    return open + close;
  };
  CHECK(verdict(nested(32)) == "accepted");
  CHECK(verdict(nested(33)) == "1:97 elements nested deeper than 32; expected fewer");
  CHECK(verdict(nested(1'000'000)) == "1:97 elements nested deeper than 32; expected fewer");
}
