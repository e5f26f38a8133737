// SPDX-License-Identifier: Apache-2.0
// Digits and wrapping. Expected texts follow from the rules in cli/text.hpp by hand.
#include "cli/text.hpp"

#include <catch2/catch.hpp>
#include <limits>

using namespace wellwright::cli;

TEST_CASE("the last digit is no finer than the error") {
  CHECK(to_error(54.321098, 1e-3) == "54.321");
  CHECK(to_error(54.321098, 2e-3) == "54.32");
  CHECK(to_error(54.321098, 0.9e-3) == "54.321");
  CHECK(to_error(54.321098, 3) == "54");
  CHECK(to_error(-0.0001, 1e-3) == "0.000");
  CHECK(to_error(-0.0006, 1e-3) == "-0.001");
}

TEST_CASE("significant digits") {
  struct Row {
    double value;
    int digits;
    const char* text;
  };
  for (const auto& row :
       {Row{199.99, 4, "200.0"}, Row{0.012345, 3, "0.0123"}, Row{9.9996, 4, "10.00"},
        Row{123456, 3, "123456"}, Row{0, 3, "0"}, Row{2.5e-7, 3, "2.50e-07"}, Row{-7.25, 2, "-7.2"},
        Row{7, 1, "7"}, Row{std::numeric_limits<double>::quiet_NaN(), 3, "-"}}) {
    CAPTURE(row.value, row.digits);
    CHECK(significant(row.value, row.digits) == row.text);
  }
  CHECK(known_digits(7.123, 1e-3) == 4);
  CHECK(known_digits(0.03, 1e-3) == 2);
  CHECK(known_digits(1e-5, 1e-3) == 2);
}

TEST_CASE("wrapping counts columns, not bytes") {
  CHECK(wrapped("one two three", 9, 0, 2) == "one two\n  three\n");
  // Seven two-byte letters fill seven columns.
  CHECK(wrapped("\u00b5\u00b5\u00b5 \u00b5\u00b5\u00b5 x", 9) == "\u00b5\u00b5\u00b5 \u00b5\u00b5\u00b5 x\n");
  CHECK(wrapped("a word-longer-than-the-line b", 10) == "a\nword-longer-than-the-line\nb\n");
  CHECK(counted(1, "level") == "1 level");
  CHECK(counted(0, "level") == "0 levels");
}
