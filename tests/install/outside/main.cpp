// SPDX-License-Identifier: Apache-2.0
// A program that uses all rooms through the package: a study from text, its answer, its result file, twice.
#include <cmath>
#include <cstdio>
#include <string>

#include "wellwright/answer.hpp"
#include "wellwright/results.hpp"

namespace {

// A box of one medium between hard walls: E_n = hbar^2 pi^2 n^2 / (2 m L^2), from any textbook.
double ground_level(const std::string& thickness) {
  const std::string text =
      "materials: {Box: {conduction_band_edge: 0 eV, electron_mass: 0.1, band_gap: 1 eV}}\n"
      "layers: [{material: Box, thickness: " +
      thickness +
      "}]\n"
      "model: {bands: one, levels: 2}\n";
  wellwright::Notes notes;
  const auto study = wellwright::read_study(text, "box.yaml", wellwright::MaterialTable{}, {}, notes);
  const auto answer = wellwright::answer(study, notes, [](double, std::string_view) { return true; });
  return answer.carriers.front().levels.energy(0);
}

}  // namespace

int main() {
  for (const double length : {10.0, 20.0}) {
    const double pi = 3.14159265358979323846;
    const double wanted = wellwright::constants::hbar2_over_2m0 / 0.1 * pi * pi / (length * length);
    const double found = ground_level(std::to_string(length) + " nm");
    std::printf("box of %g nm: %.9f eV, formula %.9f eV\n", length, found, wanted);
    if (std::abs(found / wanted - 1) > 1e-9) return 1;
  }
  std::printf("wellwright %s\n", std::string(wellwright::version()).c_str());
  return 0;
}
