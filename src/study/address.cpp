// SPDX-License-Identifier: Apache-2.0
// Values of a study by address, read and replaced in memory.
#include <fmt/format.h>

#include <cmath>

#include "study/read.hpp"

namespace wellwright {
namespace {

enum class What {
  field,
  bias,
  temperature,
  interdiffusion,
  offset_ratio,
  thickness,
  composition,
  from,
  to,
  donors,
  acceptors
};

struct Address {
  What what = What::field;
  std::vector<int> layers;
};

const std::vector<std::string> plain = {"field", "bias", "temperature", "model.interdiffusion",
                                        "model.offset_ratio"};
const std::vector<std::string> of_layer = {"thickness",      "composition", "from.composition",
                                           "to.composition", "donors",      "acceptors"};

Address parse(const Study& study, std::string_view text, const Place& place) {
  for (std::size_t i = 0; i < plain.size(); ++i)
    if (text == plain[i]) return {static_cast<What>(i), {}};
  if (!text.starts_with("layers.")) {
    const auto near = nearest(text, plain);
    throw InputError(fmt::format("`{}` is no address of a value", text), place,
                     near.empty() ? "write field, or layers.2.thickness" : did_you_mean(near));
  }
  const std::string_view rest = text.substr(7);
  const auto dot = rest.find('.');
  if (dot == std::string_view::npos)
    throw InputError(fmt::format("`{}` names a layer but no value of it", text), place,
                     fmt::format("write {}.thickness or {}.composition", text, text));
  Address address;
  address.layers = find_layers(study.stack, rest.substr(0, dot), place);
  const std::string_view key = rest.substr(dot + 1);
  std::size_t i = 0;
  while (i < of_layer.size() && of_layer[i] != key) ++i;
  if (i == of_layer.size()) {
    const auto near = nearest(key, of_layer);
    throw InputError(fmt::format("a layer has no value `{}` that can be varied", key), place,
                     fmt::format("one of: {}", fmt::join(near.empty() ? of_layer : near, ", ")));
  }
  address.what = static_cast<What>(plain.size() + i);
  const int first = address.layers.front();
  const Layer& layer = study.stack.layers[static_cast<std::size_t>(first)];
  const std::string label = layer.label(first + 1);
  const bool graded = layer.grading.has_value();
  const bool end = address.what == What::from || address.what == What::to;
  if (address.what == What::composition && graded)
    throw InputError(fmt::format("layer {} is graded: its composition has two ends", label), place,
                     "write from.composition or to.composition");
  if (end && !graded)
    throw InputError(fmt::format("layer {} is not graded", label), place, "write composition");
  if (end || address.what == What::composition) {
    const Alloy& alloy = address.what == What::to ? layer.grading->to : layer.material;
    if (std::isnan(alloy.composition()))
      throw InputError(fmt::format("{} in layer {} has no composition", alloy.text, label), place,
                       "only alloys have one");
  }
  return address;
}

const Alloy& alloy_of(const Layer& layer, What what) {
  return what == What::to ? layer.grading->to : layer.material;
}

void set_thickness(Layer& layer, double thickness) {
  const double factor = thickness / layer.thickness;
  if (layer.donors_by_volume) layer.donors *= factor;
  if (layer.acceptors_by_volume) layer.acceptors *= factor;
  layer.thickness = thickness;
}

}  // namespace

Dimension dimension_of_address(const Study& study, std::string_view address, const Place& place) {
  switch (parse(study, address, place).what) {
    case What::field:
      return Dimension::electric_field;
    case What::bias:
      return Dimension::voltage;
    case What::temperature:
      return Dimension::temperature;
    case What::interdiffusion:
    case What::thickness:
      return Dimension::length;
    case What::donors:
    case What::acceptors:
      return Dimension::sheet_density;
    default:
      return Dimension::number;
  }
}

double value_at(const Study& study, std::string_view text, const Place& place) {
  const Address address = parse(study, text, place);
  const Stack& stack = study.stack;
  const auto not_given = [&](const char* key) {
    return InputError(fmt::format("the study gives no `{}`", key), place, "give it in the study first");
  };
  switch (address.what) {
    case What::field:
      return study.field;
    case What::bias:
      if (!study.bias) throw not_given("bias");
      return *study.bias;
    case What::temperature:
      return stack.environment.temperature;
    case What::interdiffusion:
      return stack.interdiffusion;
    case What::offset_ratio:
      if (!stack.environment.offset_ratio) throw not_given("offset_ratio");
      return *stack.environment.offset_ratio;
    default:
      break;
  }
  const Layer& layer = stack.layers[static_cast<std::size_t>(address.layers.front())];
  switch (address.what) {
    case What::thickness:
      return layer.thickness;
    case What::donors:
      return layer.donors;
    case What::acceptors:
      return layer.acceptors;
    default:
      return alloy_of(layer, address.what).composition();
  }
}

Study with_value(const Study& study, std::string_view text, double value, const Place& place) {
  const Address address = parse(study, text, place);
  const auto refuse = [&](const char* what) {
    throw InputError(fmt::format("`{}` cannot be {:g}", text, value), place, what);
  };
  if (!std::isfinite(value)) refuse("a value is finite");
  Study changed = study;
  Stack& stack = changed.stack;
  switch (address.what) {
    case What::field:
      changed.field = value;
      changed.bias.reset();
      return changed;
    case What::bias:
      changed.bias = value;
      changed.field = -value / stack.length();
      return changed;
    case What::temperature:
      if (value < 0) refuse("a temperature is not below absolute zero");
      stack.environment.temperature = value;
      break;
    case What::interdiffusion:
      if (value < 0 || value > stack.length())
        refuse("the smearing lies between 0 and the length of the stack");
      stack.interdiffusion = value;
      return changed;
    case What::offset_ratio:
      if (!(value > 0 && value < 1)) refuse("the conduction band's share lies between 0 and 1");
      stack.environment.offset_ratio = value;
      break;
    default:
      break;
  }
  for (const int index : address.layers) {
    Layer& layer = stack.layers[static_cast<std::size_t>(index)];
    switch (address.what) {
      case What::thickness:
        if (!(value >= smallest_thickness && value <= largest_thickness))
          refuse("a layer has a thickness above zero");
        set_thickness(layer, value);
        break;
      case What::composition:
      case What::from:
      case What::to: {
        if (!(value >= 0 && value <= 1)) refuse("a fraction lies between 0 and 1");
        Alloy& alloy = address.what == What::to ? layer.grading->to : layer.material;
        alloy = alloy.with_composition(value);
        break;
      }
      case What::donors:
      case What::acceptors:
        if (value < 0) refuse("a density is not negative");
        (address.what == What::donors ? layer.donors : layer.acceptors) = value;
        break;
      default:
        break;
    }
  }
  resolve_stack(stack, true);
  if (changed.bias) changed.field = -*changed.bias / stack.length();
  return changed;
}

}  // namespace wellwright
