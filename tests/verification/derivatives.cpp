// SPDX-License-Identifier: Apache-2.0
// Derivatives of levels with thickness, composition and field against differences of independently found
// levels.
#include <catch2/catch.hpp>

#include "support/shooting.hpp"
#include "support/study_builder.hpp"

using plain::Real;

namespace {

wellwright::Study read(const std::string& text) {
  static const wellwright::MaterialTable table;
  wellwright::Notes notes;
  return wellwright::read_study(text, "study.yaml", table, {}, notes);
}

/// d/dx of levels 0..count-1 at an address by central differences of sixth order.
template <class LevelsAt>
std::vector<Real> difference(const wellwright::Study& study, const std::string& address, double step,
                             int count, LevelsAt levels_at) {
  const double x = wellwright::value_at(study, address);
  const Real weights[3] = {Real(3) / 4, Real(-3) / 20, Real(1) / 60};
  std::vector<Real> slope(static_cast<std::size_t>(count), 0);
  for (int k = 1; k <= 3; ++k) {
    const double up = x + k * step, down = x - k * step;  // as rounded, the step being their difference
    const auto above = levels_at(wellwright::with_value(study, address, up));
    const auto below = levels_at(wellwright::with_value(study, address, down));
    for (std::size_t n = 0; n < slope.size(); ++n)
      slope[n] += weights[k - 1] * (above[n] - below[n]) * (2 * k) / (Real(up) - Real(down));
  }
  return slope;
}

std::vector<Real> by_shooting(const wellwright::Study& study, wellwright::Carrier carrier, int count) {
  return shooting::Shooter(plain::stack_of(study, carrier)).levels(0, count);
}

std::vector<Real> by_program(const wellwright::Study& study, wellwright::Carrier carrier, int count) {
  wellwright::Notes notes;
  const auto found = wellwright::solve_levels(study, carrier, notes, {});
  return {found.energy.data(), found.energy.data() + count};
}

/// 1e-7 relative or 1e-9 of the unit.
void close(double derivative, Real expected) {
  const double off = std::abs(static_cast<double>(derivative - expected));
  CAPTURE(derivative, static_cast<double>(expected), off);
  CHECK(off < std::max(1e-9, 1e-7 * std::abs(static_cast<double>(expected))));
}

const std::string model_block = "model: {bands: %, levels: 4, accuracy: 1e-11 eV}\n";
std::string with_bands(std::string text, const char* bands) {
  return text.replace(text.find('%'), 1, bands);
}

const std::vector<std::string> stacks = {
    "temperature: 77 K\nfield: 20 kV/cm\nlayers:\n"
    "  - {material: Al0.3Ga0.7As, thickness: 12 nm}\n  - {material: GaAs, thickness: 8 nm}\n"
    "  - {material: Al0.2Ga0.8As, thickness: 2.5 nm}\n  - {material: Al0.05Ga0.95As, thickness: 6 nm}\n"
    "  - {material: Al0.3Ga0.7As, thickness: 12 nm}\n",
    // strained on InP: the poles move with composition too
    "substrate: InP\ntemperature: 300 K\nfield: -50 kV/cm\nlayers:\n"
    "  - {material: Al0.55In0.45As, thickness: 8 nm}\n  - {material: In0.6Ga0.4As, thickness: 5 nm}\n"
    "  - {material: Al0.55In0.45As, thickness: 1.5 nm}\n  - {material: In0.55Ga0.45As, thickness: 4 nm}\n"
    "  - {material: Al0.48In0.52As, thickness: 8 nm}\n",
    // a bias: the field follows the length
    "bias: -0.15 V\nlayers:\n"
    "  - {material: Al0.25Ga0.75As, thickness: 10 nm}\n  - {material: GaAs, thickness: 9 nm}\n"
    "  - {material: Al0.25Ga0.75As, thickness: 2 nm}\n  - {material: GaAs, thickness: 6 nm}\n"
    "  - {material: Al0.25Ga0.75As, thickness: 10 nm}\n",
};

}  // namespace

TEST_CASE("thickness, composition and field derivatives against shooting") {
  for (std::size_t i = 0; i < stacks.size(); ++i)
    for (const char* bands : {"one", "two", "three"}) {
      CAPTURE(i, bands);
      const auto study = read(stacks[i] + with_bands(model_block, bands));
      const auto carrier = wellwright::Carrier::electron;
      wellwright::Notes notes;
      const auto levels = wellwright::solve_levels(study, carrier, notes, {});
      const std::vector<std::pair<int, int>> pairs{{1, 2}, {2, 4}};
      const auto found = wellwright::sensitivity(study, levels, pairs);
      const auto shoot = [&](const wellwright::Study& moved) { return by_shooting(moved, carrier, 4); };
      const int layers = static_cast<int>(study.stack.layers.size());
      for (int layer = 0; layer < layers; ++layer) {
        const std::string address = "layers." + std::to_string(layer + 1);
        const auto thickness = difference(study, address + ".thickness", 0.005, 4, shoot);
        CAPTURE(address);
        for (int n = 0; n < 4; ++n) {
          CAPTURE(n);
          close(found.thickness(n, layer), thickness[static_cast<std::size_t>(n)]);
        }
        for (std::size_t t = 0; t < pairs.size(); ++t)
          close(found.transition_thickness(static_cast<int>(t), layer),
                thickness[static_cast<std::size_t>(pairs[t].second - 1)] -
                    thickness[static_cast<std::size_t>(pairs[t].first - 1)]);
        if (std::isnan(study.stack.layers[static_cast<std::size_t>(layer)].material.composition())) {
          CHECK(std::isnan(found.composition(0, layer)));
          continue;
        }
        const auto composition = difference(study, address + ".composition", 4e-4, 4, shoot);
        for (int n = 0; n < 4; ++n) {
          CAPTURE(n, "composition");
          close(found.composition(n, layer), composition[static_cast<std::size_t>(n)]);
        }
      }
      if (!study.bias) {
        const auto field = difference(study, "field", 2e-6, 4, shoot);
        for (int n = 0; n < 4; ++n) close(found.field[n], field[static_cast<std::size_t>(n)]);
      }
    }
}

