// SPDX-License-Identifier: Apache-2.0
// What a command line asks for, read and checked.
#pragma once

#include <stdexcept>
#include <string>
#include <vector>

namespace wellwright::cli {

struct Request {
  std::string command;  ///< "run", "check", "materials"; empty when only help or the version is asked for
  bool help = false, version = false;
  std::string operand;  ///< the study file, or the name of an alloy
  std::vector<std::string> settings;
  std::string output, materials, csv, temperature, substrate, matched_to;
  bool json = false, quiet = false, verbose = false;
  int threads = 0;  ///< 0: as many as there are processors
};

/// A slip on the command line; what() is the whole message. The command ends with exit code 2.
class UsageError : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// Throws UsageError.
Request read_command_line(int argc, const char* const* argv);

}  // namespace wellwright::cli
