// The command line: what is taken, what is refused and with which words, and what it does to a job.
// The contract is farrier's own, so the expectations stand here in full.
#include "compiler/driver/options.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <farrier/formula.hpp>
#include <set>
#include <string>
#include <vector>

using namespace farrier;
using namespace farrier::driver;

namespace {

using Words = std::vector<std::string>;

/// The words before the operand's place: a verb, an input, and what is being tested.
Words words(const std::string& verb, const Words& options) {
  Words all = {verb, "chain.pauli"};
  all.insert(all.end(), options.begin(), options.end());
  return all;
}

std::string refusal(const Words& line) {
  try {
    parse(line);
  } catch (const UserError& error) {
    CHECK(error.code() == ExitCode::usage);
    CHECK(error.diagnostics().front().file.empty());
    return error.what();
  }
  return "taken";
}

Job applied(const Words& options) {
  Job job;
  apply_options(parse(words("compile", options)), job);
  return job;
}

}  // namespace

TEST_CASE("a verb, its input and options in any order") {
  const CommandLine line = parse({"compile", "--time", "2", "chain.pauli", "-o", "chain.qasm"});
  CHECK(line.verb == Verb::compile);
  CHECK(line.operand == "chain.pauli");
  CHECK(line.run.output == "chain.qasm");
  REQUIRE(line.options.size() == 2);
  CHECK(line.options[0].option->name == "time");
  CHECK(line.options[1].option->name == "output");
}

TEST_CASE("a dash alone is standard input") {
  CHECK(parse({"inspect", "-"}).operand == "-");
}

TEST_CASE("words behind two dashes are no options") {
  CHECK(parse({"compile", "--time", "1", "--", "--odd-name.pauli"}).operand == "--odd-name.pauli");
}

TEST_CASE("a negative value stands behind a blank or an equals sign") {
  CHECK(applied({"--time", "-1"}).times == std::vector<double>{-1.0});
  CHECK(applied({"--time=-1"}).times == std::vector<double>{-1.0});
  CHECK(applied({"--time=-.5e-1"}).times == std::vector<double>{-0.05});
}

TEST_CASE("a short option takes its value attached or behind a blank") {
  CHECK(parse(words("compile", {"-oout.qasm"})).run.output == "out.qasm");
  CHECK(parse(words("compile", {"-qo", "out.qasm"})).run.output == "out.qasm");
  CHECK(parse(words("compile", {"-qo", "out.qasm"})).run.quiet);
}

TEST_CASE("help is asked for anywhere behind a verb") {
  CHECK(parse({"--help"}).help);
  CHECK(parse({"-h"}).help);
  CHECK(parse({"survey", "--help"}).verb == Verb::survey);
  CHECK(parse({"compile", "x.pauli", "--no-such", "--help"}).help);
  CHECK(parse({"audit", "--help"}).help);
  CHECK(parse({"--version"}).version);
}

TEST_CASE("a missing or unknown verb is refused") {
  CHECK(refusal({}) == "no verb is given; `farrier --help` shows them");
  CHECK(refusal({"compil"}) == "'compil' is no verb; the nearest one is 'compile'");
  CHECK(refusal({"transmogrify"}) ==
        "'transmogrify' is no verb; expected one of compile, survey, inspect, audit and list");
  CHECK(refusal({"--time", "1"}) ==
        "--time stands where the verb should be; expected `farrier VERB INPUT [options]`");
}

TEST_CASE("no input and two inputs are refused") {
  CHECK(refusal({"compile", "--time", "1"}) ==
        "nothing stands behind compile; expected `farrier compile INPUT [options]`");
  CHECK(refusal({"compile", "a.pauli", "b.pauli"}) ==
        "'b.pauli' is one word too many; expected `farrier compile INPUT [options]`");
}

TEST_CASE("a misspelt option is refused with the nearest one") {
  CHECK(refusal(words("compile", {"--tolerence", "1e-3"})) ==
        "--tolerence is no option of compile; the nearest one is --tolerance");
  CHECK(refusal(words("compile", {"--minimize=gates"})) ==
        "--minimize is no option of compile; the nearest one is --minimise");
  CHECK(refusal(words("compile", {"--zzzzzzzzzzzz"})) ==
        "--zzzzzzzzzzzz is no option of compile; `farrier compile --help` shows those that are");
  CHECK(refusal(words("compile", {"-z"})) ==
        "-z is no option of compile; `farrier compile --help` shows those that are");
}

TEST_CASE("abbreviations are not accepted") {
  CHECK(refusal(words("compile", {"--tol", "1e-3"})) ==
        "--tol is no option of compile; the nearest one is --tolerance");
  CHECK(refusal(words("compile", {"--toleranc", "1e-3"})) ==
        "--toleranc is no option of compile; the nearest one is --tolerance");
}

