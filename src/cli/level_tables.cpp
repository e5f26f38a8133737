// SPDX-License-Identifier: Apache-2.0
// Levels, minibands and the certificate.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "cli/summary.hpp"
#include "cli/table.hpp"
#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

constexpr int most_levels = 40;        // rows of the table
constexpr double worth_saying = 0.15;  // part of a level in a second layer
constexpr double least_home = 0.1;     // below this no layer is its home

// "wide well 55 %, narrow well 43 %"
std::string home_of(const Study& study, const Levels& levels, int level) {
  const auto layers = study.stack.layers.size();
  std::vector<int> order(layers);
  std::iota(order.begin(), order.end(), 0);
  // Rounded, so that layers that share a level evenly come in growth order on every machine.
  const auto part = [&](int layer) {
    return std::round(levels.layer_probability(level, layer) * 1e6) * 1e-6;
  };
  const auto shown = std::min<std::size_t>(2, layers);
  std::partial_sort(order.begin(), order.begin() + static_cast<std::ptrdiff_t>(shown), order.end(),
                    [&](int a, int b) { return part(a) != part(b) ? part(a) > part(b) : a < b; });
  if (part(order[0]) < least_home) return "many layers";
  std::string text;
  for (std::size_t i = 0; i < shown; ++i) {
    const int layer = order[i];
    if (i > 0 && part(layer) < worth_saying) break;
    text += (i > 0 ? ", " : "") +
            fmt::format("{} {:.0f} %", study.stack.layers[static_cast<std::size_t>(layer)].label(layer + 1),
                        part(layer) * 100);
  }
  return text;
}

// To what a level is printed: the accuracy asked for, finer where a neighbour is near, never finer than its
// error.
double shown_error(const Answer& answer, const Levels& levels, int level) {
  double near = answer.study.model.accuracy;
  for (const int other : {level - 1, level + 1})
    if (other >= 0 && other < levels.count())
      near = std::min(near, std::abs(levels.energy(other) - levels.energy(level)) / 10);
  return std::max(levels.error_estimate(level), near);
}

std::string group_of(const Levels& levels, int level) {
  std::string partners;
  for (int other = 0; other < levels.count(); ++other)
    if (other != level &&
        levels.group[static_cast<std::size_t>(other)] == levels.group[static_cast<std::size_t>(level)])
      partners += fmt::format("{}{}", partners.empty() ? "" : ", ", other + 1);
  return partners.empty() ? "" : "one energy with " + partners;
}

// "4.68e11", "0" for what is below one in a square centimetre.
std::string sheet_text(double density) {
  const double per_cm2 = 1e14 * density;
  return per_cm2 < 1 ? "0" : fmt::format("{:.3e}", per_cm2);
}

}  // namespace

std::string level_table(const Answer& answer, const CarrierAnswer& part, int width) {
  const Levels& levels = part.levels;
  const auto name = name_of(levels.profile.carrier);
  const bool hole = levels.profile.carrier != Carrier::electron;
  std::string text =
      wrapped(fmt::format("Levels of the {}{}{}", name, part.minibands ? " at Bloch phase 0" : "",
                          hole ? ", energies downward from the highest valence band edge"
                               : ", energies on the scale of the band edges"),
              width, 0, 2);
  if (levels.count() == 0) return text + "  none in the window\n";
  std::vector<Column> columns{{"level", "", Align::number},
                              {"energy", "meV"},
                              {"lives in", "", Align::left, 24},
                              {"mean z", "nm"},
                              {"spread", "nm"},
                              {"mass in plane", "m0", Align::number, 0, 1}};
  if (part.filled) columns.push_back({"holds", "cm^-2"});
  columns.push_back({"", "", Align::left});
  Table table(columns);
  bool box = false;
  for (int i = 0; i < std::min(levels.count(), most_levels); ++i) {
    const double error = shown_error(answer, levels, i) * 1e3;
    std::string remark = group_of(levels, i);
    if (answer.study.model.ends == Ends::hard && levels.bound[static_cast<std::size_t>(i)] == 0) {
      remark += remark.empty() ? "box" : ", box";
      box = true;
    }
    std::vector<std::string> row{
        std::to_string(i + 1),
        to_error(levels.energy(i) * 1e3, error),
        home_of(answer.study, levels, i),
        fmt::format("{:.2f}", levels.mean_position(i)),
        fmt::format("{:.2f}", levels.spread(i)),
        std::isfinite(levels.in_plane_mass(i)) ? fmt::format("{:.4f}", levels.in_plane_mass(i)) : ""};
    if (part.filled) row.push_back(sheet_text(part.filled->sheet_density[i]));
    row.push_back(remark);
    table.add(row);
  }
  if (levels.count() > most_levels)
    table.add_remark(fmt::format("... {} more in the result file", levels.count() - most_levels));
  text += table.text(width);
  if (box) text += wrapped("box: above the lower outer band edge, held by the hard ends alone", width, 2, 4);
  return text;
}

