// SPDX-License-Identifier: Apache-2.0
// The model block: carriers, bands, ends, the levels wanted.
#include <fmt/format.h>

#include <algorithm>

#include "study/read.hpp"

namespace wellwright {
namespace {

Carrier carrier_of(const std::string& word) {
  if (word == "electron") return Carrier::electron;
  return word == "heavy hole" ? Carrier::heavy_hole : Carrier::light_hole;
}

std::vector<Carrier> read_carriers(const Node& model) {
  const auto& keys = study_declarations();
  const Node& value = model["carrier"];
  if (!value.is_sequence()) return {carrier_of(keys.word(model, "model.carrier"))};
  std::vector<Carrier> carriers;
  for (const Node& item : value.items()) {
    const Carrier carrier = carrier_of(keys.word_of(item, "model.carrier"));
    const auto known = std::find(carriers.begin(), carriers.end(), carrier);
    if (known != carriers.end())
      throw InputError(fmt::format("`carrier` lists {} twice", name_of(carrier)), item.place(),
                       value.items()[static_cast<std::size_t>(known - carriers.begin())].place(),
                       "list each carrier once");
    carriers.push_back(carrier);
  }
  if (carriers.empty())
    throw InputError("`carrier` is an empty list", value.place(),
                     "name one: electron, heavy hole or light hole");
  return carriers;
}

std::vector<int> read_places(const Node& value, const Stack& stack) {
  std::vector<int> layers;
  const auto take = [&](const Node& item) {
    for (const int layer : find_layers(stack, item.string("in"), item.place()))
      if (std::find(layers.begin(), layers.end(), layer) == layers.end()) layers.push_back(layer);
  };
  if (value.is_sequence())
    for (const Node& item : value.items()) take(item);
  else
    take(value);
  if (layers.empty()) throw InputError("`in` names no layer", value.place(), "write in: [wide well]");
  std::sort(layers.begin(), layers.end());
  return layers;
}

LevelRequest read_levels(const Node& model, const Stack& stack) {
  const auto& keys = study_declarations();
  const Node& value = model["levels"];
  LevelRequest levels;
  if (!value.is_map()) {
    if (value.is_sequence())
      throw InputError(
          "`levels` is a list", value.place(),
          "write a count, {below: 0.3 eV}, {above: 0.1 eV, below: 0.3 eV} or {in: [wide well], count: 4}");
    levels.count = keys.whole_number(model, "model.levels", 1, largest_level_count);
    return levels;
  }
  keys.check(value, "model.levels");
  const Node &above = value["above"], &below = value["below"], &in = value["in"], &count = value["count"];
  const auto contradict = [&](const char* one, const char* other) {
    throw InputError(fmt::format("`levels` has both `{}` and `{}`", one, other), value.key_place(one),
                     value.key_place(other),
                     "a window of energies and a count are two ways of asking; keep one");
  };
  if (above.present() || below.present()) {
    for (const char* key : {"in", "count"})
      if (value[key].present()) contradict(key, below.present() ? "below" : "above");
    if (!below.present())
      throw InputError("`levels` has `above` without `below`", value.key_place("above"),
                       "write {above: 0.1 eV, below: 0.3 eV}: the window needs an upper edge");
    levels.count.reset();
    levels.below = below.quantity("below", Dimension::energy);
    if (above.present()) {
      levels.above = above.quantity("above", Dimension::energy);
      if (*levels.below <= *levels.above)
        throw InputError("`below` is not higher than `above`", below.place(), above.place(),
                         "the levels wanted lie above the one and below the other");
    }
    return levels;
  }
  if (value.entries().empty())
    throw InputError("`levels` is empty", value.place(), "write a count, or {below: 0.3 eV}");
  levels.count = keys.whole_number(value, "model.levels.count", 1, largest_level_count);
  if (in.present()) levels.in_layers = read_places(in, stack);
  (void)count;
  return levels;
}

std::vector<std::pair<int, int>> read_transitions(const Node& value, const LevelRequest& levels) {
  const char* hint = "write pairs of levels: [[1, 2], [1, 3]]";
  std::vector<std::pair<int, int>> pairs;
  if (!value.present()) return pairs;
  if (!value.is_sequence()) throw InputError("`transitions` is not a list of pairs", value.place(), hint);
  for (const Node& item : value.items()) {
    if (!item.is_sequence() || item.items().size() != 2)
      throw InputError("a transition is not a pair of levels", item.place(), hint);
    int level[2];
    for (std::size_t i : {0u, 1u}) {
      const Node& end = item.items()[i];
      level[i] = end.whole_number("transitions", 1, largest_level_count);
      check_level(end, level[i], levels);
    }
    if (level[0] == level[1])
      throw InputError(fmt::format("a transition from level {} to itself", level[0]), item.place(),
                       "a transition joins two different levels");
    const auto pair = std::pair(level[0], level[1]);
    if (std::find(pairs.begin(), pairs.end(), pair) == pairs.end()) pairs.push_back(pair);
  }
  return pairs;
}

FaceCondition read_face(const Node& faces, const char* key) {
  const auto& keys = study_declarations();
  const std::string path = std::string("model.faces.") + key;
  const Node& value = faces[key];
  if (value.present() && !value.is_map() && !(value.is_scalar() && value.text() == "flat"))
    throw InputError(fmt::format("the {} face is neither flat nor pinned", key), value.place(),
                     "write flat, or {pinned: 0.7 eV}");
  if (!value.is_map()) return {};
  keys.check(value, path);
  if (!value["pinned"].present())
    throw InputError(fmt::format("`{}` says nothing", key), value.place(), "write flat, or {pinned: 0.7 eV}");
  return {value["pinned"].quantity("pinned", Dimension::energy)};
}

void read_faces(const Node& faces, Model& model) {
  if (!faces.present()) return;
  if (!faces.is_map())
    throw InputError("`faces` is not a map", faces.place(),
                     "write faces: {bottom: flat, top: {pinned: 0.7 eV}}");
  study_declarations().check(faces, "model.faces");
  model.bottom = read_face(faces, "bottom");
  model.top = read_face(faces, "top");
  if (model.ends == Ends::periodic && (model.bottom.pinned || model.top.pinned))
    throw InputError("a face is pinned, but the ends are periodic", faces.place(),
                     "a periodic stack has no faces; write ends: hard");
}

}  // namespace

std::string_view name_of(Carrier carrier) {
  switch (carrier) {
    case Carrier::electron:
      return "electron";
    case Carrier::heavy_hole:
      return "heavy hole";
    default:
      return "light hole";
  }
}

void check_level(const Node& value, int level, const LevelRequest& levels) {
  if (!levels.count || level <= *levels.count) return;
  throw InputError(fmt::format("level {} is not among the {} levels wanted", level, *levels.count),
                   value.place(), fmt::format("ask for more: model: {{levels: {}}}", level));
}

Model read_model(const Node& root, const Stack& stack) {
  const auto& keys = study_declarations();
  const Node& node = root["model"];
  Model model;
  model.carriers = read_carriers(node);
  const std::string bands = keys.word(node, "model.bands");
  model.bands = bands == "one" ? Bands::one : bands == "two" ? Bands::two : Bands::three;
  model.ends = keys.word(node, "model.ends") == "periodic" ? Ends::periodic : Ends::hard;
  model.levels = read_levels(node, stack);
  model.transitions = read_transitions(node["transitions"], model.levels);
  model.bloch_phases = keys.whole_number(node, "model.bloch_phases", 2, largest_phase_count);
  if (node["bloch_phases"].present() && model.ends == Ends::hard)
    throw InputError("`bloch_phases` stands without periodic ends", node.key_place("bloch_phases"),
                     node["ends"].present() ? node["ends"].place() : Place{},
                     "write ends: periodic beside it");
  model.filling =
      keys.word(node, "model.filling") == "per module" ? Filling::per_module : Filling::equilibrium;
  model.self_consistent = keys.word(node, "model.charge") == "self-consistent";
  model.exchange_correlation = keys.word(node, "model.exchange_correlation") == "hedin-lundqvist";
  for (const char* key : {"faces", "exchange_correlation"})
    if (node[key].present() && !model.self_consistent &&
        !(node[key].is_scalar() && node[key].text() == "none"))
      throw InputError(fmt::format("`{}` stands without the stack's own charge", key), node.key_place(key),
                       "write charge: self-consistent beside it");
  read_faces(node["faces"], model);
  model.polarization = keys.on_off(node, "model.polarization");
  model.accuracy = keys.quantity(node, "model.accuracy");
  if (!(model.accuracy > 0))
    throw InputError("`accuracy` is not above zero", node["accuracy"].place(), "write accuracy: 1 ueV");
  return model;
}

}  // namespace wellwright
