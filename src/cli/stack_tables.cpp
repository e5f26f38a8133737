// SPDX-License-Identifier: Apache-2.0
// What a study says about its stack: one sentence, layers, values, strain.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "cli/summary.hpp"
#include "cli/table.hpp"
#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

constexpr std::size_t most_rows = 60;  // of layers, before the middle is left out

std::string request_in_words(const LevelRequest& request) {
  if (request.below && request.above)
    return fmt::format("the levels between {:g} and {:g} meV", *request.above * 1e3, *request.below * 1e3);
  if (request.below) return fmt::format("the levels below {:g} meV", *request.below * 1e3);
  return counted(request.count.value_or(6), "level");
}

std::string start_in_words(const Start& start) {
  static constexpr const char* words[] = {"a packet", "a mix of levels", "a state held in one layer",
                                          "a step of the field", "a short light pulse"};
  return words[start.index()];
}

std::string density(double per_nm2) {
  return per_nm2 == 0 ? "" : fmt::format("{:.3g}", per_nm2 * 1e14);
}

std::string material_of(const Layer& layer) {
  if (!layer.grading) return layer.material.text;
  const double power = layer.grading->power;
  return fmt::format("{} to {}, {}", layer.material.text, layer.grading->to.text,
                     power == 1   ? "linear"
                     : power == 2 ? "parabolic"
                                  : fmt::format("power {:g}", power));
}

}  // namespace

std::string headline(const Study& study, int width) {
  const Stack& stack = study.stack;
  const Model& model = study.model;
  std::string text =
      fmt::format("{}, {} nm, {:g} K", counted(static_cast<long long>(stack.layers.size()), "layer"),
                  fmt::format("{:.6g}", stack.length()), stack.environment.temperature);
  if (study.bias)
    text += fmt::format(", bias {:g} V ({:.4g} kV/cm)", *study.bias, study.field * 1e4);
  else if (study.field != 0)
    text += fmt::format(", {:g} kV/cm", study.field * 1e4);
  text += ": " + request_in_words(model.levels) + " of the ";
  for (std::size_t i = 0; i < model.carriers.size(); ++i) {
    if (i > 0) text += i + 1 == model.carriers.size() ? " and the " : ", the ";
    text += name_of(model.carriers[i]);
    static constexpr const char* bands[] = {"", "one band", "two bands", "three bands"};
    if (model.carriers[i] == Carrier::electron)
      text += fmt::format(" ({})", bands[static_cast<std::size_t>(model.bands)]);
  }
  const auto& homes = model.levels.in_layers;
  for (std::size_t i = 0; i < std::min<std::size_t>(homes.size(), 3); ++i)
    text += (i == 0 ? " mostly in " : ", ") +
            stack.layers[static_cast<std::size_t>(homes[i])].label(homes[i] + 1);
  if (homes.size() > 3) text += fmt::format(" and {} more", homes.size() - 3);
  text += model.ends == Ends::periodic ? ", periodic cell, minibands" : ", hard ends";
  text += ", transitions";
  if (study.dynamics)
    text += fmt::format(", beats over {:g} ps after {}", study.dynamics->duration,
                        start_in_words(study.dynamics->start));
  return (study.title.empty() ? "" : wrapped(study.title, width)) + wrapped(text, width, 0, 2);
}