std::string charge_text(const Answer& answer, int width) {
  if (!answer.charge) return "";
  const Charge& charge = *answer.charge;
  double electrons = 0, holes = 0;
  for (const Filled& filled : charge.filled)
    (filled.carrier == Carrier::electron ? electrons : holes) += filled.sheet_density.sum();
  std::string text = fmt::format("Charge: {} cm^-2 of electrons", sheet_text(electrons));
  if (charge.filled.size() > 1) text += fmt::format(", {} cm^-2 of holes", sheet_text(holes));
  text += fmt::format(" at {:g} K, Fermi level {:.3f} meV", answer.study.carrier_temperature,
                      charge.fermi_level * 1e3);
  if (charge.module_fermi_level.size() > 1) text += " in the first module";
  if (answer.study.model.self_consistent)
    text += charge.converged ? fmt::format("; consistent with its own field after {}",
                                           counted(static_cast<int>(charge.history.size()), "step"))
                             : std::string("; not settled");
  return wrapped(text + ".", width, 0, 2);
}

std::string miniband_table(const CarrierAnswer& part, int width) {
  if (!part.minibands) return "";
  Table table({{"miniband"}, {"bottom", "meV"}, {"top", "meV"}, {"width", "meV"}});
  const auto& energy = part.minibands->energy;
  for (Eigen::Index band = 0; band < std::min<Eigen::Index>(energy.rows(), most_levels); ++band) {
    const double bottom = energy.row(band).minCoeff() * 1e3, top = energy.row(band).maxCoeff() * 1e3;
    table.add({std::to_string(band + 1), fmt::format("{:.3f}", bottom), fmt::format("{:.3f}", top),
               significant(top - bottom, 4)});
  }
  return fmt::format("Minibands of the {}\n", name_of(part.levels.profile.carrier)) + table.text(width);
}

std::string certificate_text(const Answer& answer, int width) {
  std::string text;
  for (const auto& part : answer.carriers) {
    const Levels& levels = part.levels;
    const Certificate& sure = levels.certificate;
    const auto name = name_of(levels.profile.carrier);
    const double error = levels.count() > 0 ? levels.error_estimate.maxCoeff() : 0;
    std::string line = fmt::format("{} of the {}", counted(levels.count(), "level"), name);
    if (!answer.study.model.levels.in_layers.empty()) line += " in the named layers";
    if (!sure.certified) {
      line += ", not certified: " + (sure.reason.empty() ? "some may be missing" : sure.reason);
    } else if (sure.count_below == 0) {
      line += fmt::format(" below {:.3f} eV, none missing", sure.window_top);
    } else {
      line += fmt::format(" between {:.3f} and {:.3f} eV, none missing ({} lower)", sure.window_bottom,
                          sure.window_top, counted(sure.count_below, "level"));
    }
    if (levels.count() > 0) line += fmt::format("; largest error estimate {:.1g} eV", error);
    text += wrapped(line + ".", width, 0, 2);
  }
  return text;
}

}  // namespace wellwright::cli
