// SPDX-License-Identifier: Apache-2.0
// The stack from the study file: conditions, structure, layers, and what is assumed about them.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <set>

#include "stack/blend.hpp"
#include "stack/layers.hpp"

namespace wellwright {
namespace {

struct Structured {
  Structure structure;
  Alloy alloy;
  Place place;
};

const char* words_of(Structure structure) {
  switch (structure) {
    case Structure::zinc_blende:
      return "zinc blende";
    case Structure::wurtzite:
      return "wurtzite";
    default:
      return "diamond (Si, Ge)";
  }
}

// Calls use(alloy, place) for each alloy of the table as written.
template <class Use>
void for_each_alloy(const WrittenLayers& layers, Use use) {
  for (const WrittenLayer& written : layers.written) {
    const Node& item = *written.node;
    use(written.layer.material,
        item["material"].present() ? item["material"].place() : item["graded"]["from"].place());
    if (written.layer.grading) use(written.layer.grading->to, item["graded"]["to"].place());
  }
}

// The structure that all tabled alloys share; zinc blende when every layer is a medium of the study.
std::optional<Structured> common_structure(const WrittenLayers& layers, const MaterialTable& table) {
  std::optional<Structured> first;
  for_each_alloy(layers, [&](const Alloy& alloy, const Place& place) {
    if (alloy.is_medium()) return;
    const Structure structure = table.structure(alloy);
    if (!first) first = {structure, alloy, place};
    if (structure == first->structure) return;
    const std::string sentence = fmt::format("{} is {} and {} is {}", alloy.text, words_of(structure),
                                             first->alloy.text, words_of(first->structure));
    const bool wurtzite = structure == Structure::wurtzite || first->structure == Structure::wurtzite;
    throw InputError(
        sentence, place, first->place,
        wurtzite ? "zinc blende and wurtzite do not mix in one stack"
                 : "their band edges stand on different scales, so the offset between them is not known");
  });
  return first;
}

GrowthPlane read_plane(const Node& root, const std::optional<Structured>& layers) {
  const bool wurtzite = layers && layers->structure == Structure::wurtzite;
  const Node& value = root["growth_plane"];
  if (!value.present()) return wurtzite ? GrowthPlane::wurtzite_0001 : GrowthPlane::zinc_blende_001;
  const std::string word = stack_declarations().word(root, "growth_plane");
  if (layers && wurtzite != (word != "(001)"))
    throw InputError(
        fmt::format("`growth_plane: {}` does not fit {}, which is {}", word, layers->alloy.text,
                    words_of(layers->structure)),
        value.place(), layers->place,
        wurtzite ? "wurtzite grows on (0001) or (000-1)" : "zinc blende and diamond grow on (001)");
  if (word == "(001)") return GrowthPlane::zinc_blende_001;
  return word == "(0001)" ? GrowthPlane::wurtzite_0001 : GrowthPlane::wurtzite_000m1;
}

void read_substrate(const Node& root, const std::optional<Structured>& layers, const MaterialTable& table,
                    AlloyReader& alloys, Environment& environment) {
  const Node& substrate = root["substrate"];
  if (!substrate.present()) return;
  environment.substrate = alloys.read(substrate, "substrate");
  if (!layers || environment.substrate->is_medium()) return;
  const bool fits = (table.structure(*environment.substrate) == Structure::wurtzite) ==
                    (layers->structure == Structure::wurtzite);
  if (!fits)
    throw InputError(fmt::format("the substrate {} is {} and {} is {}", environment.substrate->text,
                                 words_of(table.structure(*environment.substrate)), layers->alloy.text,
                                 words_of(layers->structure)),
                     substrate.place(), layers->place, "the substrate has the structure of the layers");
}

void read_strain(const Node& root, Environment& environment, Notes& notes) {
  const Node& strain = root["model"]["strain"];
  environment.strain =
      environment.substrate.has_value() && stack_declarations().on_off(root["model"], "model.strain");
  if (strain.present() && strain.on_off("strain") && !environment.substrate)
    throw InputError("`strain: on` stands without a `substrate`", strain.place(),
                     "name the substrate, such as substrate: GaAs, or leave strain out");
  if (!environment.substrate)
    notes.assume("no substrate is given: the layers are taken as unstrained");
  else if (!environment.strain)
    notes.assume("strain is off: the layers are taken as unstrained in spite of the substrate");
}

void read_offset_ratio(const Node& root, Environment& environment) {
  const Node& ratio = root["model"]["offset_ratio"];
  if (!ratio.present()) return;
  environment.offset_ratio = ratio.number("offset_ratio");
  if (!(*environment.offset_ratio > 0 && *environment.offset_ratio < 1))
    throw InputError(fmt::format("`offset_ratio` is {}", ratio.text()), ratio.place(),
                     "the conduction band's share lies between 0 and 1, such as 0.65");
}

// The choice of variants without the overrides of values: the table that sets the zero of energy.
Node only_variants(const Node& materials) {
  std::vector<Node::Entry> entries;
  for (const auto& entry : materials.entries()) {
    std::vector<Node::Entry> kept;
    for (const auto& value : entry.value.entries())
      if (value.key == "variant") kept.push_back(value);
    if (!kept.empty())
      entries.push_back({entry.key, entry.key_place, Node::make_map(std::move(kept), entry.value.place())});
  }
  return Node::make_map(std::move(entries), materials.place());
}

std::string in_meV(double energy) {
  return fmt::format("{:.1f} meV", energy == 0 ? 0.0 : 1e3 * energy);
}

// Tabled media and explicit edges side by side, since nothing but the study says how they stand.
void say_mixed_scales(const Stack& stack, Notes& notes) {
  const Layer* tabled = nullptr;
  double lowest = std::numeric_limits<double>::infinity();
  std::vector<std::string> said;
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    const Layer& layer = stack.layers[i];
    if (!stack.table->edge_is_final(layer.material)) {
      if (stack.bands[i].conduction_band_edge < lowest) {
        lowest = stack.bands[i].conduction_band_edge;
        tabled = &layer;
      }
    } else if (said.size() < 8) {
      const std::string edge = fmt::format("{} at {} (the study)", layer.material.text,
                                           in_meV(stack.bands[i].conduction_band_edge));
      if (std::find(said.begin(), said.end(), edge) == said.end()) said.push_back(edge);
    }
  }
  if (said.empty()) return;
  if (tabled)
    notes.assume(fmt::format("conduction band edges from the same zero: {} at {} (the table), {}",
                             tabled->material.text, in_meV(lowest), fmt::join(said, ", ")));
  else
    notes.assume("every conduction band edge is given in the study: these numbers are the energy scale");
}

void say_strain(const Stack& stack, Notes& notes) {
  for (const auto& row : strain_report(stack).rows)
    if (row.over)
      notes.warn(
          fmt::format("layer {}: {:.3g} nm of {} at {:+.2f} % strain is thicker than the critical thickness "
                      "{:.3g} nm (Matthews-Blakeslee): it may relax",
                      stack.layers[static_cast<std::size_t>(row.layer)].label(row.layer + 1), row.run,
                      stack.layers[static_cast<std::size_t>(row.layer)].material.text,
                      100 * row.state.in_plane, row.critical));
}

// Resolves every alloy, the middle of every grading and of every smeared interface once, so that what the
// table lacks is said at the layer that needs it.
void probe(const Stack& stack, const WrittenLayers& layers) {
  const auto located = [](const Place& place, auto resolve) {
    try {
      resolve();
    } catch (const InputError& error) {
      if (!error.place().file.empty()) throw;
      throw InputError(error.sentence(), place, error.hint());
    }
  };
  std::set<std::string> done;
  const auto middle = [&](const Alloy& from, const Alloy& to, const Place& place) {
    if (from.is_medium() || to.is_medium() || !done.insert(from.text + " " + to.text).second) return;
    std::array<double, 9> fraction{};
    for (std::size_t e = 0; e < fraction.size(); ++e) fraction[e] = 0.5 * (from.fraction[e] + to.fraction[e]);
    located(place, [&] { stack.table->resolve(mixture(fraction), stack.environment); });
  };
  for_each_alloy(layers, [&](const Alloy& alloy, const Place& place) {
    if (done.insert(alloy.text).second)
      located(place, [&] { stack.table->resolve(alloy, stack.environment); });
  });
  for (std::size_t i = 0; i < stack.layers.size(); ++i) {
    const Layer& layer = stack.layers[i];
    if (layer.grading) middle(layer.material, layer.grading->to, layer.place);
    if (stack.interdiffusion <= 0 || i == 0) continue;
    const Layer& under = stack.layers[i - 1];
    middle(under.grading ? under.grading->to : under.material, layer.material, layer.place);
  }
}

}  // namespace

