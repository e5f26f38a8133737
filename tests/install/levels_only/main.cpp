// SPDX-License-Identifier: Apache-2.0
// A program that uses the levels room alone.
#include <cstdio>

#include "wellwright/levels.hpp"

int main() {
  wellwright::Notes notes;
  const auto study = wellwright::read_study(
      "layers: [{material: AlAs, thickness: 5 nm}, {material: GaAs, thickness: 8 nm}, {material: AlAs, "
      "thickness: 5 nm}]\n",
      "well.yaml", wellwright::MaterialTable{}, {}, notes);
  const auto levels = wellwright::solve_levels(study, wellwright::Carrier::electron, notes,
                                               [](double, std::string_view) { return true; });
  std::printf("%d levels, the lowest at %.6f eV\n", levels.count(), levels.energy(0));
  return levels.certificate.certified ? 0 : 1;
}
