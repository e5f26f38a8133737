// SPDX-License-Identifier: Apache-2.0
// A table of text, aligned by displayed width and fitted to the width of the output.
#pragma once

#include <string>
#include <vector>

namespace wellwright::cli {

/// How the cells of a column stand: names to the left, numbers with their decimal points below one another.
enum class Align { left, number };

struct Column {
  std::string head;
  std::string unit = {};
  Align align = Align::number;
  int least = 10;  ///< names are not shortened below this many columns
  int rank = 0;    ///< columns of the highest rank go first when the table is too wide; 0 always stays
};

class Table {
 public:
  explicit Table(std::vector<Column> columns) : columns_(std::move(columns)) {}
  void add(std::vector<std::string> cells);
  /// A line of words between the rows, such as "... 38 more layers".
  void add_remark(std::string words);
  bool empty() const { return rows_.empty(); }
  /// The table in at most `width` columns, indented by two: names are shortened, then columns left out (and
  /// named below). A column without any text is left out silently. Ends with a line feed.
  std::string text(int width) const;

 private:
  struct Row {
    std::vector<std::string> cells;
    std::string remark;
  };
  std::vector<Column> columns_;
  std::vector<Row> rows_;
};

}  // namespace wellwright::cli
