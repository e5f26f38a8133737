// SPDX-License-Identifier: Apache-2.0
// Labels, faces and addresses of layers.
#include "wellwright/stack.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace wellwright {

std::string Layer::label(int number) const {
  if (!name.empty()) return copy > 0 ? fmt::format("{}[{}]", name, copy) : name;
  if (grading) return fmt::format("{} ({} to {})", number, material.text, grading->to.text);
  return fmt::format("{} ({})", number, material.text);
}

double Stack::length() const {
  double sum = 0;
  for (const Layer& layer : layers) sum += layer.thickness;
  return sum;
}

std::vector<double> Stack::faces() const {
  std::vector<double> z(layers.size() + 1, 0.0);
  for (std::size_t i = 0; i < layers.size(); ++i) z[i + 1] = z[i] + layers[i].thickness;
  return z;
}

bool Stack::uniform() const {
  return interdiffusion <= 0 && std::none_of(layers.begin(), layers.end(),
                                             [](const Layer& layer) { return layer.grading.has_value(); });
}

std::vector<int> find_layers(const Stack& stack, std::string_view address, const Place& place) {
  const int count = static_cast<int>(stack.layers.size());
  double number = 0;
  if (read_number(address, number)) {
    if (number >= 1 && number <= count && number == static_cast<int>(number))
      return {static_cast<int>(number) - 1};
    throw InputError(
        fmt::format("there is no layer {}", address), place,
        fmt::format("layers count from 1 at the bottom to {} at the top, repeats unrolled", count));
  }
  std::string_view name = address;
  double copy = 0;
  const auto bracket = address.find('[');
  if (bracket != std::string_view::npos && address.back() == ']' &&
      read_number(address.substr(bracket + 1, address.size() - bracket - 2), copy))
    name = address.substr(0, bracket);
  std::vector<int> found;
  int copies = 0;
  for (int i = 0; i < count; ++i) {
    const Layer& layer = stack.layers[static_cast<std::size_t>(i)];
    if (layer.name.empty() || layer.name != name) continue;
    ++copies;
    if (bracket == std::string_view::npos || layer.copy == copy) found.push_back(i);
  }
  if (!found.empty()) return found;
  if (copies > 0)
    throw InputError(fmt::format("there is no layer `{}`", address), place,
                     stack.layers.empty() || copies == 1
                         ? fmt::format("`{}` stands once, outside a repeat", name)
                         : fmt::format("`{}` has the copies 1 to {}", name, copies));
  std::vector<std::string> names;
  for (const Layer& layer : stack.layers)
    if (!layer.name.empty() && std::find(names.begin(), names.end(), layer.name) == names.end())
      names.push_back(layer.name);
  std::string hint;
  const auto near = nearest(name, names);
  if (!near.empty())
    hint = did_you_mean(near);
  else if (names.empty())
    hint = fmt::format("no layer has a name; use a number from 1 to {}", count);
  else
    hint = fmt::format(
        "named layers: `{}`; or use a number from 1 to {}",
        fmt::join(names.begin(), names.begin() + std::min<std::ptrdiff_t>(8, std::ssize(names)), "`, `"),
        count);
  throw InputError(fmt::format("there is no layer named `{}`", address), place, hint);
}

}  // namespace wellwright
