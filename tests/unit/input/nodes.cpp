// SPDX-License-Identifier: Apache-2.0
// Reading scalars, and --set values put into the tree.
#include <catch2/catch.hpp>

#include "wellwright/input.hpp"

using namespace wellwright;

namespace {

template <class Work>
std::string trouble(Work work) {
  try {
    work();
  } catch (const InputError& error) {
    return error.what();
  }
  return "";
}

const char* study = R"(
field: 1 kV/cm
layers:
  - {material: AlAs, thickness: 5 nm}
  - {material: GaAs, thickness: 8 nm, name: wide well}
  - repeat: 3
    layers: [{material: AlAs, thickness: 2 nm}, {material: GaAs, thickness: 4 nm, name: narrow}]
  - {material: AlAs, thickness: 6 nm}
model: {bands: two}
)";

}  // namespace

TEST_CASE("Readers of scalars say what they want at the value's place") {
  const Node root = read_yaml("n: 3\nx: 0.5\nw: tow\nflag: on\nlist: [1]\nq: 5 nm\nbad: 5 nm-1\n", "t.yaml");
  CHECK(root["n"].whole_number("n", 1, 10) == 3);
  CHECK(root["x"].number("x") == 0.5);
  CHECK(root["flag"].on_off("flag"));
  CHECK(root["q"].quantity("q", Dimension::length) == 5);
  CHECK(trouble([&] { root["x"].whole_number("x", 1, 10); }).find("no whole number") != std::string::npos);
  CHECK(trouble([&] { root["n"].whole_number("n", 5, 10); }).find("from 5 to 10") != std::string::npos);
  CHECK(trouble([&] {
          root["w"].word("w", {"one", "two", "three"});
        }).find("did you mean `two`") != std::string::npos);
  CHECK(trouble([&] { root["w"].on_off("w"); }).find("w: on") != std::string::npos);
  CHECK(trouble([&] { root["list"].number("list"); }).find("is a list") != std::string::npos);
  CHECK(trouble([&] { root["list"].quantity("list", Dimension::length); }).find("is a list") !=
        std::string::npos);
  // The caret stands under the unit.
  CHECK(trouble([&] { root["bad"].quantity("bad", Dimension::length); }).find("t.yaml:7:8:") == 0);
  CHECK(trouble([&] {
          root.only_keys({"n", "x"}, "here");
        }).find("unknown key `w` here") != std::string::npos);
}

TEST_CASE("A setting replaces or adds a value, layers by name or number") {
  Node root = read_yaml(study, "t.yaml");
  set_value(root, "field", "-5 kV/cm");
  CHECK(root["field"].text() == "-5 kV/cm");
  set_value(root, "temperature", "77 K");
  CHECK(root["temperature"].text() == "77 K");
  set_value(root, "model.levels", "{below: 0.3 eV}");
  CHECK(root["model"]["levels"]["below"].text() == "0.3 eV");
  set_value(root, "layers.wide well.thickness", "9 nm");
  CHECK(root["layers"].items()[1]["thickness"].text() == "9 nm");
  set_value(root, "layers.narrow.thickness", "5 nm");
  CHECK(root["layers"].items()[2]["layers"].items()[1]["thickness"].text() == "5 nm");
  set_value(root, "layers.9.thickness", "7 nm");  // the last one, repeats unrolled
  CHECK(root["layers"].items()[3]["thickness"].text() == "7 nm");
}

TEST_CASE("A setting that misses is said with what is there") {
  Node root = read_yaml(study, "t.yaml");
  CHECK(trouble([&] {
          set_value(root, "layers.wide wel.thickness", "9 nm");
        }).find("did you mean `wide well`") != std::string::npos);
  CHECK(trouble([&] { set_value(root, "layers.10.thickness", "9 nm"); }).find("to 9 at the top") !=
        std::string::npos);
  CHECK(trouble([&] { set_value(root, "layers.4.thickness", "9 nm"); }).find("copies of a repeat") !=
        std::string::npos);
  CHECK(trouble([&] { set_value(root, "layers.narrow[2].thickness", "9 nm"); }).find("one copy") !=
        std::string::npos);
  CHECK(trouble([&] { set_value(root, "layers.2", "9 nm"); }).find("no value of it") != std::string::npos);
  CHECK(trouble([&] { set_value(root, "field.x", "9 nm"); }).find("holds one value") != std::string::npos);
  CHECK(trouble([&] { set_value(root, "model..bands", "two"); }).find("no path") != std::string::npos);
  CHECK(trouble([&] { set_value(root, "field", ""); }).find("set to nothing") != std::string::npos);
}
