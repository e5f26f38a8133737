// SPDX-License-Identifier: Apache-2.0
// Whether the media hold what the study's questions need.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <set>

#include "study/read.hpp"

namespace wellwright {
namespace {

struct Need {
  const char* key;
  std::string question;
};

std::vector<Need> needs_of(const Study& study) {
  std::vector<Need> needs;
  auto carriers = study.model.carriers;
  if (study.dynamics)
    if (const auto* start = std::get_if<PhotoexcitedStart>(&study.dynamics->start))
      carriers.push_back(start->hole);
  for (const Carrier carrier : carriers) {
    const std::string levels = fmt::format("{} levels", name_of(carrier));
    needs.push_back({"conduction_band_edge", levels});
    if (carrier != Carrier::electron) {
      needs.push_back({"band_gap", levels});
      needs.push_back({carrier == Carrier::heavy_hole ? "heavy_hole_mass" : "light_hole_mass", levels});
      continue;
    }
    needs.push_back({"electron_mass", levels});
    if (study.model.bands != Bands::one)
      needs.push_back({"band_gap", study.model.bands == Bands::two ? "bands: two" : "bands: three"});
    if (study.model.bands == Bands::three) needs.push_back({"spin_orbit_splitting", "bands: three"});
  }
  return needs;
}

bool has_electrons(const Study& study) {
  const auto& carriers = study.model.carriers;
  return std::find(carriers.begin(), carriers.end(), Carrier::electron) != carriers.end();
}

}  // namespace

void check_media(const Node& root, const Study& study) {
  const Stack& stack = study.stack;
  const auto needs = needs_of(study);
  std::set<std::string> seen;
  for (const Layer& layer : stack.layers) {
    const Alloy* alloys[] = {&layer.material, layer.grading ? &layer.grading->to : nullptr};
    for (const Alloy* alloy : alloys) {
      if (!alloy || !seen.insert(alloy->text).second) continue;
      if (!alloy->is_medium()) {
        if (stack.table->structure(*alloy) == Structure::diamond && has_electrons(study)) {
          const Node& carrier = root["model"]["carrier"];
          throw InputError(
              fmt::format("electrons in {} are not at Gamma, and their levels are not built", alloy->text),
              layer.place, carrier.present() ? carrier.place() : Place{},
              "holes in Si, Ge and SiGe are fine: model: {carrier: heavy hole}");
        }
        continue;
      }
      for (const Need& need : needs)
        if (std::isnan(stack.table->value(*alloy, need.key, stack.environment)))
          throw InputError(fmt::format("the medium {} has no `{}`, which {} need{}", alloy->text, need.key,
                                       need.question, need.question.ends_with("levels") ? "" : "s"),
                           root["materials"].key_place(alloy->medium), layer.place,
                           fmt::format("give it under materials: {}: {{{}: ...}}", alloy->text, need.key));
    }
  }
}

}  // namespace wellwright
