// SPDX-License-Identifier: Apache-2.0
// Transitions, electron-hole pairs and beats.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "cli/summary.hpp"
#include "cli/table.hpp"
#include "cli/text.hpp"
#include "wellwright/units.hpp"

namespace wellwright::cli {
namespace {

constexpr std::size_t most_rows = 20;
constexpr double least_overlap = 0.01;  // squared overlap of a pair worth a line
constexpr double least_beat = 0.01;     // part of the strongest beat worth a line
constexpr double least_dipole = 5e-4;   // below this a dipole is zero by symmetry or by numerical noise [nm]

// To what a difference of two levels is printed: the accuracy asked for, finer where the difference is small,
// never finer than the errors of the two.
double shown_error(const Answer& answer, double energy, double first_error, double second_error) {
  constexpr double digits = 1e-3;
  return std::max(first_error + second_error,
                  std::min(answer.study.model.accuracy, digits * std::abs(energy)));
}

double error_of_pair(const Answer& answer, const Levels& levels, int i, int j) {
  return shown_error(answer, levels.energy(j) - levels.energy(i), levels.error_estimate(i),
                     levels.error_estimate(j));
}

std::string wavelength_text(double energy, double error) {
  return significant(wavelength_of(std::abs(energy)) * 1e-3, std::min(6, known_digits(energy, error)));
}

std::string start_sentence(const Answer& answer) {
  const Dynamics& motion = *answer.dynamics;
  std::string text = fmt::format("<z> moves between {:.2f} and {:.2f} nm", motion.mean_position.minCoeff(),
                                 motion.mean_position.maxCoeff());
  if (motion.captured_norm < 0.9999)
    text += fmt::format("; {:.4g} % of the start state lies in the levels used", motion.captured_norm * 100);
  if (motion.classical_period)
    text += fmt::format("; classical period {} ps", significant(*motion.classical_period, 4));
  if (motion.revival_time) text += fmt::format("; revival time {} ps", significant(*motion.revival_time, 4));
  return text;
}

}  // namespace

std::string transition_table(const Answer& answer, const CarrierAnswer& part, int width) {
  const Transitions& light = part.transitions;
  const auto pairs = listed_transitions(answer.study, part.levels.count());
  if (pairs.empty()) return "";
  Table table({{"from"},
               {"to"},
               {"energy", "meV"},
               {"wavelength", "um"},
               {"frequency", "THz", Align::number, 0, 2},
               {"dipole", "nm"},
               {"strength", "", Align::number, 0, 1},
               {"beat period", "ps"}});
  for (const auto& [from, to] : pairs) {
    const int i = from - 1, j = to - 1;
    if (i >= part.levels.count() || j >= part.levels.count()) continue;
    const double energy = light.energy(i, j), error = error_of_pair(answer, part.levels, i, j);
    const int digits = std::min(6, known_digits(energy, error));
    if (std::abs(energy) <= error) {  // equal as far as is known: no wavelength, no period
      table.add({std::to_string(from), std::to_string(to), to_error(energy * 1e3, error * 1e3), "-", "-",
                 significant(std::abs(light.dipole(i, j)), 4), "-", "-"});
      continue;
    }
    const bool dark = std::abs(light.dipole(i, j)) < least_dipole;
    table.add({std::to_string(from), std::to_string(to), to_error(energy * 1e3, error * 1e3),
               wavelength_text(energy, error), significant(light.frequency(i, j), digits),
               dark ? "0" : significant(std::abs(light.dipole(i, j)), 4),
               dark ? "0" : significant(light.oscillator_strength(i, j), 4),
               significant(light.beat_period(i, j), digits)});
  }
  return fmt::format("Transitions of the {}\n", name_of(part.levels.profile.carrier)) + table.text(width) +
         wrapped("strength: oscillator strength with the free electron mass, negative downward", width, 2, 4);
}

std::string interband_table(const Answer& answer, const Interband& pairs, int width) {
  Table table({{"electron"},
               {std::string(name_of(pairs.hole))},
               {"energy", "eV"},
               {"wavelength", "nm"},
               {"overlap", "squared"}});
  struct Row {
    Eigen::Index e, h;
    double overlap;
  };
  std::vector<Row> rows;
  for (Eigen::Index e = 0; e < pairs.energy.rows(); ++e)
    for (Eigen::Index h = 0; h < pairs.energy.cols(); ++h)
      if (const double overlap = pairs.overlap(e, h) * pairs.overlap(e, h); overlap >= least_overlap)
        rows.push_back({e, h, overlap});
  std::sort(rows.begin(), rows.end(),
            [&](const Row& a, const Row& b) { return pairs.energy(a.e, a.h) < pairs.energy(b.e, b.h); });
  const auto total = static_cast<std::size_t>(pairs.energy.size());
  const std::size_t shown = std::min(rows.size(), most_rows);
  const Levels& electrons = answer.find(Carrier::electron)->levels;
  const Levels& holes = answer.find(pairs.hole)->levels;
  for (std::size_t i = 0; i < shown; ++i) {
    const double energy = pairs.energy(rows[i].e, rows[i].h);
    const double error =
        shown_error(answer, energy, electrons.error_estimate(rows[i].e), holes.error_estimate(rows[i].h));
    table.add({std::to_string(rows[i].e + 1), std::to_string(rows[i].h + 1), to_error(energy, error),
               significant(wavelength_of(energy), std::min(6, known_digits(energy, error))),
               fmt::format("{:.4f}", rows[i].overlap)});
  }
  std::string text = fmt::format("Pairs of electron and {}, without exciton binding\n", name_of(pairs.hole));
  if (shown == 0) return text + fmt::format("  none with a squared overlap above {:g}\n", least_overlap);
  if (total > shown)
    table.add_remark(fmt::format("... {} weaker or higher in the result file",
                                 counted(static_cast<long long>(total - shown), "pair")));
  return text + table.text(width);
}

std::string beat_table(const Answer& answer, int width) {
  if (!answer.dynamics) return "";
  const Dynamics& motion = *answer.dynamics;
  const CarrierAnswer* electrons = answer.find(Carrier::electron);
  const Levels& levels = (electrons ? *electrons : answer.carriers.front()).levels;
  const std::string head = fmt::format("Beats of the {} over {:g} ps\n", name_of(levels.profile.carrier),
                                       answer.study.dynamics->duration) +
                           wrapped(start_sentence(answer), width, 2, 2);
  Table table({{"levels", "", Align::left},
               {"energy", "meV"},
               {"period", "ps"},
               {"frequency", "THz"},
               {"amplitude of <z>", "nm"},
               {"wavelength", "um", Align::number, 0, 1}});
  const double strongest = motion.beats.empty() ? 0 : motion.beats.front().dipole_amplitude;
  std::size_t shown = 0;
  for (const Beat& beat : motion.beats) {
    if (shown == most_rows / 2 || beat.dipole_amplitude < least_beat * strongest ||
        beat.dipole_amplitude < 1e-6)
      break;
    const double error = error_of_pair(answer, levels, beat.lower - 1, beat.upper - 1);
    const int digits = std::min(6, known_digits(beat.energy, error));
    table.add({fmt::format("{} and {}", beat.lower, beat.upper), to_error(beat.energy * 1e3, error * 1e3),
               significant(beat.period, digits), significant(beat.frequency, digits),
               significant(beat.dipole_amplitude, 4), wavelength_text(beat.energy, error)});
    ++shown;
  }
  if (shown == 0) return head + "  none: the state stays where it is\n";
  if (motion.beats.size() > shown)
    table.add_remark(fmt::format("... {} weaker in the result file",
                                 counted(static_cast<long long>(motion.beats.size() - shown), "beat")));
  return head + table.text(width);
}

}  // namespace wellwright::cli
