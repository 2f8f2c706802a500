// The program's entry: signals, and the one place where errors are caught.
#include <csignal>
#include <exception>
#include <farrier/diagnostic.hpp>
#include <new>
#include <string>
#include <vector>

#include "compiler/base/files.hpp"
#include "compiler/driver/options.hpp"
#include "compiler/driver/text.hpp"
#include "compiler/driver/verbs.hpp"

namespace {

using namespace farrier;

/// Leaves no temporary behind, and dies of the signal, so that the shell sees 128 + its number.
extern "C" void die_of(int signal) {
  base::discard_temporary();
  std::signal(signal, SIG_DFL);
  std::raise(signal);
}

/// A signal that was ignored when the program was started stays ignored. A closed pipe is an error
/// of the write (EPIPE), not a signal.
void prepare_signals() {
  for (const int signal : {SIGINT, SIGTERM, SIGHUP})
    if (std::signal(signal, SIG_IGN) != SIG_IGN) std::signal(signal, die_of);
  std::signal(SIGPIPE, SIG_IGN);
}

ExitCode give_up(const std::string& why) {
  driver::write_error("farrier: " + why + "\n");
  return ExitCode::internal_fault;
}

ExitCode run(const std::vector<std::string>& words) {
  try {
    driver::run(driver::parse(words));
    return ExitCode::done;
  } catch (const UserError& error) {
    for (const Diagnostic& diagnostic : error.diagnostics())
      driver::write_error(driver::diagnostic_text(diagnostic, driver::error_wants_colour()));
    return error.code();
  } catch (const std::bad_alloc&) {
    return give_up("out of memory; the circuit was not written");
  } catch (const std::exception& fault) {
    return give_up(std::string("internal fault: ") + fault.what());
  }
}

}  // namespace

int main(int argc, char** argv) {
  prepare_signals();
  return static_cast<int>(run({argv + (argc > 0 ? 1 : 0), argv + argc}));
}
