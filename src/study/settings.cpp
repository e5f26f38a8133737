// SPDX-License-Identifier: Apache-2.0
// Values set from the command line, written into the tree of the study before it is read.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "study/read.hpp"

namespace wellwright {
namespace {

// The formula of an alloy, the element of its composition first on its sublattice.
std::string formula_of(const Alloy& alloy) {
  constexpr int first_of_sublattice[] = {0, 3, 7, 9};
  std::string text;
  for (int s = 0; s < 3; ++s) {
    std::vector<int> elements;
    for (int e = first_of_sublattice[s]; e < first_of_sublattice[s + 1]; ++e)
      if (alloy.fraction[static_cast<std::size_t>(e)] != 0) elements.push_back(e);
    std::stable_partition(elements.begin(), elements.end(), [&](int e) { return e == alloy.first; });
    for (const int e : elements) {
      text += element_names[static_cast<std::size_t>(e)];
      if (elements.size() > 1) text += fmt::format("{:.15g}", alloy.fraction[static_cast<std::size_t>(e)]);
    }
  }
  return text;
}

// A composition stands inside the name of an alloy: the name with the other fraction takes its place.
void set_composition(Node& root, const Setting& setting, const MaterialTable& table) {
  double x = 0;
  if (!read_number(setting.value, x))
    throw InputError(fmt::format("`{}` is no number", setting.value), setting.place,
                     "a composition is a plain number, such as 0.2");
  Study study;
  Notes unheard;
  study.stack = read_stack(root, table, unheard);
  study = with_value(study, setting.path, x, setting.place);
  const std::string_view rest = std::string_view(setting.path).substr(7);
  const std::string_view layer = rest.substr(0, rest.find('.'));
  const std::string_view key = rest.substr(rest.find('.') + 1);
  const Layer& changed =
      study.stack.layers[static_cast<std::size_t>(find_layers(study.stack, layer, setting.place).front())];
  const std::string at = key == "composition"      ? "material"
                         : key.starts_with("from") ? "graded.from"
                                                   : "graded.to";
  set_value(root, fmt::format("layers.{}.{}", layer, at),
            formula_of(key.starts_with("to.") ? changed.grading->to : changed.material));
}

}  // namespace

Setting setting_of(const std::string& text) {
  Place place;
  place.file = "--set";
  place.line = 1;
  place.column = 1;
  place.line_text = text;
  place.length = std::max(1, displayed_width(text));
  const auto equal = text.find('=');
  const auto trimmed = [](std::string part) {
    part.erase(0, part.find_first_not_of(" \t"));
    part.erase(part.find_last_not_of(" \t") + 1);
    return part;
  };
  const std::string path = trimmed(text.substr(0, equal));
  if (equal == std::string::npos || path.empty())
    throw InputError(fmt::format("`--set {}` is no path=value", text), place,
                     "write --set \"field=12 kV/cm\"");
  return {path, trimmed(text.substr(equal + 1)), place};
}

void apply_settings(Node& root, const std::vector<std::string>& settings, const MaterialTable& table) {
  for (const auto& text : settings) {
    const Setting setting = setting_of(text);
    if (setting.path.starts_with("layers.") && setting.path.ends_with(".composition"))
      set_composition(root, setting, table);
    else
      set_value(root, setting.path, setting.value);
  }
}

}  // namespace wellwright
