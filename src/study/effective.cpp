// SPDX-License-Identifier: Apache-2.0
// The values in force, written or by default.
#include <algorithm>

#include "study/read.hpp"

namespace wellwright {
namespace {

// A value in one line, as flow YAML.
std::string in_one_line(const Node& value) {
  std::string text;
  if (value.is_scalar()) return value.text();
  if (value.is_sequence()) {
    for (const Node& item : value.items()) text += (text.empty() ? "" : ", ") + in_one_line(item);
    return "[" + text + "]";
  }
  for (const auto& entry : value.entries())
    text += (text.empty() ? "" : ", ") + entry.key + ": " + in_one_line(entry.value);
  return "{" + text + "}";
}

const Node& find(const Node& root, std::string_view path) {
  const Node* node = &root;
  while (!path.empty()) {
    const auto dot = path.find('.');
    node = &(*node)[path.substr(0, dot)];
    path = dot == std::string_view::npos ? std::string_view{} : path.substr(dot + 1);
  }
  return *node;
}

}  // namespace

std::vector<EffectiveValue> effective_values(const Study& study) {
  Node root = read_yaml(study.text, study.file);
  std::vector<std::string> set;
  for (const auto& text : study.settings) {
    const Setting setting = setting_of(text);
    if (setting.path.starts_with("layers.")) continue;  // layers are not listed
    set_value(root, setting.path, setting.value);
    set.push_back(setting.path);
  }
  std::vector<EffectiveValue> values;
  for (const auto& key : study_keys()) {
    const std::string& path = key.path;
    if (key.step > 1 || key.type == "map" || path.find("[]") != std::string::npos || path == "layers")
      continue;
    const auto dot = path.rfind('.');
    const std::string parent = dot == std::string::npos ? "" : path.substr(0, dot);
    // Below `dynamics`, and below a key that may be a word or a map, only what the study opened.
    if (parent.starts_with("dynamics") && !find(root, parent).is_map()) continue;
    if (parent.starts_with("model.") && !find(root, parent).is_map()) continue;
    const Node& value = find(root, path);
    if (value.is_map()) continue;  // its own keys follow
    if (value.present()) {
      const bool by_setting = std::find(set.begin(), set.end(), path) != set.end();
      values.push_back({path, in_one_line(value), false, by_setting});
      continue;
    }
    if (key.default_text.empty()) continue;
    if (path == "model.strain" && !study.stack.environment.substrate) continue;
    if (path == "model.bloch_phases" && study.model.ends != Ends::periodic) continue;
    if (path == "field" && study.bias) continue;
    if (path == "model.polarization" && study.stack.environment.growth_plane == GrowthPlane::zinc_blende_001)
      continue;
    if (path == "model.exchange_correlation" && !study.model.self_consistent) continue;
    if (path == "model.levels.count" && study.model.levels.in_layers.empty()) continue;
    values.push_back({path, key.default_text, true, false});
  }
  return values;
}

}  // namespace wellwright