TEST_CASE("an option of another verb is refused with the verbs that take it") {
  CHECK(refusal(words("inspect", {"--time", "1"})) ==
        "--time is no option of inspect; it belongs to compile, survey and audit");
  CHECK(refusal(words("survey", {"--style", "flat"})) ==
        "--style is no option of survey; it belongs to compile and audit");
  CHECK(refusal(words("survey", {"-o", "x"})) ==
        "--output is no option of survey; it belongs to compile");
  CHECK(refusal(words("compile", {"--against", "x"})) ==
        "--against is no option of compile; it belongs to audit");
  CHECK(refusal({"list", "units", "-q"}) ==
        "--quiet is no option of list; it belongs to compile, survey, inspect and audit");
}

TEST_CASE("inspect takes no output option but the summary") {
  CHECK(refusal(words("inspect", {"--summary", "x.xml"})) == "taken");
  for (const char* option : {"-o", "--log", "--depfile", "--report", "--tolerance", "--native"})
    CHECK_MESSAGE(refusal(words("inspect", {option, "1"})) != "taken", option);
}

TEST_CASE("a repeated option is refused") {
  CHECK(refusal(words("compile", {"--time", "1", "--time", "1"})) ==
        "--time is given twice; expected it once");
  CHECK(refusal(words("compile", {"-q", "--quiet"})) == "--quiet is given twice; expected it once");
}

TEST_CASE("a missing value is refused") {
  const std::string wanted = "--time needs a value; expected --time T";
  CHECK(refusal(words("compile", {"--time"})) == wanted);
  CHECK(refusal(words("compile", {"--time="})) == wanted);
  CHECK(refusal(words("compile", {"-o"})) == "--output needs a value; expected --output FILE");
  CHECK(refusal(words("compile", {"-o", "-q"})) ==
        "--output needs a value; expected --output FILE");
  CHECK(refusal(words("compile", {"--summary", "--quiet"})) ==
        "--summary needs a value; expected --summary FILE");
  CHECK(refusal(words("compile", {"--quiet=3"})) ==
        "--quiet takes no value; expected the option alone");
}

TEST_CASE("what this version does not have is refused") {
  CHECK(refusal({"audit", "a.qasm", "--against", "a.pauli"}) ==
        "the verb audit is not available in this version");
  for (const std::string option : {"--device", "--memory-limit", "--report", "--share"})
    CHECK(refusal(words("compile", {option, "x"})) == option + " is not available in this version");
  CHECK(refusal(words("compile", {"--time", "0.5,1"})) ==
        "--time cannot be '0.5,1'; several times are not available in this version, expected one");
  CHECK(refusal(words("compile", {"--time", "0:4:9"})) ==
        "--time cannot be '0:4:9'; several times are not available in this version, expected one");
}

TEST_CASE("a wrong value is refused with what was expected") {
  struct Case {
    std::string option;
    std::vector<std::string> values;
    std::string expected;
  };
  const std::vector<Case> cases = {
      {"--time", {"x", "nan", "inf", "1e999", "1 ", ""}, "expected a finite number"},
      {"--tolerance", {"0", "-1", "nan", "inf", "1e-3x"}, "expected a finite number above 0"},
      {"--assurance", {"sure", "Certified"}, "expected certified or average"},
      {"--minimise", {"time"}, "expected gates, depth, duration, rotations or error"},
      {"--max-two-qubit-gates",
       {"-1", "1.5", "1e3"},
       "expected a whole number from 0 to 18446744073709551615"},
      {"--max-depth", {"-1", "x"}, "expected a whole number from 0 to 18446744073709551615"},
      {"--formula", {"suzuki-44"}, "the nearest known one is 'suzuki-4'"},
      {"--order", {"3", "2,x", "x", "0", ","}, ""},
      {"--steps",
       {"0", "-3", "1.0", "1000000000000001"},
       "expected a whole number from 1 to 1000000000000000"},
      {"--native", {"cy"}, "expected cx, cz, ecr, iswap, rzz or rxx"},
      {"--style", {"round"}, "expected flat or looped"},
      {"--relabel", {"maybe"}, "expected yes or no"},
      {"--barriers", {"all"}, "expected none or steps"},
      {"--effort", {"9"}, "expected low, normal or high"},
      {"--seed",
       {"-1", "18446744073709551616"},
       "expected a whole number from 0 to 18446744073709551615"},
      {"--threads", {"0", "-2", "x", "1025"}, "expected a whole number from 1 to 1024"},
      {"--progress", {"sometimes"}, "expected auto, always or never"},
      {"--input-kind", {"yaml"}, "expected xml, pauli or fcidump"},
  };
  for (const Case& one : cases) {
    for (const std::string& value : one.values) {
      const std::string found = refusal(words("compile", {one.option, value}));
      INFO(one.option << " " << value << ": " << found);
      CHECK(found.starts_with(one.option + " cannot be '" + value + "'; "));
      CHECK(found.ends_with(one.expected));
    }
  }
}