const Declarations& stack_declarations() {
  static const Declarations declarations(stack_keys());
  return declarations;
}

Stack read_stack(const Node& root, const MaterialTable& table, Notes& notes) {
  if (!root["layers"].present())
    throw InputError("the study has no `layers`", root.place(),
                     "write layers: and below it one line a layer: - {material: GaAs, thickness: 10 nm}");
  Stack stack;
  const Node& materials = root["materials"];
  if (materials.present()) {
    if (!materials.is_map())
      throw InputError("`materials` is not a map", materials.place(),
                       "write GaAs: {electron_mass: 0.067} below it");
    stack.table = std::make_shared<MaterialTable>(table.with_overrides(materials));
    stack.scale_table = std::make_shared<MaterialTable>(table.with_overrides(only_variants(materials)));
  } else {
    stack.table = std::make_shared<MaterialTable>(table);
  }
  Environment& environment = stack.environment;
  environment.temperature = stack_declarations().quantity(root, "temperature");
  if (environment.temperature < 0)
    throw InputError("`temperature` is below absolute zero", root["temperature"].place(),
                     "write a temperature in kelvin, such as 77 K");

  AlloyReader alloys(*stack.table);
  WrittenLayers layers = read_layers(root["layers"], alloys);
  const auto structure = common_structure(layers, *stack.table);
  environment.growth_plane = read_plane(root, structure);
  read_substrate(root, structure, *stack.table, alloys, environment);
  read_strain(root, environment, notes);
  read_offset_ratio(root, environment);

  std::map<std::string, double> monolayers;
  const auto monolayer = [&](const Alloy& alloy) {
    const auto [at, fresh] = monolayers.emplace(alloy.text, 0.0);
    if (fresh) at->second = stack.table->monolayer(alloy, environment);
    return at->second;
  };
  for (WrittenLayer& written : layers.written) {
    written.layer.monolayer = monolayer(written.layer.material);
    if (written.layer.grading)
      written.layer.monolayer = 0.5 * (written.layer.monolayer + monolayer(written.layer.grading->to));
    read_measures(written);
  }
  std::vector<int> copies(layers.written.size(), 0);
  stack.layers.reserve(layers.order.size());
  for (const std::size_t index : layers.order) {
    const WrittenLayer& written = layers.written[index];
    stack.layers.push_back(written.layer);
    if (written.repeated) stack.layers.back().copy = ++copies[index];
  }

  stack.interdiffusion = stack_declarations().quantity(root["model"], "model.interdiffusion");
  if (stack.interdiffusion < 0 || stack.interdiffusion > stack.length())
    throw InputError(fmt::format("`interdiffusion` is {}",
                                 stack.interdiffusion < 0 ? "negative" : "longer than the whole stack"),
                     root["model"]["interdiffusion"].place(),
                     "write the rms width of the smearing, such as 0.4 nm");
  const Node& ends = root["model"]["ends"];
  stack.periodic = ends.is_scalar() && ends.text() == "periodic";

  probe(stack, layers);
  resolve_stack(stack, false);
  std::vector<std::string> warned;
  for_each_alloy(layers, [&](const Alloy& alloy, const Place&) {
    if (std::find(warned.begin(), warned.end(), alloy.text) != warned.end()) return;
    if (warned.size() >= 1000) return;
    warned.push_back(alloy.text);
    stack.table->warn(alloy, environment, notes);
  });
  say_mixed_scales(stack, notes);
  say_strain(stack, notes);
  return stack;
}

}  // namespace wellwright
