// SPDX-License-Identifier: Apache-2.0
// The dynamics block: exactly one start, and how long it is followed.
#include <fmt/format.h>

#include <algorithm>

#include "study/read.hpp"

namespace wellwright {
namespace {

constexpr const char* starts[] = {"packet", "mix", "localized", "field_step", "photoexcited"};
constexpr const char* start_hint = "give one of packet, mix, localized, field_step, photoexcited";

// The value of a key that a start cannot do without.
const Node& needed(const Node& map, const char* start, const char* key, const char* hint) {
  if (!map[key].present()) throw InputError(fmt::format("`{}` has no `{}`", start, key), map.place(), hint);
  return map[key];
}

void check_map(const Node& node, const std::string& path, const char* hint) {
  if (!node.is_map()) throw InputError(fmt::format("`{}` is not a map", last_part(path)), node.place(), hint);
  study_declarations().check(node, path);
}

int read_level(const Node& map, const std::string& path, const LevelRequest& levels) {
  const int level = study_declarations().whole_number(map, path, 1, largest_level_count);
  const Node& value = map[last_part(path)];
  check_level(value.present() ? value : map, level, levels);
  return level;
}

PacketStart read_packet(const Node& node, const Study& study) {
  const char* hint = "write packet: {centre: 27 nm, spread: 4 nm}";
  check_map(node, "dynamics.start.packet", hint);
  PacketStart packet;
  const Node& centre = needed(node, "packet", "centre", hint);
  packet.centre = centre.quantity("centre", Dimension::length);
  const double length = study.stack.length();
  if (packet.centre < 0 || packet.centre > length)
    throw InputError(fmt::format("the packet's `centre` lies outside the stack"), centre.place(),
                     fmt::format("the stack runs from 0 to {:.4g} nm", length));
  const Node& spread = needed(node, "packet", "spread", hint);
  packet.spread = spread.quantity("spread", Dimension::length);
  if (!(packet.spread > 0))
    throw InputError("the packet's `spread` is not above zero", spread.place(),
                     "write the rms width of its probability density, such as 4 nm");
  packet.wavenumber = study_declarations().quantity(node, "dynamics.start.packet.wavenumber");
  return packet;
}

MixStart read_mix(const Node& node, const LevelRequest& levels) {
  const auto& keys = study_declarations();
  const char* hint = "write mix: [{level: 1, amplitude: 1}, {level: 2, amplitude: 1}]";
  if (!node.is_sequence() || node.items().empty())
    throw InputError("`mix` is not a list of levels", node.place(), hint);
  MixStart mix;
  bool some = false;
  for (const Node& item : node.items()) {
    check_map(item, "dynamics.start.mix[]", hint);
    needed(item, "mix", "level", hint);
    MixStart::Part part;
    part.level = read_level(item, "dynamics.start.mix[].level", levels);
    for (std::size_t i = 0; i < mix.parts.size(); ++i)
      if (mix.parts[i].level == part.level)
        throw InputError(fmt::format("`mix` lists level {} twice", part.level), item["level"].place(),
                         node.items()[i]["level"].place(), "list each level once");
    if (item["amplitude"].present()) part.amplitude = item["amplitude"].number("amplitude");
    part.phase = keys.quantity(item, "dynamics.start.mix[].phase");
    some = some || part.amplitude != 0;
    mix.parts.push_back(part);
  }
  if (!some)
    throw InputError("every amplitude of `mix` is zero", node.place(),
                     "give at least one level an amplitude");
  return mix;
}

LocalizedStart read_localized(const Node& node, const Study& study) {
  const char* hint = "write localized: {layer: wide well, levels: 2}";
  check_map(node, "dynamics.start.localized", hint);
  const Node& layer = needed(node, "localized", "layer", hint);
  LocalizedStart localized;
  localized.layers = find_layers(study.stack, layer.string("layer"), layer.place());
  localized.levels = read_level(node, "dynamics.start.localized.levels", study.model.levels);
  return localized;
}

FieldStepStart read_field_step(const Node& node, const LevelRequest& levels) {
  const char* hint = "write field_step: {field: -5 kV/cm, level: 1}";
  check_map(node, "dynamics.start.field_step", hint);
  FieldStepStart step;
  step.field = needed(node, "field_step", "field", hint).quantity("field", Dimension::electric_field);
  step.level = read_level(node, "dynamics.start.field_step.level", levels);
  return step;
}

constexpr Dimension energies[] = {Dimension::energy, Dimension::length, Dimension::frequency,
                                  Dimension::inverse_length};

double photon_energy_of(const Node& value, const char* key) {
  const Quantity q = value.quantity(key, std::vector<Dimension>(std::begin(energies), std::end(energies)));
  if (!(q.value > 0))
    throw InputError(fmt::format("`{}` is not above zero", key), value.place(),
                     fmt::format("write {}: 1.56 eV", key));
  switch (q.dimension) {
    case Dimension::length:
      return energy_of_wavelength(q.value);
    case Dimension::frequency:
      return constants::planck * q.value;
    case Dimension::inverse_length:
      return energy_of_wavelength(1 / q.value);
    default:
      return q.value;
  }
}

PhotoexcitedStart read_photoexcited(const Node& node, const Node& key, const Study& study,
                                    const Node& model) {
  const auto& keys = study_declarations();
  check_map(node, "dynamics.start.photoexcited",
            "write photoexcited: {hole: heavy hole, level: 1, duration: 100 fs}");
  const auto& carriers = study.model.carriers;
  if (std::find(carriers.begin(), carriers.end(), Carrier::electron) == carriers.end())
    throw InputError("`photoexcited` needs electrons among the carriers", key.key_place("photoexcited"),
                     model["carrier"].place(), "write carrier: electron, or add it to the list");
  PhotoexcitedStart start;
  start.hole = keys.word(node, "dynamics.start.photoexcited.hole") == "heavy hole" ? Carrier::heavy_hole
                                                                                   : Carrier::light_hole;
  start.level = read_level(node, "dynamics.start.photoexcited.level", study.model.levels);
  const Node& energy = node["photon_energy"];
  if (energy.present()) {
    start.photon_energy = photon_energy_of(energy, "photon_energy");
  }
  start.duration = keys.quantity(node, "dynamics.start.photoexcited.duration");
  if (!(start.duration > 0))
    throw InputError("the pulse's `duration` is not above zero", node["duration"].place(),
                     "write its full width at half maximum, such as 100 fs");
  return start;
}

}  // namespace

DynamicsRequest read_dynamics(const Node& root, const Study& study) {
  const auto& keys = study_declarations();
  const Node& node = root["dynamics"];
  check_map(node, "dynamics", "write dynamics: and below it start: {packet: {centre: 27 nm, spread: 4 nm}}");
  const Node& start = node["start"];
  if (!start.present()) throw InputError("`dynamics` has no `start`", node.place(), start_hint);
  check_map(start, "dynamics.start", start_hint);
  const char* chosen = nullptr;
  for (const char* name : starts) {
    if (!start[name].present()) continue;
    if (chosen)
      throw InputError(fmt::format("`start` has both `{}` and `{}`", chosen, name), start.key_place(name),
                       start.key_place(chosen), "keep one of them; a study follows one start");
    chosen = name;
  }
  if (!chosen) throw InputError("`start` is empty", start.place(), start_hint);
  DynamicsRequest request;
  const std::string_view name = chosen;
  const Node& of = start[name];
  request.place = start.key_place(name);
  if (name == "packet")
    request.start = read_packet(of, study);
  else if (name == "mix")
    request.start = read_mix(of, study.model.levels);
  else if (name == "localized")
    request.start = read_localized(of, study);
  else if (name == "field_step")
    request.start = read_field_step(of, study.model.levels);
  else
    request.start = read_photoexcited(of, start, study, root["model"]);
  request.duration = keys.quantity(node, "dynamics.duration");
  if (!(request.duration > 0))
    throw InputError("`duration` is not above zero", node["duration"].place(), "write duration: 10 ps");
  request.samples = keys.whole_number(node, "dynamics.samples", 2, largest_sample_count);
  request.density_map = keys.on_off(node, "dynamics.density_map");
  keys.word(node, "dynamics.method");
  return request;
}

}  // namespace wellwright
