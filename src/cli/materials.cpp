// SPDX-License-Identifier: Apache-2.0
// wellwright materials: the table, one alloy with its sources, a lattice-matched composition.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <nlohmann/json.hpp>

#include "cli/commands.hpp"
#include "cli/table.hpp"
#include "cli/text.hpp"
#include "wellwright/materials.hpp"

namespace wellwright::cli {
namespace {

using nlohmann::ordered_json;

// A text of the command line with the option it stands after, as a place for messages.
Place place_of(const std::string& option, const std::string& text) {
  Place place;
  place.file = option;  // without a line: the text is all there is
  place.column = 1;
  place.line_text = text;
  place.length = std::max(1, displayed_width(text));
  return place;
}

std::string structure_of(Structure structure) {
  return structure == Structure::zinc_blende ? "zinc blende"
         : structure == Structure::wurtzite  ? "wurtzite"
                                             : "diamond";
}

Environment environment_of(const Request& request, const MaterialTable& table) {
  Environment environment;
  if (!request.temperature.empty()) {
    const Node value = Node::make_scalar(request.temperature, place_of("--temperature", request.temperature));
    environment.temperature = value.quantity("temperature", Dimension::temperature);
    if (!(environment.temperature >= 0))
      throw InputError("the temperature lies below absolute zero", value.place(), "write it as 77K");
  }
  if (!request.substrate.empty()) {
    environment.substrate = table.alloy(request.substrate, place_of("--substrate", request.substrate));
    environment.strain = true;
    if (table.structure(*environment.substrate) == Structure::wurtzite)
      environment.growth_plane = GrowthPlane::wurtzite_0001;
  }
  return environment;
}

// Between a cubic and a hexagonal crystal no strain is defined.
void check_structures(const MaterialTable& table, const Alloy& alloy, const Alloy& substrate) {
  const Structure one = table.structure(alloy), other = table.structure(substrate);
  if ((one == Structure::wurtzite) == (other == Structure::wurtzite)) return;
  throw InputError(fmt::format("the substrate {} is {} and {} is {}", substrate.text, structure_of(other),
                               alloy.text, structure_of(one)),
                   place_of("--substrate", substrate.text), "the substrate has the structure of the layers");
}

// A name that is a family of the table, such as AlGaAs, is resolved nowhere: it lacks fractions.
bool resolves(const MaterialTable& table, const std::string& name, Alloy& alloy) {
  try {
    alloy = table.alloy(name, {});
    return true;
  } catch (const InputError&) {
    return false;
  }
}

int list_table(const Request& request, const MaterialTable& table) {
  Environment environment = environment_of(request, table);
  Table known({{"name", "", Align::left},
               {"structure", "", Align::left},
               {"gap", "eV"},
               {"mass", "m0"},
               {"lattice constant", "nm"}});
  ordered_json names = ordered_json::array();
  std::string families;
  for (const auto& name : table.names()) {
    names.push_back(name);
    Alloy alloy;
    if (!resolves(table, name, alloy)) {
      families += (families.empty() ? "" : ", ") + name;
      continue;
    }
    Environment here = environment;
    if (table.structure(alloy) == Structure::wurtzite) here.growth_plane = GrowthPlane::wurtzite_0001;
    const BandParameters bands = table.resolve(alloy, here);
    known.add({name, structure_of(table.structure(alloy)), fmt::format("{:.4f}", bands.band_gap),
               std::isfinite(bands.electron_mass) && bands.electron_mass > 0
                   ? fmt::format("{:.4f}", bands.electron_mass)
                   : "",
               fmt::format("{:.5f}", table.strain(alloy, here).relaxed_lattice)});
  }
  if (request.json) {
    std::fputs((names.dump(2) + "\n").c_str(), stdout);
    return 0;
  }
  const int width = output_width();
  std::string text =
      fmt::format("Materials of the table at {:g} K\n", environment.temperature) + known.text(width);
  if (!families.empty())
    text += "\nAlloys, written with fractions as in Al0.3Ga0.7As\n" + wrapped(families, width, 2, 2);
  text +=
      "\n" + wrapped("wellwright materials NAME prints every value of one of them with its source.", width);
  std::fputs(text.c_str(), stdout);
  return 0;
}

// The number of a text in a list that grows with every new one.
std::size_t number_of(std::vector<std::string>& list, const std::string& text) {
  const auto known = std::find(list.begin(), list.end(), text);
  const auto index = static_cast<std::size_t>(known - list.begin());
  if (known == list.end()) list.push_back(text);
  return index + 1;
}

std::string numbered(const char* head, const std::vector<std::string>& list, const char* before,
                     const char* after, int width) {
  if (list.empty()) return "";
  std::string text = fmt::format("\n{}\n", head);
  for (std::size_t i = 0; i < list.size(); ++i)
    text += wrapped(fmt::format("{}{}{} {}", before, i + 1, after, list[i]), width, 2, 6);
  return text;
}

int show_alloy(const Request& request, const MaterialTable& table, const Alloy& alloy) {
  Environment environment = environment_of(request, table);
  if (environment.substrate) check_structures(table, alloy, *environment.substrate);
  if (table.structure(alloy) == Structure::wurtzite) environment.growth_plane = GrowthPlane::wurtzite_0001;
  const auto values = table.explain(alloy, environment);
  Notes notes;
  table.warn(alloy, environment, notes);
  if (request.json) {
    ordered_json root{{"material", alloy.text}, {"temperature", environment.temperature}};
    if (environment.substrate) root["substrate"] = environment.substrate->text;
    for (const auto& value : values)
      root["values"].push_back(
          {{"key", value.key},
           {"value", std::isfinite(value.value) ? ordered_json(value.value) : ordered_json(nullptr)},
           {"unit", value.unit},
           {"source", value.source},
           {"recalled", value.recalled},
           {"trust", value.trust},
           {"range", value.range},
           {"note", value.note}});
    root["warnings"] = notes.warnings();
    std::fputs((root.dump(2) + "\n").c_str(), stdout);
    return 0;
  }
  const int width = output_width();
  std::vector<std::string> sources, remarks;
  bool recalled = false;
  Table rows({{"value", "", Align::left, 10, 1},
              {""},
              {"unit", "", Align::left},
              {"source", "", Align::left},
              {"remark", "", Align::left}});
  for (const auto& value : values) {
    std::string remark;
    const auto say = [&](const std::string& words) {
      if (!words.empty()) remark += (remark.empty() ? "" : "; ") + words;
    };
    if (!value.trust.empty()) say(value.trust + " trust");
    if (!value.range.empty()) say("valid: " + value.range);
    say(value.note);
    recalled = recalled || value.recalled;
    rows.add({value.key, fmt::format("{:.6g}", value.value), value.unit == "1" ? "" : value.unit,
              fmt::format("[{}]{}", number_of(sources, value.source), value.recalled ? " r" : ""),
              remark.empty() ? "" : fmt::format("({})", number_of(remarks, remark))});
  }
  std::string text =
      fmt::format("{} at {:g} K, {}\n", alloy.text, environment.temperature,
                  environment.substrate ? "strained to " + environment.substrate->text : "unstrained");
  text += rows.text(width);
  if (!values.empty() && values.front().key == "conduction_band_edge")
    text += wrapped(
        "band edges: on the scale of valence_band_offset, common to all materials of one structure; in a "
        "study they count from the lowest conduction band edge of the stack",
        width, 2, 4);
  if (recalled) text += wrapped("r: recalled from memory of the source, not read in print", width, 2, 4);
  if (environment.substrate) {
    const StrainState strain = table.strain(alloy, environment);
    text += "\n" + wrapped(fmt::format("Strain on {}: in plane {:.3f} %, along growth {:.3f} %",
                                       environment.substrate->text, strain.in_plane * 100,
                                       strain.along_growth * 100),
                           width, 0, 2);
    if (std::isfinite(strain.critical_thickness_buried))
      text += wrapped(fmt::format("critical thickness {} nm on top, {} nm covered, {} nm in a superlattice",
                                  significant(strain.critical_thickness_overlayer, 3),
                                  significant(strain.critical_thickness_buried, 3),
                                  significant(strain.critical_thickness_superlattice, 3)),
                      width, 2, 4);
  }
  text += numbered("Remarks", remarks, "(", ")", width);
  if (std::any_of(remarks.begin(), remarks.end(),
                  [](const std::string& remark) { return remark.find("also ") != std::string::npos; }))
    text += wrapped(
        "also: what other sources give; short names such as V01 are spelt out in "
        "docs/reference/materials.md",
        width, 2, 4);
  text += numbered("Sources", sources, "[", "]", width);
  std::fputs(text.c_str(), stdout);
  std::fflush(stdout);
  print_warnings(notes, false);
  return 0;
}

int show_match(const Request& request, const MaterialTable& table) {
  const Alloy substrate = table.alloy(request.matched_to, place_of("--matched-to", request.matched_to));
  const Alloy alloy =
      table.lattice_matched(request.operand, substrate, place_of("wellwright materials", request.operand));
  if (request.json) {
    std::fputs(
        (ordered_json{
             {"material", alloy.text}, {"composition", alloy.composition()}, {"substrate", substrate.text}}
             .dump(2) +
         "\n")
            .c_str(),
        stdout);
    return 0;
  }
  std::fputs(
      std::isnan(alloy.composition())
          ? fmt::format("of {} only its end {} has the lattice constant of {} at 300 K\n", request.operand,
                        alloy.text, substrate.text)
                .c_str()
          : fmt::format("{} has the lattice constant of {} at 300 K\n", alloy.text, substrate.text).c_str(),
      stdout);
  return 0;
}

}  // namespace

int materials(const Request& request) {
  const MaterialTable table = table_for(request);
  if (request.operand.empty()) return list_table(request, table);
  if (!request.matched_to.empty()) return show_match(request, table);
  return show_alloy(request, table,
                    table.alloy(request.operand, place_of("wellwright materials", request.operand)));
}

}  // namespace wellwright::cli
