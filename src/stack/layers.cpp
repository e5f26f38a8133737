// SPDX-License-Identifier: Apache-2.0
// The list of layers: names, alloys, gradings, repeats.
#include "stack/layers.hpp"

#include <fmt/format.h>

#include <cmath>

namespace wellwright {
namespace {

constexpr double largest_power = 20;

// Layers of a list after unrolling, as a floating number so that products of repeats cannot overflow.
double count_of(const Node& list) {
  double sum = 0;
  for (const Node& item : list.items()) {
    if (!item["repeat"].present()) {
      ++sum;
      continue;
    }
    const double copies = item["repeat"].number("repeat");
    sum += copies * count_of(item["layers"]);
    if (!(sum <= largest_layer_count))
      throw InputError(fmt::format("this repeat makes {:.0f} layers", sum), item["repeat"].place(),
                       fmt::format("a stack holds at most {} layers, repeats unrolled", largest_layer_count));
  }
  if (!(sum <= largest_layer_count))
    throw InputError(fmt::format("this list makes {:.0f} layers", sum), list.place(),
                     fmt::format("a stack holds at most {} layers, repeats unrolled", largest_layer_count));
  return sum;
}

void check_list(const Node& list) {
  if (!list.is_sequence())
    throw InputError("`layers` is not a list", list.place(),
                     "write one line a layer: - {material: GaAs, thickness: 10 nm}");
  if (list.items().empty())
    throw InputError("`layers` is empty", list.place(),
                     "write one line a layer: - {material: GaAs, thickness: 10 nm}");
}

// What count_of relies on, at every depth: lists where lists belong, whole repeats of at least one.
void check_shape(const Node& list) {
  check_list(list);
  for (const Node& item : list.items()) {
    if (!item.is_map())
      throw InputError("a layer is not a map", item.place(),
                       "write it as {material: GaAs, thickness: 10 nm}");
    stack_declarations().check(item, "layers[]");
    const Node& repeat = item["repeat"];
    if (!repeat.present() && !item["layers"].present()) continue;
    if (!item["layers"].present())
      throw InputError("`repeat` has no `layers` to repeat", item.key_place("repeat"),
                       "write repeat: 3 and below it layers: [...]");
    if (!repeat.present())
      throw InputError("`layers` inside `layers` stands without `repeat`", item.key_place("layers"),
                       "write repeat: 3 beside it");
    for (const char* key : {"material", "graded", "thickness", "name", "donors", "acceptors"})
      if (item[key].present())
        throw InputError(fmt::format("`{}` stands beside `repeat`", key), item.key_place(key),
                         item.key_place("repeat"), "it belongs to one of the repeated layers");
    const double copies = repeat.number("repeat");
    if (!(copies >= 1) || copies != std::floor(copies))
      throw InputError(fmt::format("`repeat` is {}, not a whole number of copies", repeat.text()),
                       repeat.place(), "write a whole number from 1");
    check_shape(item["layers"]);
  }
}

Grading read_shape(const Node& graded) {
  Grading grading;
  const Node& shape = graded["shape"];
  if (shape.is_map()) {
    stack_declarations().check(shape, "layers[].graded.shape");
    const Node& power = shape["power"];
    if (!power.present()) throw InputError("`shape` has no `power`", shape.place(), "write {power: 1.5}");
    grading.power = power.number("power");
    if (!(grading.power > 0) || grading.power > largest_power)
      throw InputError(fmt::format("`power` is {}", power.text()), power.place(),
                       fmt::format("a power lies above 0 and is at most {}", largest_power));
    return grading;
  }
  if (shape.is_scalar() && shape.text() == "power")
    throw InputError("`shape: power` lacks its power", shape.place(), "write shape: {power: 1.5}");
  grading.power = stack_declarations().word(graded, "layers[].graded.shape") == "parabolic" ? 2 : 1;
  return grading;
}

std::string read_name(const Node& value) {
  std::string name = value.string("name");
  double number = 0;
  if (name.empty()) throw InputError("`name` is empty", value.place(), "leave the key out, or give a name");
  if (read_number(name, number))
    throw InputError(fmt::format("the name `{}` is a plain number", name), value.place(),
                     "numbers address layers by their place; give a name with a letter");
  for (const char bad : {'.', '[', ']'})
    if (name.find(bad) != std::string::npos)
      throw InputError(fmt::format("the name `{}` holds `{}`", name, bad), value.place(),
                       "a name holds no dot and no bracket, which addresses are built with");
  return name;
}

class Reader {
 public:
  explicit Reader(AlloyReader& alloys) : alloys_(alloys) {}

  std::vector<std::size_t> read(const Node& list, bool repeated) {
    std::vector<std::size_t> order;
    for (const Node& item : list.items()) {
      if (!item["repeat"].present()) {
        order.push_back(layers_.size());
        layers_.push_back(read_layer(item, repeated));
        continue;
      }
      const auto body = read(item["layers"], true);
      const auto copies = static_cast<std::size_t>(item["repeat"].number("repeat"));
      order.reserve(order.size() + copies * body.size());
      for (std::size_t copy = 0; copy < copies; ++copy) order.insert(order.end(), body.begin(), body.end());
    }
    return order;
  }

