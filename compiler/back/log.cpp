// The pass log: what every pass saw and did, and how the certificate adds up.
#include "compiler/back/log.hpp"

#include <array>
#include <charconv>

#include "compiler/back/summary.hpp"
#include "compiler/back/text.hpp"
#include "compiler/back/xml.hpp"
#include "compiler/base/numbers.hpp"

namespace farrier::back {
namespace {

/// A count that is shown before and after a pass.
struct Shown {
  const char* name;
  std::uint64_t (*value)(const CircuitCounts&);
};

const std::array<Shown, 4> shown_counts{{
    {"gates", [](const CircuitCounts& counts) { return counts.gates(); }},
    {"two-qubit-gates", [](const CircuitCounts& counts) { return counts.two_qubit_gates; }},
    {"depth", [](const CircuitCounts& counts) { return counts.depth; }},
    {"rotations", [](const CircuitCounts& counts) { return counts.rotations; }},
}};

std::string seconds_text(double seconds) {
  std::array<char, 32> buffer{};
  const bool whole = seconds >= 1.0;
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(),
                                 whole ? seconds : 1e3 * seconds, std::chars_format::fixed, 2)
                       .ptr;
  return std::string(buffer.data(), end) + (whole ? " s" : " ms");
}

/// A line with the name on the left and the time at the right edge.
void append_timed(std::string& out, const std::string& name, double seconds) {
  const std::string time = seconds_text(seconds);
  const std::size_t taken = 2 + columns(name) + time.size();
  out.append("  ").append(name).append(taken < line_width ? line_width - taken : 1, ' ');
  out.append(time).append("\n");
}

void append_change(std::string& out, const CountsChange& change) {
  std::string words;
  for (const Shown& count : shown_counts) {
    const std::uint64_t before = count.value(change.before);
    const std::uint64_t after = count.value(change.after);
    if (!words.empty()) words += ", ";
    words += count.name;
    words += ' ' + std::to_string(before);
    if (after != before) words += " -> " + std::to_string(after);
  }
  append_wrapped(out, "    ", words);
}

void append_pass(std::string& out, const PassEntry& pass) {
  append_timed(out, pass.name, pass.seconds);
  append_wrapped(out, "    ", one_line(pass.description));
  for (const std::string& note : pass.notes) append_wrapped(out, "    - ", one_line(note));
  if (pass.counts) append_change(out, *pass.counts);
}

void append_certificate(std::string& out, const Plan& plan,
                        const std::optional<double>& tolerance) {
  const Certificate& certificate = plan.certificate;
  append_wrapped(out, "  ",
                 "certificate: at most " + bound_text(certificate.bound, tolerance) + ", " +
                     std::string(assurance_word(certificate.assurance)) + " in " +
                     metric_words(certificate) +
                     (certificate.contributions.empty() ? "" : ", the sum of"));
  for (const Contribution& one : certificate.contributions) {
    std::string words = base::rounded_up(one.value);
    words.append(" ").append(one.name);
    if (!one.method.empty()) words.append(" (").append(one.method).append(")");
    append_wrapped(out, one.counts ? "    + " : "        of which ", one_line(words));
  }
  for (const Yardstick& yardstick : plan.yardsticks) {
    append_wrapped(out, "  ",
                   one_line("yardstick: " + std::to_string(yardstick.steps) + " steps by the " +
                            yardstick.name));
  }
}

void add_counts(pugi::xml_node pass, const char* name, const CircuitCounts& counts) {
  pugi::xml_node node = pass.append_child(name);
  for (const Shown& count : shown_counts) set_count(node, count.name, count.value(counts));
}

void add_pass(pugi::xml_node point, const PassEntry& pass) {
  pugi::xml_node node = point.append_child("pass");
  set(node, "name", pass.name);
  set(node, "description", pass.description);
  for (const std::string& note : pass.notes) {
    node.append_child("note").append_child(pugi::node_pcdata).set_value(one_line(note).c_str());
  }
  if (!pass.counts) return;
  add_counts(node, "before", pass.counts->before);
  add_counts(node, "after", pass.counts->after);
}

}  // namespace

std::string log_text(const Result& result) {
  std::string out;
  for (const Point& point : result.points) {
    append_wrapped(
        out, "",
        one_line(result.job) + ", time " + time_text(point.plan.time, result.settings.time_unit));
    double total = 0.0;
    for (const PassEntry& pass : point.log) {
      append_pass(out, pass);
      total += pass.seconds;
    }
    append_timed(out, "all passes", total);
    append_certificate(out, point.plan, result.settings.budget.tolerance);
  }
  return out;
}

std::string log_xml(const Result& result, std::string_view verb) {
  pugi::xml_document document;
  pugi::xml_node root = add_root(document, "log", verb, result.job);
  for (const Point& point : result.points) {
    pugi::xml_node node = add_point(root, point.index, point.plan.time);
    for (const PassEntry& pass : point.log) add_pass(node, pass);
    const std::optional<double>& tolerance = result.settings.budget.tolerance;
    pugi::xml_node certificate = node.append_child("certificate");
    set(certificate, "assurance", assurance_word(point.plan.certificate.assurance));
    set(certificate, "metric", metric_words(point.plan.certificate));
    set(certificate, "bound", bound_text(point.plan.certificate.bound, tolerance));
    add_contributions(certificate, point.plan.certificate);
    add_yardsticks(node, point.plan);
  }
  return document_text(document);
}

}  // namespace farrier::back
