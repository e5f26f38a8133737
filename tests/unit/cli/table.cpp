// SPDX-License-Identifier: Apache-2.0
// Alignment and fitting of tables.
#include "cli/table.hpp"

#include <catch2/catch.hpp>
#include <sstream>

#include "wellwright/diagnostics.hpp"

using namespace wellwright::cli;

namespace {

int widest_line(const std::string& text) {
  std::istringstream lines(text);
  int widest = 0;
  for (std::string line; std::getline(lines, line);)
    widest = std::max(widest, wellwright::displayed_width(line));
  return widest;
}

Table long_table() {
  Table table({{"no"},
               {"layer", "", Align::left},
               {"thickness", "nm"},
               {"mass", "m0", Align::number, 0, 1},
               {"gap", "eV", Align::number, 0, 2}});
  table.add({"1", "a rather long name of a layer", "20.000", "0.0919", "1.9220"});
  table.add({"2", "Gr\u00fcndling", "7.5", "0.0670", "1.5190"});
  return table;
}

}  // namespace

TEST_CASE("numbers stand with their points below one another") {
  Table table({{"level"}, {"lives in", "", Align::left}, {"energy", "meV"}});
  table.add({"1", "\u00b5-well", "9.25"});
  table.add({"10", "", "123.4"});
  CHECK(table.text(80) ==
        "  level  lives in  energy\n"
        "                      meV\n"
        "      1  \u00b5-well      9.25\n"
        "     10            123.4\n");
}

TEST_CASE("a column without any text is left out") {
  Table table({{"level"}, {"remark", "", Align::left}});
  table.add({"1", ""});
  CHECK(table.text(80) == "  level\n      1\n");
}

TEST_CASE("names give way first, then the columns of least rank, and the table says so") {
  const std::string full = long_table().text(80);
  CHECK(full.find("not shown") == std::string::npos);
  for (int width = 30; width < 80; ++width) {
    CAPTURE(width);
    CHECK(widest_line(long_table().text(width)) <= width);
  }
  CHECK(long_table().text(50).find("\u2026") != std::string::npos);
  CHECK(long_table().text(32).find("not shown for lack of width: gap") == std::string::npos);
  CHECK(long_table().text(36).find("lack of width: gap") != std::string::npos);
}
