// SPDX-License-Identifier: Apache-2.0
// Reading the scalars of a located tree.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "wellwright/input.hpp"

namespace wellwright {
namespace {

constexpr std::size_t longest_quote = 40;

std::string shown(std::string_view text) {
  if (text.size() <= longest_quote) return fmt::format("`{}`", text);
  std::size_t end = longest_quote;
  while (end > 0 && (static_cast<unsigned char>(text[end]) & 0xC0u) == 0x80u) --end;
  return fmt::format("`{}...`", text.substr(0, end));
}

const char* words_of(Node::Kind kind) {
  switch (kind) {
    case Node::Kind::absent:
    case Node::Kind::null:
      return "empty";
    case Node::Kind::sequence:
      return "a list";
    case Node::Kind::map:
      return "a map of keys";
    default:
      return "a value";
  }
}

const std::string& scalar_of(const Node& node, std::string_view name, const std::string& hint) {
  if (!node.is_scalar())
    throw InputError(fmt::format("`{}` is {}", name, words_of(node.kind())), node.place(), hint);
  return node.text();
}

// The part of the value's place that begins `offset` bytes into its text, where that can be told.
Place part_of(const Node& node, std::size_t offset) {
  Place place = node.place();
  if (node.quoted() || offset == 0 || offset > node.text().size()) return place;
  const int before = static_cast<int>(
      std::count_if(node.text().begin(), node.text().begin() + static_cast<std::ptrdiff_t>(offset),
                    [](char c) { return (static_cast<unsigned char>(c) & 0xC0u) != 0x80u; }));
  place.column += before;
  place.length = std::max(1, place.length - before);
  return place;
}

// What a copy holds of its own from now on.
template <class T>
std::vector<T>& own(std::shared_ptr<std::vector<T>>& held) {
  if (!held)
    held = std::make_shared<std::vector<T>>();
  else if (held.use_count() > 1)
    held = std::make_shared<std::vector<T>>(*held);
  return *held;
}

}  // namespace

const std::vector<Node::Entry>& Node::entries() const {
  static const std::vector<Entry> none;
  return entries_ ? *entries_ : none;
}

const std::vector<Node>& Node::items() const {
  static const std::vector<Node> none;
  return items_ ? *items_ : none;
}

std::vector<Node::Entry>& Node::mutable_entries() {
  return own(entries_);
}
std::vector<Node>& Node::mutable_items() {
  return own(items_);
}

const Node& Node::operator[](std::string_view key) const {
  static const Node absent;
  for (const Entry& entry : entries())
    if (entry.key == key) return entry.value;
  return absent;
}

const Place& Node::key_place(std::string_view key) const {
  for (const Entry& entry : entries())
    if (entry.key == key) return entry.key_place;
  return place_;
}

double Node::number(std::string_view name) const {
  const std::string hint = fmt::format("write {}: and a plain number, such as 0.5", name);
  const std::string& text = scalar_of(*this, name, hint);
  double value = 0;
  if (read_number(text, value)) return value;
  Quantity quantity;
  QuantityTrouble trouble;
  read_quantity(text, {Dimension::number}, quantity, trouble);
  throw InputError(fmt::format("`{}`: {}", name, trouble.what), place_, hint);
}

int Node::whole_number(std::string_view name, int lowest, int highest) const {
  const std::string hint = fmt::format("write a whole number from {} to {}", lowest, highest);
  const std::string& text = scalar_of(*this, name, hint);
  double value = 0;
  if (!read_number(text, value) || value != std::floor(value))
    throw InputError(fmt::format("`{}` is {}, which is no whole number", name, shown(text)), place_, hint);
  if (value < lowest || value > highest)
    throw InputError(fmt::format("`{}` is {}", name, text), place_, hint);
  return static_cast<int>(value);
}

bool Node::on_off(std::string_view name) const {
  const std::string hint = fmt::format("write {}: on or {}: off", name, name);
  const std::string& text = scalar_of(*this, name, hint);
  if (text == "on" || text == "true") return true;
  if (text == "off" || text == "false") return false;
  throw InputError(fmt::format("`{}` is {}", name, shown(text)), place_, hint);
}

std::string Node::word(std::string_view name, const std::vector<std::string>& allowed) const {
  const std::string choice = fmt::format("one of: {}", listed(allowed));
  const std::string& text = scalar_of(*this, name, choice);
  if (std::find(allowed.begin(), allowed.end(), text) != allowed.end()) return text;
  const auto near = nearest(text, allowed);
  throw InputError(fmt::format("`{}` cannot be {}", name, shown(text)), place_,
                   near.empty() ? choice : did_you_mean(near));
}

std::string Node::string(std::string_view name) const {
  return scalar_of(*this, name, fmt::format("write {}: and a text", name));
}

Quantity Node::quantity(std::string_view name, const std::vector<Dimension>& allowed) const {
  Quantity quantity;
  QuantityTrouble trouble;
  if (!is_scalar()) {
    read_quantity("", allowed, quantity, trouble);  // for the words of the hint
    throw InputError(fmt::format("`{}` is {}", name, words_of(kind_)), place_, trouble.hint);
  }
  if (read_quantity(text_, allowed, quantity, trouble)) return quantity;
  throw InputError(fmt::format("`{}`: {}", name, trouble.what), part_of(*this, trouble.offset), trouble.hint);
}

double Node::quantity(std::string_view name, Dimension dimension) const {
  return quantity(name, std::vector<Dimension>{dimension}).value;
}

void Node::only_keys(const std::vector<std::string>& allowed, std::string_view where) const {
  for (const Entry& entry : entries()) {
    if (std::find(allowed.begin(), allowed.end(), entry.key) != allowed.end()) continue;
    const auto near = nearest(entry.key, allowed);
    throw InputError(fmt::format("unknown key {} {}", shown(entry.key), where), entry.key_place,
                     near.empty() ? fmt::format("known keys: {}", listed(allowed)) : did_you_mean(near));
  }
}

Node Node::make_scalar(std::string text, Place place, bool quoted) {
  Node node;
  node.kind_ = Kind::scalar;
  node.text_ = std::move(text);
  node.place_ = std::move(place);
  node.quoted_ = quoted;
  return node;
}

Node Node::make_sequence(std::vector<Node> items, Place place) {
  Node node;
  node.kind_ = Kind::sequence;
  node.items_ = std::make_shared<std::vector<Node>>(std::move(items));
  node.place_ = std::move(place);
  return node;
}

Node Node::make_map(std::vector<Entry> entries, Place place) {
  Node node;
  node.kind_ = Kind::map;
  node.entries_ = std::make_shared<std::vector<Entry>>(std::move(entries));
  node.place_ = std::move(place);
  return node;
}

Node Node::make_null(Place place) {
  Node node;
  node.kind_ = Kind::null;
  node.place_ = std::move(place);
  return node;
}

}  // namespace wellwright
