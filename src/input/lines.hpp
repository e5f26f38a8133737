// SPDX-License-Identifier: Apache-2.0
// The lines of an input text and places in them; private to the room.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "wellwright/diagnostics.hpp"

namespace wellwright {

/// A text cleaned of its byte order mark and carriage returns, cut into lines.
class Lines {
 public:
  /// Throws InputError where the text is no text: NUL and control bytes, broken UTF-8, tabs as indentation.
  Lines(std::string_view text, std::string file);
  const std::string& text() const { return text_; }
  /// The place at a 0-based line and a byte of that line.
  Place place(int line, std::size_t byte, int length = 1) const;
  /// Whether the quoted text that begins at this byte ends somewhere (the parser accepts one that does not).
  bool closes_quote(int line, std::size_t byte) const;

 private:
  void check() const;
  std::string_view line(int number) const;
  // Characters of the text before a byte; counting them from the beginning of the line would take a time that
  // grows with the square of a line's length.
  std::size_t characters_before(std::size_t byte) const;

  std::string text_, file_;
  std::vector<std::size_t> starts_;
  std::vector<std::size_t> counted_;  // characters before every `stride`-th byte
};

/// Characters (not bytes) of UTF-8 text.
int characters(std::string_view text);

}  // namespace wellwright