TEST_CASE("derivatives of hole levels against shooting") {
  const auto study = read(
      "field: 30 kV/cm\nlayers:\n  - {material: Al0.3Ga0.7As, thickness: 8 nm}\n  - {material: GaAs, "
      "thickness: 7 nm}\n"
      "  - {material: Al0.15Ga0.85As, thickness: 2 nm}\n  - {material: GaAs, thickness: 4 nm}\n"
      "  - {material: Al0.3Ga0.7As, thickness: 8 nm}\nmodel: {carrier: heavy hole, levels: 4, accuracy: "
      "1e-11 eV}\n");
  wellwright::Notes notes;
  const auto carrier = wellwright::Carrier::heavy_hole;
  const auto levels = wellwright::solve_levels(study, carrier, notes, {});
  const auto found = wellwright::sensitivity(study, levels, {});
  const auto shoot = [&](const wellwright::Study& moved) { return by_shooting(moved, carrier, 4); };
  for (int layer = 0; layer < 5; ++layer) {
    const auto slope =
        difference(study, "layers." + std::to_string(layer + 1) + ".thickness", 0.005, 4, shoot);
    for (int n = 0; n < 4; ++n) close(found.thickness(n, layer), slope[static_cast<std::size_t>(n)]);
  }
  const auto slope = difference(study, "layers.3.composition", 4e-4, 4, shoot);
  const auto field = difference(study, "field", 2e-6, 4, shoot);
  for (int n = 0; n < 4; ++n) {
    close(found.composition(n, 2), slope[static_cast<std::size_t>(n)]);
    close(found.field[n], field[static_cast<std::size_t>(n)]);
  }
}

// Gradings and smeared interfaces, which shooting does not know: against differences of the program's own
// levels, whose error of some 1e-13 eV over these steps leaves 1e-10.
TEST_CASE("derivatives of graded and smeared stacks against differences of levels") {
  const std::vector<std::string> texts = {
      "field: 10 kV/cm\nlayers:\n  - {material: Al0.3Ga0.7As, thickness: 8 nm}\n"
      "  - {graded: {from: Al0.3Ga0.7As, to: Al0.02Ga0.98As, shape: parabolic}, thickness: 12 nm}\n"
      "  - {graded: {from: Al0.02Ga0.98As, to: Al0.3Ga0.7As, shape: {power: 1.5}}, thickness: 9 nm}\n"
      "  - {material: Al0.3Ga0.7As, thickness: 8 nm}\n",
      "field: 10 kV/cm\nlayers:\n  - {material: Al0.3Ga0.7As, thickness: 10 nm}\n  - {material: GaAs, "
      "thickness: 8 nm}\n"
      "  - {material: Al0.2Ga0.8As, thickness: 2 nm}\n  - {material: Al0.03Ga0.97As, thickness: 5 nm}\n"
      "  - {material: Al0.3Ga0.7As, thickness: 10 nm}\n"};
  for (std::size_t i = 0; i < texts.size(); ++i)
    for (const char* bands : {"one", "two", "three"}) {
      CAPTURE(i, bands);
      const std::string smear = i == 1 ? "interdiffusion: 0.5 nm, " : "";
      const auto study =
          read(texts[i] + "model: {" + smear + "bands: " + bands + ", levels: 3, accuracy: 1e-11 eV}\n");
      const auto carrier = wellwright::Carrier::electron;
      wellwright::Notes notes;
      const auto levels = wellwright::solve_levels(study, carrier, notes, {});
      const auto found = wellwright::sensitivity(study, levels, {});
      const auto solve = [&](const wellwright::Study& moved) { return by_program(moved, carrier, 3); };
      const auto check = [&](const Eigen::MatrixXd& matrix, int layer, const std::string& address,
                             double step) {
        const auto slope = difference(study, address, step, 3, solve);
        CAPTURE(address);
        for (int n = 0; n < 3; ++n) close(matrix(n, layer), slope[static_cast<std::size_t>(n)]);
      };
      for (int layer = 0; layer < static_cast<int>(study.stack.layers.size()); ++layer)
        check(found.thickness, layer, "layers." + std::to_string(layer + 1) + ".thickness", 0.04);
      if (i == 1) {
        check(found.composition, 2, "layers.3.composition", 1e-3);
        check(found.composition, 3, "layers.4.composition", 1e-3);
      } else {
        check(found.composition, 0, "layers.1.composition", 1e-3);
      }
    }
}
