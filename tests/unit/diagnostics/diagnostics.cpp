// SPDX-License-Identifier: Apache-2.0
// The text of errors, displayed width, near words, notes.
#include "wellwright/diagnostics.hpp"

#include <catch2/catch.hpp>

using namespace wellwright;

namespace {

Place place_at(std::string line, int column, int length) {
  Place place;
  place.file = "study.yaml";
  place.line = 7;
  place.column = column;
  place.length = length;
  place.line_text = std::move(line);
  return place;
}

}  // namespace

TEST_CASE("An error quotes its line with the caret under the spot") {
  const InputError error("`thickness` has no unit", place_at("  - {thickness: 14.5}", 17, 4),
                         "write 14.5 nm");
  CHECK(std::string(error.what()) ==
        "study.yaml:7:17: `thickness` has no unit\n"
        "    - {thickness: 14.5}\n"
        "                  ^^^^\n"
        "  write 14.5 nm");
  CHECK(error.sentence() == "`thickness` has no unit");
  CHECK(error.hint() == "write 14.5 nm");
}

TEST_CASE("The caret goes by displayed width") {
  // Two wide characters (two columns each) and a combining mark (none) before the spot.
  const InputError wide("x", place_at("量子 e\xCC\x81 = 5", 8, 1));
  CHECK(std::string(wide.what()) == "study.yaml:7:8: x\n  量子 e\xCC\x81 = 5\n          ^");
  CHECK(displayed_width("量子") == 4);
  CHECK(displayed_width("e\xCC\x81") == 1);
  CHECK(displayed_width("Å µ") == 3);
  CHECK(displayed_width("\xFF\xFE") == 2);  // no UTF-8: shown as replacement marks
}

TEST_CASE("UTF-8 is taken as RFC 3629 has it") {
  // Well-formed: one to four bytes. Refused: a lone continuation, a cut character, a longer form than needed,
  // a surrogate, a code above U+10FFFF.
  CHECK(utf8_bytes("a", 0) == 1);
  CHECK(utf8_bytes("\xC2\xB5", 0) == 2);
  CHECK(utf8_bytes("\xE2\x82\xAC", 0) == 3);
  CHECK(utf8_bytes("\xF0\x9F\x94\xAC", 0) == 4);
  for (const char* broken : {"\x80", "\xE2\x82", "\xC0\x80", "\xE0\x80\x80", "\xED\xA0\x80",
                             "\xF4\x90\x80\x80", "\xF5\x80\x80\x80"}) {
    CAPTURE(broken);
    CHECK(utf8_bytes(broken, 0) == 0);
  }
}

TEST_CASE("Two places that contradict are both quoted") {
  Place other = place_at("field: 1 kV/cm", 1, 5);
  other.line = 3;
  const InputError error("both are given", place_at("bias: 1 V", 1, 4), other, "keep one");
  const std::string text = error.what();
  CHECK(text.find("study.yaml:7:1: both are given\n  bias: 1 V\n  ^^^^\n") == 0);
  CHECK(text.find("study.yaml:3:1: ") != std::string::npos);
  CHECK(text.find("  field: 1 kV/cm\n  ^^^^^\n  keep one") != std::string::npos);
}

TEST_CASE("A long line is cut around the spot") {
  const std::string line(300, 'a');
  const InputError error("x", place_at(line + "!" + line, 301, 1));
  const std::string text = error.what();
  const auto quote = text.find("\n  ") + 3;
  const std::string shown = text.substr(quote, text.find('\n', quote) - quote);
  CHECK(displayed_width(shown) <= 110);
  CHECK(shown.find('!') == text.substr(text.rfind('\n') + 3).find('^'));
}

TEST_CASE("Near words: swaps, slips, other case; nothing when nothing is near") {
  const std::vector<std::string> keys = {"thickness", "material", "donors", "acceptors", "name"};
  CHECK(nearest("thikness", keys) == std::vector<std::string>{"thickness"});
  CHECK(nearest("matreial", keys) == std::vector<std::string>{"material"});
  CHECK(nearest("Donors", keys) == std::vector<std::string>{"donors"});
  CHECK(nearest("thick", keys) == std::vector<std::string>{"thickness"});
  CHECK(nearest("colour", keys).empty());
  CHECK(nearest("", keys).empty());
  CHECK(nearest(std::string(100'000, 'x'), keys).empty());
}

TEST_CASE("Notes keep their order and each sentence once") {
  Notes notes;
  notes.warn("b");
  notes.warn("a");
  notes.warn("b");
  notes.assume("c");
  CHECK(notes.warnings() == std::vector<std::string>{"b", "a"});
  CHECK(notes.assumptions() == std::vector<std::string>{"c"});
}