TEST_CASE("every option reaches its setting") {
  CHECK(applied({"--tolerance", "1e-4"}).budget.tolerance == 1e-4);
  CHECK(applied({"--assurance", "average"}).budget.assurance == Assurance::average);
  CHECK(applied({"--up-to-phase"}).budget.up_to_phase);
  CHECK(applied({"--minimise", "rotations"}).budget.minimise == Objective::rotations);
  CHECK(applied({"--max-two-qubit-gates", "0"}).budget.max_two_qubit_gates == 0U);
  CHECK(applied({"--max-depth", "70"}).budget.max_depth == 70U);
  CHECK(applied({"--formula", "strang,exact"}).restriction.formulas ==
        std::vector<std::string>{"strang", "exact"});
  CHECK(applied({"--order", "4,2"}).restriction.orders == std::vector<int>{4, 2});
  CHECK(applied({"--steps", "12"}).restriction.steps == 12U);
  CHECK(applied({"--native", "iswap"}).output.native == Native::iswap);
  CHECK(applied({"--style", "looped"}).output.style == Style::looped);
  CHECK(applied({"--relabel", "no"}).output.relabel == false);
  CHECK(applied({"--barriers", "steps"}).output.barriers == Barriers::steps);
  CHECK(applied({"--effort", "high"}).search.effort == Effort::high);
  CHECK(applied({"--seed", "18446744073709551615"}).search.seed == 18446744073709551615U);
  const Run run = parse(words("compile", {"--threads", "3", "--summary", "s", "--log", "l",
                                          "--depfile", "d", "--explain", "--skip-check",
                                          "--progress", "never", "--input-kind", "xml"}))
                      .run;
  CHECK(run.threads == 3U);
  CHECK(run.summary == "s");
  CHECK(run.log == "l");
  CHECK(run.depfile == "d");
  CHECK(run.explain);
  CHECK(run.progress == ShowProgress::never);
  CHECK(run.kind == InputKind::xml);
}

TEST_CASE("a list holds nothing twice") {
  CHECK(refusal(words("compile", {"--order", "2,4,2"})) ==
        "--order cannot be '2,4,2'; '2' is given twice, expected once");
}

TEST_CASE("a list of formulas names the one that is wrong") {
  CHECK(refusal(words("compile", {"--formula", "strang,suzuki-44"})) ==
        "--formula cannot be 'strang,suzuki-44'; of 'suzuki-44', the nearest known one is "
        "'suzuki-4'");
}

TEST_CASE("the canonical command holds what changes the circuit in table order") {
  Job job;
  apply_options(parse({"compile", "some/folder/chain.pauli", "-q", "--steps", "7", "--native=cz",
                       "--time", "+0.50", "-o", "x.qasm", "--up-to-phase", "--threads", "2"}),
                job);
  CHECK(job.command == "compile chain.pauli --time 0.5 --up-to-phase --steps 7 --native cz");
}

TEST_CASE("an option that replaces a setting of the job file is reported") {
  Job job;
  job.times = {2.0};
  job.budget.tolerance = 1e-3;
  job.output.native = Native::cz;
  const auto notes = apply_options(
      parse({"compile", "a.xml", "--time", "1.5", "--tolerance", "1e-3", "--style", "flat"}), job);
  CHECK(notes == std::vector<std::string>{"--time 1.5 replaces 2 of the job file"});
  CHECK(job.times == std::vector<double>{1.5});
  CHECK(job.output.native == Native::cz);
}

TEST_CASE("names and letters of options are unique and every row is complete") {
  std::set<std::string_view> names;
  std::set<char> letters;
  for (const OptionInfo& option : option_table()) {
    INFO(option.name);
    CHECK(names.insert(option.name).second);
    CHECK((option.letter == 0 || letters.insert(option.letter).second));
    CHECK(!option.meaning.empty());
    CHECK(option.verbs != 0);
    CHECK((option.verbs & only(Verb::list)) == 0);
    // What changes the circuit changes what is audited.
    if (option.changes_circuit()) CHECK((option.verbs & only(Verb::audit)) != 0);
  }
}

TEST_CASE("defaults in the table are those of a job") {
  const Job job;
  for (const OptionInfo& option : option_table()) {
    if (!option.changes_circuit() || option.show(job).empty()) continue;
    INFO(option.name);
    CHECK(option.show(job) == option.standard);
  }
}
