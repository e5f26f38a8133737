// SPDX-License-Identifier: Apache-2.0
// Levels, transitions, beats, notes and certificate as one JSON object.
#include <cmath>
#include <nlohmann/json.hpp>

#include "results/names.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace {

using Json = nlohmann::ordered_json;

Json number(double value) {
  return std::isfinite(value) ? Json(value) : Json(nullptr);
}

Json levels_of(const Study& study, const Levels& levels) {
  Json list = Json::array();
  for (int i = 0; i < levels.count(); ++i) {
    Eigen::Index layer = 0;
    const double most = levels.layer_probability.row(i).maxCoeff(&layer);
    const auto at = static_cast<std::size_t>(i);
    list.push_back(
        {{"level", i + 1},
         {"energy_eV", number(levels.energy[i])},
         {"error_estimate_eV", number(levels.error_estimate[i])},
         {"mean_position_nm", number(levels.mean_position[i])},
         {"spread_nm", number(levels.spread[i])},
         {"lives_in", study.stack.layers[static_cast<std::size_t>(layer)].label(static_cast<int>(layer) + 1)},
         {"probability_there", number(most)},
         {"in_plane_mass_m0", number(levels.in_plane_mass[i])},
         {"conduction_fraction", number(levels.conduction_fraction[i])},
         {"bound", levels.bound[at] != 0},
         {"group", levels.group[at]}});
  }
  return list;
}

Json transitions_of(const Transitions& t) {
  Json list = Json::array();
  for (Eigen::Index i = 0; i < t.energy.rows(); ++i)
    for (Eigen::Index f = i + 1; f < t.energy.cols(); ++f)
      list.push_back({{"initial", i + 1},
                      {"final", f + 1},
                      {"energy_eV", number(t.energy(i, f))},
                      {"wavelength_nm", number(t.wavelength(i, f))},
                      {"frequency_THz", number(t.frequency(i, f))},
                      {"dipole_nm", number(t.dipole(i, f))},
                      {"oscillator_strength", number(t.oscillator_strength(i, f))},
                      {"beat_period_ps", number(t.beat_period(i, f))}});
  return list;
}

Json certificate_of(const Certificate& c) {
  return {{"certified", c.certified},
          {"count_below", c.count_below},
          {"window_bottom_eV", number(c.window_bottom)},
          {"window_top_eV", number(c.window_top)},
          {"reason", c.reason}};
}

Json dynamics_of(const Dynamics& d) {
  Json beats = Json::array();
  for (const Beat& b : d.beats)
    beats.push_back({{"lower", b.lower},
                     {"upper", b.upper},
                     {"energy_eV", number(b.energy)},
                     {"period_ps", number(b.period)},
                     {"frequency_THz", number(b.frequency)},
                     {"dipole_amplitude_nm", number(b.dipole_amplitude)}});
  Json out = {{"captured_norm", number(d.captured_norm)}, {"beats", beats}};
  out["classical_period_ps"] = d.classical_period ? number(*d.classical_period) : Json(nullptr);
  out["revival_time_ps"] = d.revival_time ? number(*d.revival_time) : Json(nullptr);
  return out;
}

}  // namespace

std::string to_json(const Answer& answer) {
  Json out;
  out["title"] = answer.study.title;
  out["version"] = version();
  Json carriers = Json::array();
  for (const CarrierAnswer& part : answer.carriers) {
    Json one;
    one["carrier"] = name_of(part.levels.profile.carrier);
    one["certificate"] = certificate_of(part.levels.certificate);
    one["levels"] = levels_of(answer.study, part.levels);
    one["transitions"] = transitions_of(part.transitions);
    carriers.push_back(std::move(one));
  }
  out["carriers"] = std::move(carriers);
  Json interband = Json::array();
  for (const Interband& pairs : answer.interband)
    for (Eigen::Index e = 0; e < pairs.energy.rows(); ++e)
      for (Eigen::Index h = 0; h < pairs.energy.cols(); ++h)
        interband.push_back({{"hole", name_of(pairs.hole)},
                             {"electron_level", e + 1},
                             {"hole_level", h + 1},
                             {"energy_eV", number(pairs.energy(e, h))},
                             {"overlap", number(pairs.overlap(e, h))}});
  if (!interband.empty()) out["interband"] = std::move(interband);
  if (answer.dynamics) out["dynamics"] = dynamics_of(*answer.dynamics);
  out["assumptions"] = answer.notes.assumptions();
  out["warnings"] = answer.notes.warnings();
  out["converged"] = answer.converged;
  return out.dump(2);
}

}  // namespace wellwright
