// SPDX-License-Identifier: Apache-2.0
// Places in a file, the errors a user can cause, collected assumptions and warnings, and the progress
// callback.
#pragma once

#include <functional>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace wellwright {

/// Where something stands: file (or "--set"), line and column counted from 1 in characters; `line_text` is
/// that line, of a very long one a part that begins after `skipped` characters.
struct Place {
  std::string file;
  int line = 0;
  int column = 0;
  std::string line_text;
  int length = 1;   ///< characters marked by the caret line
  int skipped = 0;  ///< characters of the line before line_text
};

/// A mistake in what the user wrote. what() is the whole message as printed: place, sentence, quoted line
/// with a caret, hint; with a second place where two contradict each other. The command ends with exit
/// code 2.
class InputError : public std::runtime_error {
 public:
  InputError(std::string sentence, Place place, std::string hint = {});
  InputError(std::string sentence, Place place, const Place& other, std::string hint = {});
  const std::string& sentence() const { return sentence_; }
  const Place& place() const { return place_; }
  const std::string& hint() const { return hint_; }

 private:
  std::string sentence_;
  Place place_;
  std::string hint_;
};

/// An iteration that did not reach its accuracy; the command ends with exit code 3.
class NotConverged : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// A file that cannot be read or written, or is not ours; the command ends with exit code 4.
class FileTrouble : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// The user or the caller's Progress asked to stop.
class Stopped : public std::runtime_error {
 public:
  Stopped() : std::runtime_error("stopped on request") {}
};

/// Assumptions and warnings gathered on the way, in order, each once.
class Notes {
 public:
  void assume(std::string sentence);
  void warn(std::string sentence);
  const std::vector<std::string>& assumptions() const { return assumptions_; }
  const std::vector<std::string>& warnings() const { return warnings_; }

 private:
  std::vector<std::string> assumptions_;
  std::vector<std::string> warnings_;
};

/// Called with the part done (0 to 1) and what is being done; returning false asks the work to stop.
using Progress = std::function<bool(double part, std::string_view what)>;

/// The few of `candidates` nearest to `word` by edit distance, best first; empty when none is near.
std::vector<std::string> nearest(std::string_view word, const std::vector<std::string>& candidates);

/// "`a`", "`a` or `b`", "`a`, `b` or `c`"
std::string listed(const std::vector<std::string>& words);
/// "did you mean `a` or `b`?"; empty for no candidates.
std::string did_you_mean(const std::vector<std::string>& candidates);

/// Bytes of the UTF-8 character that begins at byte `at` of `text`; 0 where there is none (RFC 3629).
std::size_t utf8_bytes(std::string_view text, std::size_t at);

/// The columns a terminal needs to show UTF-8 `text`.
int displayed_width(std::string_view text);

}  // namespace wellwright
