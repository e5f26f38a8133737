// SPDX-License-Identifier: Apache-2.0
// Wrapping, digits and the terminal.
#include "cli/text.hpp"

#include <fmt/format.h>
#include <sys/ioctl.h>  // for TIOCGWINSZ
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>

#include "wellwright/diagnostics.hpp"

namespace wellwright::cli {

std::string wrapped(std::string_view text, int width, int first, int rest) {
  std::string lines, line(static_cast<std::size_t>(first), ' ');
  int column = first;
  bool empty = true;
  std::size_t at = 0;
  while (at < text.size()) {
    const std::size_t start = text.find_first_not_of(" \n", at);
    if (start == std::string_view::npos) break;
    const std::size_t end = std::min(text.find_first_of(" \n", start), text.size());
    const std::string_view word = text.substr(start, end - start);
    const int size = displayed_width(word);
    if (!empty && column + 1 + size > width) {
      lines += line + "\n";
      line.assign(static_cast<std::size_t>(rest), ' ');
      column = rest;
      empty = true;
    }
    if (!empty) {
      line += ' ';
      ++column;
    }
    line += word;
    column += size;
    empty = false;
    at = end;
  }
  return lines + line + "\n";
}

int decimals_for(double error, int most) {
  if (!(error > 0)) return most;
  return std::clamp(static_cast<int>(std::floor(-std::log10(error) + 1e-9)), 0, most);
}

std::string to_error(double value, double error) {
  std::string text = fmt::format("{:.{}f}", value, decimals_for(error));
  // A rounded zero carries no sign.
  if (text.starts_with('-') && text.find_first_not_of("-0.") == std::string::npos) text.erase(0, 1);
  return text;
}

std::string significant(double value, int digits) {
  if (!std::isfinite(value)) return std::isnan(value) ? "-" : (value > 0 ? "inf" : "-inf");
  if (value == 0) return "0";
  const double size = std::abs(value);
  if (size < 1e-4 || size >= 1e7) return fmt::format("{:.{}e}", value, digits - 1);
  // The place of the first digit after rounding to `digits`.
  const int first = std::stoi(fmt::format("{:.{}e}", size, digits - 1).substr(digits > 1 ? digits + 2 : 2));
  return fmt::format("{:.{}f}", value, std::max(0, digits - 1 - first));
}

int known_digits(double value, double error) {
  if (!(error > 0) || value == 0) return 8;
  return std::clamp(static_cast<int>(std::floor(std::log10(std::abs(value) / error))) + 1, 2, 8);
}

std::string counted(long long count, std::string_view noun) {
  return fmt::format("{} {}{}", count, noun, count == 1 ? "" : "s");
}

int output_width() {
  winsize size{};
  if (isatty(STDOUT_FILENO) && ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) == 0 && size.ws_col > 0)
    return std::clamp(static_cast<int>(size.ws_col), 40, 160);
  return 100;
}

bool output_and_errors_together() {
  struct stat output {};
  struct stat errors {};
  return fstat(STDOUT_FILENO, &output) == 0 && fstat(STDERR_FILENO, &errors) == 0 &&
         output.st_dev == errors.st_dev && output.st_ino == errors.st_ino;
}

bool errors_on_terminal() {
  return isatty(STDERR_FILENO) != 0;
}

}  // namespace wellwright::cli
