// SPDX-License-Identifier: Apache-2.0
// The command `wellwright`: run, check, materials.
#pragma once

namespace wellwright {

/// Runs the command line; returns the exit code (0 fine, 2 input error, 3 not converged, 4 trouble with a
/// file).
int run_command_line(int argc, const char* const* argv);

}  // namespace wellwright
