// SPDX-License-Identifier: Apache-2.0
// Settings, addresses and the values in force.
#include <algorithm>
#include <catch2/catch.hpp>

#include "support/read_text.hpp"

using namespace wellwright;
using tests::read_text;

namespace {

const std::string wells = R"(
layers:
  - {material: Al0.3Ga0.7As, thickness: 20 nm, name: rim}
  - {material: GaAs, thickness: 10 nm, name: wide well, donors: 1e17 cm^-3}
  - {material: Al0.3Ga0.7As, thickness: 20 nm}
)";

const EffectiveValue* find(const std::vector<EffectiveValue>& values, const std::string& path) {
  const auto found =
      std::find_if(values.begin(), values.end(), [&](const auto& value) { return value.path == path; });
  return found == values.end() ? nullptr : &*found;
}

}  // namespace

TEST_CASE("settings change the study as if the file said so") {
  const Study study = read_text(wells, {"field=12 kV/cm", "layers.wide well.thickness=12 nm",
                                        "layers.rim.composition=0.2", "model.levels={below: 0.3 eV}"});
  CHECK(study.field == Approx(12e-4));  // 1 kV/cm = 1e-4 V/nm
  CHECK(study.stack.layers[1].thickness == Approx(12));
  CHECK(study.stack.layers[0].material.composition() == Approx(0.2));
  CHECK(study.stack.layers[2].material.composition() == Approx(0.3));
  CHECK(study.model.levels.below == Approx(0.3));
  const auto values = effective_values(study);
  REQUIRE(find(values, "field"));
  CHECK(find(values, "field")->by_setting);
  CHECK(find(values, "field")->value == "12 kV/cm");
}

TEST_CASE("values in force are marked as defaults where the study is silent") {
  const auto values = effective_values(read_text("temperature: 77 K" + wells));
  REQUIRE(find(values, "temperature"));
  CHECK_FALSE(find(values, "temperature")->by_default);
  REQUIRE(find(values, "model.accuracy"));
  CHECK(find(values, "model.accuracy")->by_default);
  CHECK(find(values, "model.accuracy")->value == "1 ueV");
  CHECK(find(values, "dynamics.duration") == nullptr);
}

TEST_CASE("the key that was written keeps its value when the length changes") {
  const Study bias = read_text("bias: 0.1 V" + wells), field = read_text("field: -20 kV/cm" + wells);
  CHECK(bias.field == Approx(-0.1 / 50));
  CHECK(with_value(bias, "layers.2.thickness", 30).field == Approx(-0.1 / 70));
  CHECK(with_value(field, "layers.2.thickness", 30).field == field.field);
}

TEST_CASE("a value set at an address is the value read there") {
  const Study study = read_text(wells);
  const std::pair<const char*, double> cases[] = {{"field", 1e-3},
                                                  {"temperature", 77},
                                                  {"model.interdiffusion", 0.4},
                                                  {"layers.wide well.thickness", 11},
                                                  {"layers.1.composition", 0.25},
                                                  {"layers.wide well.donors", 2e-4}};
  for (const auto& [address, value] : cases) {
    CAPTURE(address);
    CHECK(value_at(with_value(study, address, value), address) == Approx(value));
    CHECK(value_at(study, address) != Approx(value));
  }
  CHECK(dimension_of_address(study, "layers.1.thickness", {}) == Dimension::length);
  CHECK_THROWS_AS(dimension_of_address(study, "layers.1.width", {}), InputError);
  CHECK_THROWS_AS(value_at(study, "layers.wide well.composition"), InputError);
}

TEST_CASE("donors by volume follow the thickness, by sheet they stay") {
  const Study study = read_text(wells);
  CHECK(with_value(study, "layers.wide well.thickness", 20).stack.layers[1].donors ==
        Approx(2 * study.stack.layers[1].donors));
  const Study sheet = read_text(wells, {"layers.wide well.donors=1e11 cm^-2"});
  CHECK(with_value(sheet, "layers.wide well.thickness", 20).stack.layers[1].donors ==
        Approx(sheet.stack.layers[1].donors));
}
