// SPDX-License-Identifier: Apache-2.0
// A value replaced in the tree of a study, by its path.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "input/lines.hpp"
#include "wellwright/input.hpp"

namespace wellwright {
namespace {

Place place_of_setting(const std::string& path, const std::string& text) {
  Place place;
  place.file = "--set";
  place.line = 1;
  place.column = 1;
  place.line_text = path + "=" + text;
  place.length = std::max(1, displayed_width(path));
  return place;
}

std::vector<std::string> parts_of(const std::string& path, const Place& place) {
  std::vector<std::string> parts{""};
  for (const char c : path)
    if (c == '.')
      parts.emplace_back();
    else
      parts.back() += c;
  for (const std::string& part : parts)
    if (part.empty())
      throw InputError(fmt::format("`{}` is no path of a value", path), place,
                       "write the keys with one dot between, such as model.bands");
  return parts;
}

// A layer as written, how many copies of it stand in the stack, and its first number.
struct Written {
  Node* node = nullptr;
  double copies = 1;
  double first = 1;
};

void collect(Node& layers, double copies, double& number, std::vector<Written>& out) {
  for (Node& item : layers.mutable_items()) {
    if (!item.is_map()) continue;
    if (!item["repeat"].present()) {
      out.push_back({&item, copies, number});
      number += 1;
      continue;
    }
    double times = 1;
    read_number(item["repeat"].text(), times);
    const double before = number;
    for (Node::Entry& entry : item.mutable_entries())
      if (entry.key == "layers") collect(entry.value, copies * std::max(times, 1.0), number, out);
    number = before + (number - before) * std::max(times, 0.0);
  }
}

Node& find_layer(Node& study, const std::string& address, const Place& place) {
  Node* layers = nullptr;
  for (Node::Entry& entry : study.mutable_entries())
    if (entry.key == "layers") layers = &entry.value;
  if (!layers || !layers->is_sequence()) throw InputError("the study has no `layers`", place);
  std::vector<Written> written;
  double number = 1;
  collect(*layers, 1, number, written);
  double wanted = 0;
  const bool by_number = read_number(address, wanted);
  std::vector<std::string> names;
  for (const Written& layer : written) {
    const Node& name = (*layer.node)["name"];
    if (name.is_scalar()) names.push_back(name.text());
    if (by_number ? layer.first == wanted && layer.copies == 1 : name.is_scalar() && name.text() == address)
      return *layer.node;
  }
  if (by_number) {
    if (wanted >= 1 && wanted < number && wanted == std::floor(wanted))
      throw InputError(fmt::format("layer {} is one of the copies of a repeat", address), place,
                       "a setting reaches all copies together: give the layer a name and use that");
    throw InputError(
        fmt::format("there is no layer {}", address), place,
        fmt::format("layers count from 1 at the bottom to {:.0f} at the top, repeats unrolled", number - 1));
  }
  const auto bracket = address.find('[');
  if (bracket != std::string::npos &&
      std::find(names.begin(), names.end(), address.substr(0, bracket)) != names.end())
    throw InputError(
        fmt::format("`{}` is one copy of a layer", address), place,
        fmt::format("a setting reaches all copies together: write {}", address.substr(0, bracket)));
  const auto near = nearest(address, names);
  throw InputError(
      fmt::format("there is no layer named `{}`", address), place,
      !near.empty() ? did_you_mean(near)
      : names.empty()
          ? fmt::format("no layer has a name; use a number from 1 to {:.0f}", number - 1)
          : fmt::format("named layers: `{}`; or use a number from 1 to {:.0f}",
                        fmt::join(names.begin(),
                                  names.begin() + std::min<std::ptrdiff_t>(8, std::ssize(names)), "`, `"),
                        number - 1));
}

// The value with places that show the whole setting, as the user wrote it.
void show_setting(Node& node, const std::string& line_text) {
  node.mutable_place().line_text = line_text;
  for (Node& item : node.mutable_items()) show_setting(item, line_text);
  for (Node::Entry& entry : node.mutable_entries()) {
    entry.key_place.line_text = line_text;
    show_setting(entry.value, line_text);
  }
}

Node value_of(const std::string& path, const std::string& text, const Place& setting) {
  // Blanks stand for the path, so that columns count from its beginning.
  const std::string blanks(static_cast<std::size_t>(characters(path)) + 1, ' ');
  try {
    Node value = read_yaml(blanks + text, setting.file);
    show_setting(value, setting.line_text);
    return value;
  } catch (const InputError& mistake) {
    Place place = mistake.place();
    place.line_text = setting.line_text;
    throw InputError(mistake.sentence(), place, mistake.hint());
  }
}

}  // namespace

void set_value(Node& study, const std::string& path, const std::string& text) {
  const Place place = place_of_setting(path, text);
  const auto parts = parts_of(path, place);
  Node value = value_of(path, text, place);
  if (value.kind() == Node::Kind::null)
    throw InputError(fmt::format("`{}` is set to nothing", path), place, "write a value after the =");
  if (!study.is_map()) throw InputError("the study is not a map of keys", place);
  Node* at = &study;
  std::size_t next = 0;
  if (parts[0] == "layers" && parts.size() > 1) {
    at = &find_layer(study, parts[1], place);
    next = 2;
    if (next == parts.size())
      throw InputError(fmt::format("`{}` names a layer but no value of it", path), place,
                       fmt::format("write {0}.thickness or {0}.material", path));
  }
  for (; next < parts.size(); ++next) {
    if (!at->is_map())
      throw InputError(fmt::format("`{}` holds one value, not keys", parts[next - 1]), place,
                       "set the whole of it");
    auto& entries = at->mutable_entries();
    auto found = std::find_if(entries.begin(), entries.end(),
                              [&](const Node::Entry& entry) { return entry.key == parts[next]; });
    if (found == entries.end()) {
      entries.push_back({parts[next], place, Node::make_map({}, place)});
      found = entries.end() - 1;
    } else if (next + 1 < parts.size() && found->value.kind() == Node::Kind::null) {
      found->value = Node::make_map({}, place);
    }
    at = &found->value;
  }
  *at = std::move(value);
}

}  // namespace wellwright
