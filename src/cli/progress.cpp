// SPDX-License-Identifier: Apache-2.0
// The bar and the interrupt.
#include "cli/progress.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <csignal>
#include <cstdio>

#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

constexpr int bar_width = 30;
volatile std::sig_atomic_t interrupt_seen = 0;

extern "C" void on_interrupt(int) {
  interrupt_seen = 1;
}

}  // namespace

void stop_on_interrupt() {
  struct sigaction action {};
  action.sa_handler = on_interrupt;
  action.sa_flags = SA_RESETHAND;
  sigaction(SIGINT, &action, nullptr);
}

bool interrupted() {
  return interrupt_seen != 0;
}

ProgressBar::ProgressBar(bool wanted) : wanted_(wanted && errors_on_terminal()) {}

ProgressBar::~ProgressBar() {
  if (drawn_) std::fputs("\r\x1b[K", stderr);
}

Progress ProgressBar::callback() {
  return [this](double part, std::string_view what) {
    if (wanted_) draw(part, what);
    return !interrupted();
  };
}

void ProgressBar::draw(double part, std::string_view what) {
  const int permille = static_cast<int>(std::clamp(part, 0.0, 1.0) * 1000);
  if (permille == last_permille_ && what == last_what_) return;
  if (std::chrono::steady_clock::now() - start_ < std::chrono::seconds(1)) return;
  last_permille_ = permille;
  last_what_ = what;
  const int full = permille * bar_width / 1000;
  std::fputs(fmt::format("\r\x1b[K[{}{}] {:3d} %  {}", std::string(static_cast<std::size_t>(full), '='),
                         std::string(static_cast<std::size_t>(bar_width - full), ' '), permille / 10, what)
                 .c_str(),
             stderr);
  std::fflush(stderr);
  drawn_ = true;
}

}  // namespace wellwright::cli
