// SPDX-License-Identifier: Apache-2.0
// The text of an input error: place, sentence, quoted line with a caret, hint.
#include <fmt/format.h>

#include <algorithm>

#include "diagnostics/text.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

constexpr int widest_quote = 100;  // columns of a quoted line
constexpr int lead = 30;           // columns kept before the caret of a longer one

std::string heading(const Place& place) {
  if (place.file.empty()) return {};
  if (place.line <= 0 || place.file == "--set") return place.file + ": ";
  return fmt::format("{}:{}:{}: ", place.file, place.line, place.column);
}

// The quoted line, cut to what a terminal shows, and the carets below it.
std::string quotation(const Place& place) {
  if (place.line_text.empty()) return {};
  std::vector<Character> line = characters_of(place.line_text);
  std::size_t caret = std::min<std::size_t>(
      static_cast<std::size_t>(std::max(place.column - place.skipped, 1)) - 1, line.size());
  const auto width = [&](std::size_t from, std::size_t to) {
    int sum = 0;
    for (std::size_t i = from; i < to; ++i) sum += line[i].width;
    return sum;
  };
  std::size_t first = 0, last = line.size();
  if (width(0, last) > widest_quote) {
    while (first < caret && width(first, caret) > lead) ++first;
    while (last > caret + 1 && width(first, last) > widest_quote) --last;
  }
  const bool cut = first > 0 || place.skipped > 0;
  std::string shown = cut ? "... " : "";
  int before = cut ? 4 : 0;
  for (std::size_t i = first; i < last; ++i) shown += line[i].text;
  if (last < line.size()) shown += " ...";
  before += width(first, std::min(caret, last));
  const std::size_t marked_end = std::min(last, caret + static_cast<std::size_t>(std::max(place.length, 1)));
  const int marked = std::max(1, width(std::min(caret, last), std::max(marked_end, std::min(caret, last))));
  return fmt::format("\n  {}\n  {:>{}}{}", shown, "", before,
                     std::string(static_cast<std::size_t>(marked), '^'));
}

std::string message(const std::string& sentence, const Place& place, const Place* other,
                    const std::string& hint) {
  std::string text = heading(place) + sentence + quotation(place);
  if (other && (!other->file.empty() || !other->line_text.empty()))
    text += fmt::format("\n{}and here{}", heading(*other), quotation(*other));
  if (!hint.empty()) text += "\n  " + hint;
  return text;
}

}  // namespace

InputError::InputError(std::string sentence, Place place, std::string hint)
    : std::runtime_error(message(sentence, place, nullptr, hint)),
      sentence_(std::move(sentence)),
      place_(std::move(place)),
      hint_(std::move(hint)) {}

InputError::InputError(std::string sentence, Place place, const Place& other, std::string hint)
    : std::runtime_error(message(sentence, place, &other, hint)),
      sentence_(std::move(sentence)),
      place_(std::move(place)),
      hint_(std::move(hint)) {}

}  // namespace wellwright
