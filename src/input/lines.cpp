// SPDX-License-Identifier: Apache-2.0
// Lines, places and the check that a text is text.
#include "input/lines.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace wellwright {
namespace {

constexpr std::size_t longest_kept = 400;  // bytes of a line kept with each place
constexpr std::size_t kept_before = 160;   // of which before the place
constexpr std::size_t stride = 256;        // bytes between counts of characters

bool continues(char c) {
  return (static_cast<unsigned char>(c) & 0xC0u) == 0x80u;
}

}  // namespace

int characters(std::string_view text) {
  return static_cast<int>(std::count_if(text.begin(), text.end(), [](char c) { return !continues(c); }));
}

Lines::Lines(std::string_view text, std::string file) : file_(std::move(file)) {
  if (text.starts_with("\xEF\xBB\xBF")) text.remove_prefix(3);
  text_.reserve(text.size());
  for (std::size_t i = 0; i < text.size(); ++i) {
    if (text[i] != '\r') {
      text_ += text[i];
      continue;
    }
    text_ += '\n';
    if (i + 1 < text.size() && text[i + 1] == '\n') ++i;
  }
  starts_.push_back(0);
  for (std::size_t i = 0; i < text_.size(); ++i)
    if (text_[i] == '\n') starts_.push_back(i + 1);
  std::size_t count = 0;
  for (std::size_t i = 0; i < text_.size(); ++i) {
    if (i % stride == 0) counted_.push_back(count);
    count += continues(text_[i]) ? 0 : 1;
  }
  counted_.push_back(count);
  check();
}

std::size_t Lines::characters_before(std::size_t byte) const {
  const std::size_t block = byte / stride, from = block * stride;
  return counted_[block] +
         static_cast<std::size_t>(characters(std::string_view(text_).substr(from, byte - from)));
}

std::string_view Lines::line(int number) const {
  const auto at = static_cast<std::size_t>(std::clamp(number, 0, static_cast<int>(starts_.size()) - 1));
  const std::size_t start = starts_[at];
  const std::size_t end = at + 1 < starts_.size() ? starts_[at + 1] - 1 : text_.size();
  return std::string_view(text_).substr(start, end - start);
}

Place Lines::place(int number, std::size_t byte, int length) const {
  const std::string_view whole = line(number);
  byte = std::min(byte, whole.size());
  Place place;
  place.file = file_;
  place.line = std::clamp(number, 0, static_cast<int>(starts_.size()) - 1) + 1;
  const auto start = static_cast<std::size_t>(whole.data() - text_.data());
  const std::size_t before_line = characters_before(start);
  place.column = static_cast<int>(characters_before(start + byte) - before_line) + 1;
  place.length = std::max(1, length);
  std::size_t first = 0, last = whole.size();
  if (last > longest_kept) {
    first = byte > kept_before ? byte - kept_before : 0;
    while (first > 0 && continues(whole[first])) --first;
    last = std::min(last, first + longest_kept);
    while (last < whole.size() && continues(whole[last])) --last;
  }
  place.skipped = static_cast<int>(characters_before(start + first) - before_line);
  place.line_text = std::string(whole.substr(first, last - first));
  return place;
}

bool Lines::closes_quote(int number, std::size_t byte) const {
  const auto at = static_cast<std::size_t>(std::clamp(number, 0, static_cast<int>(starts_.size()) - 1));
  const std::size_t open = text_.find_first_of("\"'", starts_[at] + byte);
  if (open == std::string::npos) return true;  // no quoted text after all
  const char quote = text_[open];
  for (std::size_t i = open + 1; i < text_.size(); ++i) {
    if (quote == '"' && text_[i] == '\\') {
      ++i;
    } else if (text_[i] == quote) {
      if (quote == '"' || i + 1 == text_.size() || text_[i + 1] != '\'') return true;
      ++i;  // two single quotes stand for one
    }
  }
  return false;
}

void Lines::check() const {
  for (std::size_t number = 0; number < starts_.size(); ++number) {
    const int row = static_cast<int>(number);
    const std::string_view whole = line(row);
    for (std::size_t at = 0; at < whole.size();) {
      const auto byte = static_cast<unsigned char>(whole[at]);
      if ((byte < 0x20 && byte != '\t') || byte == 0x7F)
        throw InputError(fmt::format("this is no text: it holds the byte 0x{:02X}", byte), place(row, at),
                         "a study is a plain text file");
      const std::size_t length = utf8_bytes(whole, at);
      if (length == 0)
        throw InputError(fmt::format("the byte 0x{:02X} is no UTF-8", byte), place(row, at),
                         "save the file in UTF-8");
      at += length;
    }
    const std::size_t indent = std::min(whole.find_first_not_of(" \t"), whole.size());
    const std::size_t tab = whole.substr(0, indent).find('\t');
    if (tab != std::string_view::npos && indent < whole.size() && whole[indent] != '#')
      throw InputError("a tab stands in the indentation", place(row, tab), "indent with blanks");
  }
}

}  // namespace wellwright
