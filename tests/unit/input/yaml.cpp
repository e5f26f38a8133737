// SPDX-License-Identifier: Apache-2.0
// The located YAML reader: places, and what it refuses.
#include <catch2/catch.hpp>
#include <ctime>

#include "wellwright/input.hpp"

using namespace wellwright;

namespace {

InputError refusal(const std::string& text, const InputLimits& limits = {}) {
  try {
    read_yaml(text, "t.yaml", limits);
  } catch (const InputError& error) {
    return error;
  }
  FAIL("nothing was refused in " << text.substr(0, 60));
  throw 0;
}

}  // namespace

TEST_CASE("Every value and key knows its line and its column in characters") {
  const Node root = read_yaml("größe: 5 nm\nlayers:\n  - {name: ä b, thickness: 3 nm}\n", "t.yaml");
  CHECK(root.place().line == 1);
  CHECK(root["größe"].text() == "5 nm");
  CHECK(root["größe"].place().column == 8);
  CHECK(root.key_place("layers").line == 2);
  const Node& layer = root["layers"].items()[0];
  CHECK(layer["thickness"].place().line == 3);
  CHECK(layer["thickness"].place().column == 28);
  CHECK(layer.key_place("thickness").column == 17);
  CHECK(layer["thickness"].place().line_text == "  - {name: ä b, thickness: 3 nm}");
  CHECK_FALSE(root["absent"].present());
}

TEST_CASE("Line ends and a byte order mark of other systems are mended") {
  const Node root = read_yaml(
      "\xEF\xBB\xBF"
      "a: 1\r\nb: 2\rc: 3\n",
      "t.yaml");
  CHECK(root["a"].text() == "1");
  CHECK(root["b"].place().line == 2);
  CHECK(root["c"].place().line == 3);
}

TEST_CASE("What YAML allows or the parser lets pass is refused at its place") {
  struct Refused {
    const char* text;
    const char* sentence;
    int line, column;
  };
  const Refused cases[] = {
      {"a: 1\nb: 2\na: 3\n", "stands twice", 3, 1},
      {"a: 1\n---\nb: 2\n", "second document", 3, 1},
      {"a: !!int 3\n", "tags", 1, 4},
      {"<<: {b: 1}\n", "merge keys", 1, 1},
      {"? [1, 2]\n: 3\n", "where a key belongs", 1, 3},
      {"a:\n\t- 1\n", "tab", 2, 1},
      {"a: x\x01y\n", "0x01", 1, 5},
      {"a: \xC3\x28\n", "no UTF-8", 1, 4},
      {"a: {b: 1", "not closed", 1, 1},
      {"a: 'b\n", "is not closed", 1, 4},
      {"a: b: c\n", "colon", 1, 5},
      {"a: *b\n", "alias", 1, 4},
  };
  for (const Refused& c : cases) {
    INFO(c.text);
    const InputError error = refusal(c.text);
    CHECK(error.sentence().find(c.sentence) != std::string::npos);
    CHECK(error.place().line == c.line);
    if (std::string(c.sentence).find("not closed") == std::string::npos)
      CHECK(error.place().column == c.column);
    CHECK_FALSE(error.hint().empty());
  }
}

TEST_CASE("Hostile input meets a stated limit") {
  std::string bomb = "a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n";
  for (int i = 1; i < 9; ++i) {
    const std::string before = "*a" + std::to_string(i - 1);
    bomb += "a" + std::to_string(i) + ": &a" + std::to_string(i) + " [";
    for (int j = 0; j < 10; ++j) bomb += before + (j < 9 ? ", " : "]\n");
  }
  CHECK(refusal(bomb).sentence().find("more than 600000 values") != std::string::npos);
  CHECK(refusal(std::string(400, '[')).sentence().size() > 10);
  InputLimits small;
  small.file_bytes = 1000;
  CHECK(refusal("a: " + std::string(2000, 'x'), small).sentence().find("larger than") != std::string::npos);
  small = {};
  small.depth = 5;
  CHECK(refusal("[[[[[[[1]]]]]]]", small).sentence().find("nested") != std::string::npos);
}

TEST_CASE("A very long line keeps only the part around the spot") {
  std::string line = "a: [";
  for (int i = 0; i < 20'000; ++i) line += "1, ";
  line += "2]\n";
  const Node root = read_yaml(line, "t.yaml");
  const Node& last = root["a"].items().back();
  CHECK(last.place().column == 60'005);
  CHECK(last.place().line_text.size() < 1000);
  const InputError error("x", last.place());
  CHECK(std::string(error.what()).size() < 400);
}

TEST_CASE("The time to read a list grows with its length, on one line too") {
  // Counting columns from the beginning of the line takes the square: 16 times as long here, not 4. The least
  // of three measurements of processor time each, since other work on the machine only adds.
  const auto seconds = [](int count) {
    std::string line = "a: [";
    for (int i = 0; i < count; ++i) line += "x,";
    line += "x]\n";
    double least = 1e9;
    for (int i = 0; i < 3; ++i) {
      const std::clock_t before = std::clock();
      const Node root = read_yaml(line, "t.yaml");
      least = std::min(least, static_cast<double>(std::clock() - before) / CLOCKS_PER_SEC);
      CHECK(root["a"].items().back().place().column == 5 + 2 * count);
    }
    return least;
  };
  CHECK(seconds(120'000) < 9 * seconds(30'000));
}

TEST_CASE("An empty file is empty, and a missing one is said") {
  CHECK(read_yaml("", "t.yaml").kind() == Node::Kind::null);
  CHECK(read_yaml("# only words\n", "t.yaml").kind() == Node::Kind::null);
  CHECK_THROWS_AS(read_file("/nowhere/study.yaml"), FileTrouble);
  CHECK_THROWS_AS(read_file("/"), FileTrouble);
}

TEST_CASE("Aliases are written out") {
  const Node root = read_yaml("a: &x {b: 1}\nc: *x\n", "t.yaml");
  CHECK(root["c"]["b"].text() == "1");
}

TEST_CASE("What anchors and aliases name is held once, until a copy is changed") {
  Node root = read_yaml("a: &x [&y [&z [1, 2]]]\nb: *x\nc: *y\n", "t.yaml");
  const auto& inner = root["a"].items()[0].items();
  CHECK(root["b"].items()[0].items().data() == inner.data());
  CHECK(root["c"].items().data() == inner.data());
  const Node before = root;
  for (Node::Entry& entry : root.mutable_entries())
    if (entry.key == "b") entry.value.mutable_items()[0].mutable_items()[0].mutable_items().clear();
  CHECK(root["b"].items()[0].items()[0].items().empty());
  CHECK(root["a"].items()[0].items()[0].items().size() == 2);
  CHECK(root["c"].items()[0].items().size() == 2);
  CHECK(before["b"].items()[0].items()[0].items().size() == 2);
}
