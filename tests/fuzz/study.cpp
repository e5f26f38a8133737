// SPDX-License-Identifier: Apache-2.0
// Any bytes as a study file: read in full, or refused with an InputError; nothing else may happen.
#include <cstddef>
#include <cstdint>
#include <cstdlib>
#include <string>

#include "wellwright/study.hpp"

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  static const wellwright::MaterialTable table;
  std::string text(reinterpret_cast<const char*>(data), size);
  // What follows a line of four equal signs goes in as a --set, the way the command line would give it.
  std::vector<std::string> settings;
  if (const auto at = text.find("\n====\n"); at != std::string::npos) {
    settings.push_back(text.substr(at + 6));
    text.resize(at + 1);
  }
  try {
    wellwright::Notes notes;
    const auto study = wellwright::read_study(text, "study.yaml", table, settings, notes);
    if (study.stack.layers.empty()) std::abort();
    (void)wellwright::effective_values(study);
  } catch (const wellwright::InputError& refusal) {
    if (refusal.sentence().empty()) std::abort();
  }
  return 0;
}
