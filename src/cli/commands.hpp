// SPDX-License-Identifier: Apache-2.0
// The subcommands, and what they share: the table, the study, the warnings.
#pragma once

#include <chrono>
#include <string>
#include <utility>
#include <vector>

#include "cli/command_line.hpp"
#include "wellwright/study.hpp"

namespace wellwright::cli {

/// Each returns the exit code and throws what the rooms throw.
int run(const Request& request);
int check(const Request& request);
int materials(const Request& request);

/// The built-in material table, or the one of --materials.
MaterialTable table_for(const Request& request);
/// The study file, read with its settings. A folder or a missing file is FileTrouble.
Study study_for(const Request& request, const MaterialTable& table, Notes& notes);

/// Warnings to standard error, unless a summary that shows them goes to the same place.
void print_warnings(const Notes& notes, bool in_summary);

/// Milliseconds of the parts of a command, for --verbose.
class Timings {
 public:
  void lap(std::string part);
  void add(const std::vector<std::pair<std::string, double>>& parts);
  /// Skips the time since the last lap, which `add` has told in parts.
  void skip() { last_ = std::chrono::steady_clock::now(); }
  /// On standard error.
  void print() const;

 private:
  std::vector<std::pair<std::string, double>> parts_;
  std::chrono::steady_clock::time_point last_ = std::chrono::steady_clock::now();
};

}  // namespace wellwright::cli
