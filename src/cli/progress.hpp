// SPDX-License-Identifier: Apache-2.0
// A bar on standard error while long work runs, and a stop on the first interrupt.
#pragma once

#include <chrono>
#include <string>

#include "wellwright/diagnostics.hpp"

namespace wellwright::cli {

/// Shows a bar once the work has taken a second and standard error is a terminal; wipes it at the end.
class ProgressBar {
 public:
  explicit ProgressBar(bool wanted);
  ~ProgressBar();
  ProgressBar(const ProgressBar&) = delete;
  ProgressBar& operator=(const ProgressBar&) = delete;
  Progress callback();

 private:
  void draw(double part, std::string_view what);
  bool wanted_;
  bool drawn_ = false;
  int last_permille_ = -1;
  std::string last_what_;
  std::chrono::steady_clock::time_point start_ = std::chrono::steady_clock::now();
};

/// From now on the first interrupt (Ctrl-C) makes progress callbacks ask for a stop, so that the work ends
/// between two steps; a second one ends the program at once.
void stop_on_interrupt();
bool interrupted();

}  // namespace wellwright::cli