std::string layer_table(const Study& study, int width, bool all) {
  const Stack& stack = study.stack;
  const auto faces = stack.faces();
  Table table({{"", "", Align::number},
               {"layer", "", Align::left, 16},
               {"material", "", Align::left, 43},
               {"thickness", "nm"},
               {"", "ML", Align::number, 0, 5},
               {"from z", "nm", Align::number, 0, 4},
               {"band edge", "meV"},
               {"mass", "m0", Align::number, 0, 1},
               {"gap", "eV", Align::number, 0, 3},
               {"strain", "%", Align::number, 0, 2},
               {"donors", "cm-2", Align::number, 0, 1},
               {"acceptors", "cm-2", Align::number, 0, 1}});
  std::size_t folded = 0, folded_from = 0;
  int last_copy = 0;
  const auto close_fold = [&] {
    if (folded == 0) return;
    table.add_remark(folded == 1 ? fmt::format("... layer {}: copy {} alike", folded_from, last_copy)
                                 : fmt::format("... layers {} to {}: the further copies, up to {}, alike",
                                               folded_from, folded_from + folded - 1, last_copy));
    folded = 0;
  };
  std::size_t rows = 0, hidden = 0;
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    const Layer& layer = stack.layers[i];
    if (!all && layer.copy > 1) {
      if (folded++ == 0) folded_from = i + 1;
      last_copy = layer.copy;
      continue;
    }
    close_fold();
    if (!all && rows >= most_rows && i + 3 < stack.layers.size()) {
      ++hidden;
      continue;
    }
    if (hidden > 0) {
      table.add_remark(fmt::format("... {} more; --verbose lists every layer",
                                   counted(static_cast<long long>(hidden), "layer")));
      hidden = 0;
    }
    ++rows;
    const BandParameters& bands = stack.bands[i];
    std::string strain;
    if (stack.environment.strain && stack.environment.substrate && !layer.material.is_medium()) {
      const double part = stack.table->strain(layer.material, stack.environment).in_plane;
      if (std::abs(part) > 5e-7) strain = fmt::format("{:.3f}", part * 100);
    }
    std::string name = layer.name;
    if (all && layer.copy > 0 && !name.empty()) name += fmt::format("[{}]", layer.copy);
    table.add({std::to_string(i + 1), name, material_of(layer), fmt::format("{:.3f}", layer.thickness),
               std::isfinite(layer.monolayer) && layer.monolayer > 0
                   ? fmt::format("{:.1f}", layer.thickness / layer.monolayer)
                   : "",
               fmt::format("{:.3f}", faces[i]), fmt::format("{:.2f}", bands.conduction_band_edge * 1e3),
               fmt::format("{:.4f}", bands.electron_mass), fmt::format("{:.4f}", bands.band_gap), strain,
               density(layer.donors), density(layer.acceptors)});
  }
  close_fold();
  if (hidden > 0)
    table.add_remark(fmt::format("... {} more; --verbose lists every layer",
                                 counted(static_cast<long long>(hidden), "layer")));
  const bool graded = std::any_of(stack.layers.begin(), stack.layers.end(),
                                  [](const Layer& layer) { return layer.grading.has_value(); });
  return "Layers, from the substrate up\n" + table.text(width) +
         (study.field != 0 ? wrapped("band edge: of the conduction band, without the field", width, 2, 4)
                           : "") +
         (graded ? wrapped("graded layers: the values of their bottom face", width, 2, 4) : "");
}

std::string value_table(const Study& study, int width) {
  Table table({{"value", "", Align::left}, {"", "", Align::left}, {"", "", Align::left}});
  for (const auto& value : effective_values(study))
    table.add({value.path, value.value, value.by_default ? "default" : value.by_setting ? "from --set" : ""});
  if (table.empty()) return "";
  std::string text = table.text(width);
  text.erase(0, text.find('\n') + 1);
  return "Values in force\n" + text;
}

std::string strain_table(const Study& study, int width) {
  const Stack& stack = study.stack;
  if (!stack.environment.substrate) return wrapped("Strain: none, since no substrate is given.", width);
  if (!stack.environment.strain) return wrapped("Strain: switched off.", width);
  const StrainReport report = strain_report(stack);
  const std::string head = fmt::format("Strain on {}\n", stack.environment.substrate->text);
  if (report.rows.empty()) return head + "  every layer has the lattice constant of the substrate\n";
  Table table({{"layer", "", Align::left},
               {"material", "", Align::left},
               {"in plane", "%"},
               {"along growth", "%", Align::number, 0, 2},
               {"thickest run", "nm"},
               {"critical", "nm"},
               {"", "", Align::left}});
  for (const auto& row : report.rows) {
    const Layer& layer = stack.layers[static_cast<std::size_t>(row.layer)];
    table.add(
        {layer.label(row.layer + 1), layer.material.text, fmt::format("{:.3f}", row.state.in_plane * 100),
         fmt::format("{:.3f}", row.state.along_growth * 100), fmt::format("{:.2f}", row.run),
         std::isfinite(row.critical) ? significant(row.critical, 3) : "-", row.over ? "over critical" : ""});
  }
  std::string mean = fmt::format("mean in-plane strain {:.4f} %", report.mean_strain * 100);
  if (std::isfinite(report.stress_weighted_strain))
    mean += fmt::format(", weighted with the stiffness {:.4f} % (0 when balanced)",
                        report.stress_weighted_strain * 100);
  const bool known = std::any_of(report.rows.begin(), report.rows.end(),
                                 [](const auto& row) { return std::isfinite(row.critical); });
  return head + table.text(width) + wrapped(mean, width, 2, 4) +
         wrapped(known ? "critical: the equilibrium thickness above which the layer relaxes by dislocations "
                         "(Matthews and Blakeslee), for a layer that is covered, on top, or part of a "
                         "superlattice as it is here"
                       : "critical: not computed for wurtzite layers",
                 width, 2, 4);
}

}  // namespace wellwright::cli
