// SPDX-License-Identifier: Apache-2.0
// Displayed width of UTF-8 text, and words near to a word.
#include "diagnostics/text.hpp"

#include <algorithm>
#include <cctype>
#include <numeric>

#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

struct CodeRange {
  char32_t first, last;
};

// Combining marks and joiners take no column; East Asian wide characters and emoji take two. Source: The
// Unicode Standard, general category Mn and EastAsianWidth.txt, reduced to whole blocks.
constexpr CodeRange no_column[] = {{0x0300, 0x036F}, {0x0483, 0x0489}, {0x0591, 0x05BD}, {0x0610, 0x061A},
                                   {0x064B, 0x065F}, {0x1AB0, 0x1AFF}, {0x1DC0, 0x1DFF}, {0x200B, 0x200F},
                                   {0x202A, 0x202E}, {0x2060, 0x2064}, {0x20D0, 0x20FF}, {0xFE00, 0xFE0F},
                                   {0xFE20, 0xFE2F}, {0xFEFF, 0xFEFF}};
constexpr CodeRange two_columns[] = {
    {0x1100, 0x115F}, {0x2E80, 0x303E},   {0x3041, 0x33FF},   {0x3400, 0x4DBF},   {0x4E00, 0x9FFF},
    {0xA000, 0xA4CF}, {0xAC00, 0xD7A3},   {0xF900, 0xFAFF},   {0xFE30, 0xFE4F},   {0xFF00, 0xFF60},
    {0xFFE0, 0xFFE6}, {0x1F300, 0x1F64F}, {0x1F680, 0x1F6FF}, {0x1F900, 0x1F9FF}, {0x20000, 0x3FFFD}};

template <std::size_t N>
bool within(const CodeRange (&ranges)[N], char32_t code) {
  return std::any_of(std::begin(ranges), std::end(ranges),
                     [&](const CodeRange& r) { return code >= r.first && code <= r.last; });
}

// The code at `at` and how many bytes it takes; 0 bytes where it is no UTF-8 (RFC 3629: no longer form than
// needed, no surrogates).
std::pair<char32_t, std::size_t> decode(std::string_view text, std::size_t at) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
  const unsigned char lead = byte(at);
  if (lead < 0x80) return {lead, 1};
  const std::size_t length = lead >= 0xF5 ? 0 : lead >= 0xF0 ? 4 : lead >= 0xE0 ? 3 : lead >= 0xC2 ? 2 : 0;
  if (length == 0 || at + length > text.size()) return {0, 0};
  char32_t code = lead & (0xFFu >> (length + 1));
  for (std::size_t i = 1; i < length; ++i) {
    if ((byte(at + i) & 0xC0u) != 0x80u) return {0, 0};
    code = (code << 6) | (byte(at + i) & 0x3Fu);
  }
  const char32_t least = length == 2 ? 0x80 : length == 3 ? 0x800 : 0x10000;
  if (code < least || code > 0x10FFFF || (code >= 0xD800 && code <= 0xDFFF)) return {0, 0};
  return {code, length};
}

std::string lower(std::string_view text) {
  std::string out(text);
  for (char& c : out) c = static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
  return out;
}

// Insertions, deletions, replacements and swaps of neighbours that turn a into b (F.J. Damerau, Commun. ACM
// 7, 171 (1964)).
int distance(std::string_view a, std::string_view b) {
  const std::size_t n = a.size(), m = b.size();
  std::vector<std::vector<int>> d(n + 1, std::vector<int>(m + 1, 0));
  for (std::size_t i = 0; i <= n; ++i) d[i][0] = static_cast<int>(i);
  for (std::size_t j = 0; j <= m; ++j) d[0][j] = static_cast<int>(j);
  for (std::size_t i = 1; i <= n; ++i)
    for (std::size_t j = 1; j <= m; ++j) {
      const int cost = a[i - 1] == b[j - 1] ? 0 : 1;
      d[i][j] = std::min({d[i - 1][j] + 1, d[i][j - 1] + 1, d[i - 1][j - 1] + cost});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        d[i][j] = std::min(d[i][j], d[i - 2][j - 2] + 1);
    }
  return d[n][m];
}

}  // namespace

std::vector<Character> characters_of(std::string_view text) {
  std::vector<Character> out;
  for (std::size_t at = 0; at < text.size();) {
    const auto [code, length] = decode(text, at);
    if (length == 0 || (code < 0x20 && code != '\t') || code == 0x7F)
      out.push_back({"\xEF\xBF\xBD", 0xFFFD, 1});
    else if (code == '\t')
      out.push_back({" ", code, 1});
    else
      out.push_back({std::string(text.substr(at, length)), code,
                     within(no_column, code)     ? 0
                     : within(two_columns, code) ? 2
                                                 : 1});
    at += std::max<std::size_t>(length, 1);
  }
  return out;
}

std::size_t utf8_bytes(std::string_view text, std::size_t at) {
  return decode(text, at).second;
}

int displayed_width(std::string_view text) {
  const auto characters = characters_of(text);
  return std::accumulate(characters.begin(), characters.end(), 0,
                         [](int sum, const Character& c) { return sum + c.width; });
}

std::vector<std::string> nearest(std::string_view word, const std::vector<std::string>& candidates) {
  constexpr std::size_t longest = 60, most = 3;
  if (word.empty() || word.size() > longest) return {};
  const std::string plain = lower(word);
  const int allowed = plain.size() <= 3 ? 1 : plain.size() <= 6 ? 2 : 3;
  std::vector<std::pair<int, std::string>> found;
  for (const std::string& candidate : candidates) {
    if (candidate.size() > longest) continue;
    const std::string other = lower(candidate);
    int far = distance(plain, other);
    // A word that begins or ends like a longer one is near to it as well.
    if (far > allowed && plain.size() >= 4 && (other.starts_with(plain) || other.ends_with(plain)))
      far = allowed;
    if (far <= allowed && far < static_cast<int>(std::max(plain.size(), other.size())))
      found.emplace_back(far, candidate);
  }
  std::stable_sort(found.begin(), found.end(),
                   [](const auto& a, const auto& b) { return a.first < b.first; });
  std::vector<std::string> out;
  for (const auto& [far, candidate] : found)
    if (out.size() < most && far <= found.front().first + 1 &&
        std::find(out.begin(), out.end(), candidate) == out.end())
      out.push_back(candidate);
  return out;
}

std::string listed(const std::vector<std::string>& words) {
  std::string text;
  for (std::size_t i = 0; i < words.size(); ++i) {
    if (i > 0) text += i + 1 == words.size() ? " or " : ", ";
    text += "`" + words[i] + "`";
  }
  return text;
}

std::string did_you_mean(const std::vector<std::string>& candidates) {
  return candidates.empty() ? std::string{} : "did you mean " + listed(candidates) + "?";
}

}  // namespace wellwright
