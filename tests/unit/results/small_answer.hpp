// SPDX-License-Identifier: Apache-2.0
// Answers of a small well, with table values and with motion.
#pragma once

#include <string>

#include "wellwright/results.hpp"

inline wellwright::Answer small_answer(const std::string& rest = "", const std::string& name = "") {
  static const wellwright::MaterialTable table;
  const std::string text =
      "layers:\n  - {material: Al0.3Ga0.7As, thickness: 15 nm}\n  - {material: GaAs, thickness: 9 nm" +
      (name.empty() ? std::string() : ", name: '" + name + "'") +
      "}\n  - {material: Al0.3Ga0.7As, thickness: 15 nm}\n" + rest;
  wellwright::Notes notes;
  const wellwright::Study study = wellwright::read_study(text, "study.yaml", table, {}, notes);
  return wellwright::answer(study, notes, {});
}

inline const std::string two_levels_move =
    "dynamics: {start: {mix: [{level: 1, amplitude: 1}, {level: 2, amplitude: 0.5}]}, duration: 1 ps, "
    "samples: 11}\n";
