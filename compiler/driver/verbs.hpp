// What the verbs do: read, call the library, write.
#pragma once

#include "compiler/driver/options.hpp"

namespace farrier::driver {

/// Runs a command line to its end. Throws UserError and InternalFault; whatever was asked for on
/// standard output or as a circuit is then not written.
void run(const CommandLine& line);

}  // namespace farrier::driver
