// SPDX-License-Identifier: Apache-2.0
// Fitting and aligning tables.
#include "cli/table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cassert>
#include <optional>

#include "cli/text.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright::cli {
namespace {

constexpr int indent = 2, gap = 2;

// Where the decimal point of a number stands, or would stand.
std::size_t point_of(const std::string& cell) {
  return std::min(cell.find_first_of(".e "), cell.size());
}

std::string spaces(int count) {
  return std::string(static_cast<std::size_t>(std::max(count, 0)), ' ');
}

// `text` in at most `width` columns, cut with an ellipsis at a character boundary.
std::string shortened(const std::string& text, int width) {
  if (displayed_width(text) <= width) return text;
  std::string part = text;
  while (!part.empty() && displayed_width(part) > width - 1) {
    while (part.size() > 1 && (static_cast<unsigned char>(part.back()) & 0xC0) == 0x80) part.pop_back();
    part.pop_back();
  }
  while (!part.empty() && part.back() == ' ') part.pop_back();
  return part + "\u2026";
}

}  // namespace

void Table::add(std::vector<std::string> cells) {
  assert(cells.size() == columns_.size());
  rows_.push_back({std::move(cells), {}});
}

void Table::add_remark(std::string words) {
  rows_.push_back({{}, std::move(words)});
}

std::string Table::text(int width) const {
  const std::size_t n = columns_.size();
  std::vector<std::vector<std::string>> cells;  // aligned at the decimal point
  std::vector<int> size(n, 0);
  std::vector<bool> shown(n, false);
  for (const Row& row : rows_) cells.push_back(row.cells);
  for (std::size_t c = 0; c < n; ++c) {
    std::size_t after = 0;
    for (const auto& row : cells)
      if (!row.empty()) after = std::max(after, row[c].size() - point_of(row[c]));
    for (auto& row : cells) {
      if (row.empty()) continue;
      if (!row[c].empty()) shown[c] = true;
      if (columns_[c].align == Align::number)
        row[c] += spaces(static_cast<int>(after - (row[c].size() - point_of(row[c]))));
      size[c] = std::max(size[c], displayed_width(row[c]));
    }
    size[c] = std::max({size[c], displayed_width(columns_[c].head), displayed_width(columns_[c].unit)});
  }

  const auto total = [&] {
    int sum = indent - gap;
    for (std::size_t c = 0; c < n; ++c)
      if (shown[c]) sum += size[c] + gap;
    return sum;
  };
  const auto widest_name = [&](bool without_limit) {
    std::optional<std::size_t> widest;
    for (std::size_t c = 0; c < n; ++c) {
      if (!shown[c] || columns_[c].align != Align::left) continue;
      const int least = without_limit ? 5 : std::max(columns_[c].least, displayed_width(columns_[c].head));
      if (size[c] > least && (!widest || size[c] > size[*widest])) widest = c;
    }
    return widest;
  };
  std::vector<std::size_t> dropped;
  while (total() > width) {
    // Names give way first, the widest of them; then the columns that matter least; then names without limit.
    std::size_t last = n;
    for (std::size_t c = 0; c < n; ++c)
      if (shown[c] && columns_[c].rank > 0 && (last == n || columns_[c].rank >= columns_[last].rank))
        last = c;
    if (const auto name = widest_name(false)) {
      --size[*name];
    } else if (last < n) {
      shown[last] = false;
      dropped.push_back(last);
    } else if (const auto wide = widest_name(true)) {
      --size[*wide];
    } else {
      break;
    }
  }
  // A wide column that went may leave room for narrower ones that went before it.
  for (auto c = dropped.rbegin(); c != dropped.rend(); ++c)
    if (total() + gap + size[*c] <= width) shown[*c] = true;
  std::string left_out;
  for (std::size_t c = 0; c < n; ++c)
    if (!shown[c] && std::find(dropped.begin(), dropped.end(), c) != dropped.end())
      left_out +=
          (left_out.empty() ? "" : ", ") + (columns_[c].head.empty() ? columns_[c].unit : columns_[c].head);
  // Leaving a column out makes room again for the names that were shortened for it.
  for (std::size_t c = 0; c < n && !left_out.empty(); ++c) {
    if (!shown[c] || columns_[c].align != Align::left) continue;
    int natural = size[c];
    for (const auto& row : cells)
      if (!row.empty()) natural = std::max(natural, displayed_width(row[c]));
    size[c] += std::min(natural - size[c], std::max(0, width - total()));
  }

  const auto line_of = [&](const auto& cell_of) {
    std::string line = spaces(indent - gap);
    for (std::size_t c = 0; c < n; ++c) {
      if (!shown[c]) continue;
      const std::string cell = shortened(cell_of(c), size[c]);
      const std::string pad = spaces(size[c] - displayed_width(cell));
      const bool left = columns_[c].align == Align::left;
      line += spaces(gap) + (left ? cell + pad : pad + cell);
    }
    line.erase(line.find_last_not_of(' ') + 1);
    return line + "\n";
  };
  std::string text = line_of([&](std::size_t c) { return columns_[c].head; });
  const std::string units = line_of([&](std::size_t c) { return columns_[c].unit; });
  if (units.size() > 1) text += units;
  for (std::size_t r = 0; r < rows_.size(); ++r)
    text += rows_[r].remark.empty() ? line_of([&](std::size_t c) { return cells[r][c]; })
                                    : wrapped(rows_[r].remark, width, indent, indent + 4);
  if (!left_out.empty())
    text += wrapped("not shown for lack of width: " + left_out, width, indent, indent + 2);
  return text;
}

}  // namespace wellwright::cli
