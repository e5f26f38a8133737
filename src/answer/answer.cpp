// SPDX-License-Identifier: Apache-2.0
// The chain: levels, dispersion, minibands, derivatives, transitions, interband pairs, dynamics.
#include "wellwright/answer.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <chrono>

namespace wellwright {
namespace {

constexpr double widest_k = 0.5;  // [nm^-1]: some 0.15 eV of in-plane energy in GaAs
constexpr int k_points = 26;
constexpr double charged_share = 1e-4;  // of a carrier's charge, in a level that is then listed

// Milliseconds of each part, for --verbose.
class Stopwatch {
 public:
  explicit Stopwatch(std::vector<std::pair<std::string, double>>& timings) : timings_(timings) {}
  void lap(std::string part) {
    const auto now = std::chrono::steady_clock::now();
    timings_.emplace_back(std::move(part), std::chrono::duration<double, std::milli>(now - last_).count());
    last_ = now;
  }

 private:
  std::vector<std::pair<std::string, double>>& timings_;
  std::chrono::steady_clock::time_point last_ = std::chrono::steady_clock::now();
};

// A transition of the study's list can name a level that a window or a layer does not hold.
void warn_of_missing(const Study& study, const Levels& levels, Notes& notes) {
  for (const auto& [from, to] : study.model.transitions) {
    const int beyond = std::max(from, to), count = levels.count();
    if (beyond <= count) continue;
    notes.warn(fmt::format("transition [{}, {}] of the {} is left out: it names level {}, and {} computed",
                           from, to, name_of(levels.profile.carrier), beyond,
                           count == 0   ? "no level was"
                           : count == 1 ? "1 level was"
                                        : fmt::format("{} levels were", count)));
  }
}

// A count of levels is raised where more of them hold charge.
Study with_charged_levels(const Study& study, Carrier carrier, const std::optional<Charge>& charge,
                          Notes& notes) {
  const LevelRequest& request = study.model.levels;
  if (!charge || !request.count || !request.in_layers.empty()) return study;
  for (const Filled& filled : charge->filled) {
    if (filled.carrier != carrier) continue;
    const double total = filled.sheet_density.sum();
    int needed = 0;
    for (Eigen::Index i = 0; i < filled.sheet_density.size(); ++i)
      if (filled.sheet_density[i] > charged_share * total) needed = static_cast<int>(i) + 1;
    if (needed <= *request.count) return study;
    notes.assume(fmt::format("{} levels of the {} are computed instead of {}: so many hold charge", needed,
                             name_of(carrier), *request.count));
    Study more = study;
    more.model.levels.count = std::min(needed, largest_level_count);
    return more;
  }
  return study;
}

void say_charge(const Study& study, const Charge& charge, Notes& notes) {
  notes.assume(
      study.model.self_consistent
          ? "donors and acceptors are fully ionised; the levels fill from one Fermi level and their charge "
            "bends the bands"
          : "donors and acceptors are fully ionised; the levels fill, but their charge does not bend the "
            "bands");
  if (study.model.exchange_correlation)
    notes.assume("exchange and correlation of the electrons after Hedin and Lundqvist, in the local density");
  const bool polar = std::any_of(study.stack.bands.begin(), study.stack.bands.end(),
                                 [](const BandParameters& bands) { return bands.polarization != 0; });
  if (polar && study.model.polarization)
    notes.assume(
        "polarization: spontaneous and piezoelectric, as sheets of bound charge at interior interfaces; the "
        "materials name the set its constants come from");
  if (study.model.filling == Filling::per_module)
    notes.assume("each copy of a repeat is neutral by itself, with a Fermi level of its own");
  if (study.model.self_consistent && study.model.filling == Filling::equilibrium && study.field != 0)
    notes.warn(
        "one Fermi level in a field: the charge gathers at one end; filling: per module keeps each copy of a "
        "repeat neutral");
  if (!charge.potential.empty())
    notes.assume("derivatives are taken with the potential of the charge held fixed");
  if (!charge.converged)
    notes.warn(fmt::format("the charge did not settle: the last step moved a level by {:.1e} eV",
                           charge.history.back().change));
}

CarrierAnswer answer_for(const Study& study, Carrier carrier, const std::optional<Charge>& charge,
                         Notes& notes, const Progress& progress, Stopwatch& watch) {
  CarrierAnswer part;
  const std::string name(name_of(carrier));
  part.levels = solve_levels(with_charged_levels(study, carrier, charge, notes), carrier, notes, progress,
                             charge ? charge->potential : Potential{});
  watch.lap(fmt::format("levels of the {}", name));
  part.dispersion = in_plane_dispersion(
      part.levels,
      Eigen::VectorXd::LinSpaced(k_points, 0,
                                 std::max(widest_k, charge ? widest_filled_k(*charge, carrier) : 0)),
      progress);
  if (charge) part.filled = fill(study, part.levels, part.dispersion, *charge);
  watch.lap(fmt::format("in-plane dispersion of the {}", name));
  if (study.model.ends == Ends::periodic) {
    part.minibands = minibands(part.levels, study.model.bloch_phases);
    watch.lap(fmt::format("minibands of the {}", name));
  }
  part.transitions = transitions(part.levels);
  watch.lap(fmt::format("transitions of the {}", name));
  warn_of_missing(study, part.levels, notes);
  part.sensitivity = sensitivity(study, part.levels, listed_transitions(study, part.levels.count()));
  watch.lap(fmt::format("derivatives of the {}", name));
  return part;
}

}  // namespace

const CarrierAnswer* Answer::find(Carrier carrier) const {
  const auto found = std::find_if(carriers.begin(), carriers.end(), [&](const CarrierAnswer& part) {
    return part.levels.profile.carrier == carrier;
  });
  return found == carriers.end() ? nullptr : &*found;
}

Answer answer(const Study& study, Notes notes, const Progress& progress) {
  Answer result;
  result.study = study;
  result.notes = std::move(notes);
  Stopwatch watch(result.timings);
  std::vector<Carrier> carriers = study.model.carriers;
  // A photoexcited start needs the levels of its hole kind even where the model does not list them.
  const PhotoexcitedStart* light =
      study.dynamics ? std::get_if<PhotoexcitedStart>(&study.dynamics->start) : nullptr;
  if (light && std::find(carriers.begin(), carriers.end(), light->hole) == carriers.end())
    carriers.push_back(light->hole);
  if (has_charge(study)) {
    result.charge = solve_charge(study, progress);
    result.converged = result.charge->converged;
    say_charge(study, *result.charge, result.notes);
    watch.lap("charge");
  }
  for (const Carrier carrier : carriers)
    result.carriers.push_back(answer_for(study, carrier, result.charge, result.notes, progress, watch));

  const CarrierAnswer* electrons = result.find(Carrier::electron);
  if (electrons) {
    for (const CarrierAnswer& part : result.carriers)
      if (part.levels.profile.carrier != Carrier::electron)
        result.interband.push_back(interband(electrons->levels, part.levels));
    if (!result.interband.empty())
      result.notes.assume("interband energies are those of free pairs, without exciton binding");
    watch.lap("interband pairs");
  }
  if (study.dynamics) {
    const CarrierAnswer& moving = electrons ? *electrons : result.carriers.front();
    const CarrierAnswer* holes = light ? result.find(light->hole) : nullptr;
    result.dynamics =
        superpose(study, moving.levels, moving.transitions, holes ? &holes->levels : nullptr, result.notes);
    watch.lap("dynamics");
  }
  // The edges are shown on the grid of the first carrier, which resolves every layer.
  result.edges = edge_profile(study, result.carriers.front().levels.profile.grid,
                              result.charge ? result.charge->potential : Potential{});
  watch.lap("band edges");
  return result;
}

}  // namespace wellwright
