// SPDX-License-Identifier: Apache-2.0
// Any bytes as a study file: read in full, or refused with an InputError; nothing else may happen.
#include <cstddef>
#include <cstdint>
#include <cstdlib>
#include <string>
#include <vector>

#include "wellwright/study.hpp"

namespace {

// What follows the line, cut off from the text; empty where there is no such line.
std::string cut_after(std::string& text, const std::string& line) {
  const auto at = text.find("\n" + line + "\n");
  if (at == std::string::npos) return {};
  std::string rest = text.substr(at + line.size() + 2);
  text.resize(at + 1);
  return rest;
}

}  // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  static const wellwright::MaterialTable shipped;
  std::string text(reinterpret_cast<const char*>(data), size);
  // What follows a line of four plus signs is a user's material table; what follows a line of four equal
  // signs goes in as a --set, the way the command line would give it.
  const std::string materials = cut_after(text, "++++");
  const std::string setting = cut_after(text, "====");
  try {
    const auto table =
        materials.empty()
            ? shipped
            : wellwright::MaterialTable::from_yaml(wellwright::read_yaml(materials, "materials.yaml"));
    wellwright::Notes notes;
    std::vector<std::string> settings;
    if (!setting.empty()) settings.push_back(setting);
    const auto study = wellwright::read_study(text, "study.yaml", table, settings, notes);
    if (study.stack.layers.empty()) std::abort();
    (void)wellwright::effective_values(study);
    // What `check`, `materials` and the result file say of the first few layers.
    (void)wellwright::strain_report(study.stack);
    std::vector<wellwright::Alloy> alloys;
    for (const wellwright::Layer& layer : study.stack.layers) {
      if (alloys.size() == 4) break;
      alloys.push_back(layer.material);
      (void)study.stack.table->explain(layer.material, study.stack.environment);
    }
    (void)study.stack.table->used_entries(alloys);
  } catch (const wellwright::InputError& refusal) {
    if (refusal.sentence().empty()) std::abort();
  }
  return 0;
}
