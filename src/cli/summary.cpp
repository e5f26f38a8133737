// SPDX-License-Identifier: Apache-2.0
// The order of a summary.
#include "cli/summary.hpp"

#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

std::string list_of(const std::string& head, const std::vector<std::string>& sentences, int width) {
  if (sentences.empty()) return "";
  std::string text = head + "\n";
  for (const auto& sentence : sentences) text += wrapped("- " + sentence, width, 2, 4);
  return text;
}

}  // namespace

std::string assumptions_text(const Notes& notes, int width) {
  return list_of("Assumptions", notes.assumptions(), width);
}

std::string warnings_text(const Notes& notes, int width) {
  return list_of("Warnings", notes.warnings(), width);
}

std::string summary(const Answer& answer, int width, bool all_layers) {
  std::string text;
  const auto add = [&](const std::string& part) {
    if (!part.empty()) text += (text.empty() ? "" : "\n") + part;
  };
  add(layer_table(answer.study, width, all_layers));
  for (const auto& part : answer.carriers) add(level_table(answer, part, width));
  add(charge_text(answer, width));
  for (const auto& part : answer.carriers) add(miniband_table(part, width));
  for (const auto& part : answer.carriers) add(transition_table(answer, part, width));
  for (const auto& pairs : answer.interband) add(interband_table(answer, pairs, width));
  add(beat_table(answer, width));
  add(assumptions_text(answer.notes, width));
  add(warnings_text(answer.notes, width));
  add(certificate_text(answer, width));
  return text;
}

}  // namespace wellwright::cli