  std::vector<WrittenLayer> take() { return std::move(layers_); }

 private:
  WrittenLayer read_layer(const Node& item, bool repeated) {
    WrittenLayer written;
    written.node = &item;
    written.repeated = repeated;
    Layer& layer = written.layer;
    layer.place = item.place();
    const Node &material = item["material"], &graded = item["graded"];
    if (material.present() && graded.present())
      throw InputError("a layer has both `material` and `graded`", item.key_place("graded"),
                       item.key_place("material"), "a graded layer takes its alloys from `from` and `to`");
    if (!material.present() && !graded.present())
      throw InputError("a layer has no `material`", item.place(),
                       "write {material: GaAs, thickness: 10 nm}, or graded: {from: ..., to: ...}");
    if (!item["thickness"].present())
      throw InputError("a layer has no `thickness`", item.place(),
                       "write thickness: 10 nm, or thickness: 20 ML");
    if (material.present()) {
      layer.material = alloys_.read(material, "material");
    } else {
      if (!graded.is_map())
        throw InputError("`graded` is not a map", graded.place(),
                         "write graded: {from: GaAs, to: Al0.2Ga0.8As}");
      stack_declarations().check(graded, "layers[].graded");
      for (const char* key : {"from", "to"})
        if (!graded[key].present())
          throw InputError(fmt::format("`graded` has no `{}`", key), graded.place(),
                           "write graded: {from: GaAs, to: Al0.2Ga0.8As}");
      layer.material = alloys_.read(graded["from"], "from");
      layer.grading = read_shape(graded);
      layer.grading->to = alloys_.read(graded["to"], "to");
    }
    const Node& name = item["name"];
    if (name.present()) {
      layer.name = read_name(name);
      const auto [first, fresh] = names_.emplace(layer.name, name.place());
      if (!fresh)
        throw InputError(fmt::format("the name `{}` is given twice", layer.name), name.place(), first->second,
                         "names are unique; copies made by a repeat share theirs");
    }
    return written;
  }

  AlloyReader& alloys_;
  std::vector<WrittenLayer> layers_;
  std::map<std::string, Place> names_;
};

double read_density(const Node& item, const char* key, double thickness, bool& by_volume) {
  if (!item[key].present()) return 0;
  const auto& declared = stack_declarations().at(std::string("layers[].") + key);
  const Quantity quantity = item[key].quantity(key, declared.dimensions);
  if (quantity.value < 0)
    throw InputError(fmt::format("`{}` is negative", key), item[key].place(),
                     "a density is not negative; the other kind of dopant has its own key");
  by_volume = quantity.dimension == Dimension::volume_density;
  return by_volume ? quantity.value * thickness : quantity.value;
}

}  // namespace

const Alloy& AlloyReader::read(const Node& value, std::string_view key) {
  const auto found = value.is_scalar() ? known_.find(value.text()) : known_.end();
  if (found != known_.end()) return found->second;
  const std::string text = value.string(key);
  return known_.insert_or_assign(text, table_.alloy(text, value.place())).first->second;
}

WrittenLayers read_layers(const Node& list, AlloyReader& alloys) {
  check_shape(list);
  count_of(list);
  Reader reader(alloys);
  WrittenLayers layers;
  layers.order = reader.read(list, false);
  layers.written = reader.take();
  return layers;
}

void read_measures(WrittenLayer& written) {
  Layer& layer = written.layer;
  const Node& item = *written.node;
  const Node& thickness = item["thickness"];
  const Quantity quantity =
      thickness.quantity("thickness", stack_declarations().at("layers[].thickness").dimensions);
  layer.thickness = quantity.value;
  if (!(quantity.value > 0))
    throw InputError(fmt::format("`thickness` is {}", quantity.value < 0 ? "negative" : "zero"),
                     thickness.place(), "a layer is thicker than nothing; leave it out where there is none");
  if (quantity.dimension == Dimension::monolayers) {
    if (!std::isfinite(layer.monolayer))
      throw InputError(fmt::format("`thickness` in ML needs the lattice constant of {}", layer.material.text),
                       thickness.place(),
                       "give the thickness in nm, or `lattice_constant` under `materials`");
    layer.thickness = quantity.value * layer.monolayer;
  }
  if (layer.thickness < smallest_thickness)
    throw InputError(fmt::format("`thickness` is {:g} nm", layer.thickness), thickness.place(),
                     fmt::format("a layer is at least {:g} nm thick", smallest_thickness));
  if (layer.thickness > largest_thickness)
    throw InputError(fmt::format("`thickness` is {:g} mm", layer.thickness * 1e-6), thickness.place(),
                     fmt::format("a layer is at most {:g} mm thick", largest_thickness * 1e-6));
  layer.donors = read_density(item, "donors", layer.thickness, layer.donors_by_volume);
  layer.acceptors = read_density(item, "acceptors", layer.thickness, layer.acceptors_by_volume);
}

}  // namespace wellwright
