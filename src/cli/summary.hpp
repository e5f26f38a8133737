// SPDX-License-Identifier: Apache-2.0
// The parts of a summary as text: tables of layers, values, levels, transitions and beats, and the sentences
// around them. Every function gives whole lines for an output of `width` columns.
#pragma once

#include <string>

#include "wellwright/answer.hpp"

namespace wellwright::cli {

/// One sentence of what a run of the study will do.
std::string headline(const Study& study, int width);
/// The layers from the substrate up; copies of a repeat are folded into one line unless `all`.
std::string layer_table(const Study& study, int width, bool all);
/// The values in force, defaults and --set marked.
std::string value_table(const Study& study, int width);
/// Strained layers with their critical thicknesses, and the net strain of the stack.
std::string strain_table(const Study& study, int width);

std::string level_table(const Answer& answer, const CarrierAnswer& part, int width);
/// One sentence about the carriers and their Fermi level; empty where the stack holds no charge.
std::string charge_text(const Answer& answer, int width);
std::string miniband_table(const CarrierAnswer& part, int width);
std::string transition_table(const Answer& answer, const CarrierAnswer& part, int width);
/// Electron-hole pairs with an overlap that counts.
std::string interband_table(const Answer& answer, const Interband& pairs, int width);
/// How the motion starts and the beats it shows.
std::string beat_table(const Answer& answer, int width);

/// Headed paragraphs; empty when there are none.
std::string assumptions_text(const Notes& notes, int width);
std::string warnings_text(const Notes& notes, int width);
/// "6 levels of the electron below 0.310 eV, none missing; largest error estimate 2e-9 eV."
std::string certificate_text(const Answer& answer, int width);

/// The whole summary of an answer.
std::string summary(const Answer& answer, int width, bool all_layers);

}  // namespace wellwright::cli
