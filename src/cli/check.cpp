// SPDX-License-Identifier: Apache-2.0
// wellwright check: a study read and resolved, nothing computed.
#include <fmt/format.h>

#include <cstdio>
#include <nlohmann/json.hpp>

#include "cli/commands.hpp"
#include "cli/summary.hpp"
#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

nlohmann::ordered_json number(double value) {
  return std::isfinite(value) ? nlohmann::ordered_json(value) : nlohmann::ordered_json(nullptr);
}

std::string as_json(const Study& study, const Notes& notes) {
  using nlohmann::ordered_json;
  ordered_json root;
  root["title"] = study.title;
  root["length"] = study.stack.length();
  const auto faces = study.stack.faces();
  for (std::size_t i = 0; i < study.stack.layers.size(); ++i) {
    const Layer& layer = study.stack.layers[i];
    const BandParameters& bands = study.stack.bands[i];
    ordered_json row{{"layer", i + 1}, {"name", layer.name}, {"material", layer.material.text}};
    if (layer.grading) row["to"] = layer.grading->to.text;
    row["bottom"] = faces[i];
    row["thickness"] = layer.thickness;
    row["monolayers"] = number(layer.thickness / layer.monolayer);
    row["conduction_band_edge"] = number(bands.conduction_band_edge);
    row["electron_mass"] = number(bands.electron_mass);
    row["band_gap"] = number(bands.band_gap);
    row["donor_sheet_density"] = layer.donors * 1e14;
    row["acceptor_sheet_density"] = layer.acceptors * 1e14;
    root["layers"].push_back(row);
  }
  for (const auto& value : effective_values(study))
    root["values"].push_back({{"path", value.path},
                              {"value", value.value},
                              {"default", value.by_default},
                              {"setting", value.by_setting}});
  root["strain"] = ordered_json::array();
  if (study.stack.environment.strain && study.stack.environment.substrate) {
    const StrainReport report = strain_report(study.stack);
    for (const auto& row : report.rows)
      root["strain"].push_back({{"layer", row.layer + 1},
                                {"in_plane_strain", row.state.in_plane},
                                {"thickest_run", row.run},
                                {"critical_thickness", number(row.critical)},
                                {"over", row.over}});
    root["mean_strain"] = report.mean_strain;
    root["stress_weighted_strain"] = number(report.stress_weighted_strain);
  }
  root["assumptions"] = notes.assumptions();
  root["warnings"] = notes.warnings();
  return root.dump(2);
}

}  // namespace

int check(const Request& request) {
  Timings timings;
  const int width = output_width();
  const MaterialTable table = table_for(request);
  Notes notes;
  const Study study = study_for(request, table, notes);
  timings.lap("study and stack");
  const bool tables = !request.json && !request.quiet;
  if (request.json) std::fputs((as_json(study, notes) + "\n").c_str(), stdout);
  if (tables) {
    std::string text = headline(study, width);
    for (const auto& part :
         {layer_table(study, width, request.verbose), value_table(study, width), strain_table(study, width),
          assumptions_text(notes, width), warnings_text(notes, width)})
      if (!part.empty()) text += "\n" + part;
    text += "\nThe study is in order; nothing was computed.\n";
    std::fputs(text.c_str(), stdout);
  }
  std::fflush(stdout);
  print_warnings(notes, tables);
  if (request.verbose) timings.print();
  return 0;
}

}  // namespace wellwright::cli
