// SPDX-License-Identifier: Apache-2.0
// Reading by declaration.
#include "wellwright/input/declared.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cassert>

namespace wellwright {
namespace {

std::string_view parent_of(std::string_view path) {
  const auto dot = path.rfind('.');
  return dot == std::string_view::npos ? std::string_view{} : path.substr(0, dot);
}

std::string in_words(std::string_view path) {
  if (path.empty()) return "at the top of the study";
  std::string text(path);
  for (auto at = text.find("[]"); at != std::string::npos; at = text.find("[]")) text.erase(at, 2);
  return fmt::format("under `{}`", text);
}

// What is probably meant by a key that is none, apart from misspellings; empty when there is no telling.
std::string meant_by(const std::string& word, const std::vector<std::string>& known,
                     const std::vector<const KeyDeclaration*>& declared) {
  const auto blank = word.find(' ');
  if (blank != std::string::npos &&
      std::find(known.begin(), known.end(), word.substr(0, blank)) != known.end())
    return fmt::format("a colon stands behind a key: `{}: {}`", word.substr(0, blank),
                       word.substr(blank + 1));
  if (!word.empty() && word[0] >= '0' && word[0] <= '9')
    return "a comma begins another key; write decimals with a point, such as 5.5 nm";
  for (const KeyDeclaration* key : declared)
    if (std::find(key->other_names.begin(), key->other_names.end(), word) != key->other_names.end())
      return fmt::format("write `{}`: {}", last_part(key->path), key->sentence);
  return {};
}

}  // namespace

std::string_view last_part(std::string_view path) {
  const auto dot = path.rfind('.');
  return dot == std::string_view::npos ? path : path.substr(dot + 1);
}

std::string_view name_of_step(int step) {
  switch (step) {
    case 1:
      return "levels and beats";
    case 2:
      return "charge and light";
    case 3:
      return "lifetimes and open ends";
    case 4:
      return "pulses and pump-probe";
    default:
      return "planning";
  }
}

Declarations::Declarations(std::vector<KeyDeclaration> keys) : keys_(std::move(keys)) {
  for (std::size_t i = 0; i < keys_.size(); ++i) {
    const std::string& path = keys_[i].path;
    const bool fresh = index_.emplace(path, i).second;
    assert(fresh && "a key is declared once");
    (void)fresh;
    below_[std::string(parent_of(path))].emplace_back(last_part(path));
  }
}

const KeyDeclaration& Declarations::at(std::string_view path) const {
  const auto found = index_.find(path);
  assert(found != index_.end() && "a key is read that was not declared");
  return keys_[found->second];
}

const std::vector<std::string>& Declarations::below(std::string_view path) const {
  static const std::vector<std::string> none;
  const auto found = below_.find(path);
  return found == below_.end() ? none : found->second;
}

void Declarations::check(const Node& map, std::string_view path) const {
  const auto& known = below(path);
  std::string full(path);
  if (!full.empty()) full += '.';
  const std::size_t stem = full.size();
  for (const auto& entry : map.entries()) {
    full.resize(stem);
    full += entry.key;
    const auto found = entry.key.find('.') == std::string::npos ? index_.find(full) : index_.end();
    if (found == index_.end()) {
      std::vector<const KeyDeclaration*> declared;
      for (const auto& key : known) declared.push_back(&at(full.substr(0, stem) + key));
      std::string hint = meant_by(entry.key, known, declared);
      const auto near = nearest(entry.key, known);
      if (!hint.empty()) {
        // found above
      } else if (!near.empty()) {
        hint = did_you_mean(near);
      } else {
        for (const auto& key : keys_)
          if (last_part(key.path) == entry.key) {
            hint = fmt::format("`{}` stands {}", entry.key, in_words(parent_of(key.path)));
            break;
          }
        if (hint.empty()) {
          std::vector<std::string> built;  // what a later step brings would only be refused next
          for (const auto& key : known)
            if (at(full.substr(0, stem) + key).step <= 1) built.push_back(key);
          hint = fmt::format("known {}: {}", in_words(path), listed(built));
        }
      }
      throw InputError(fmt::format("unknown key `{}` {}", entry.key, in_words(path)), entry.key_place, hint);
    }
    const KeyDeclaration& key = keys_[found->second];
    if (key.step > 1)
      throw InputError(
          fmt::format("`{}` is not built yet: it comes with {}", entry.key, name_of_step(key.step)),
          entry.key_place, "take the key out to run the study as it is");
  }
}

double Declarations::quantity(const Node& map, std::string_view path) const {
  const KeyDeclaration& key = at(path);
  const Node& value = map[last_part(path)];
  if (value.present()) return value.quantity(last_part(path), key.dimensions).value;
  Quantity quantity;
  QuantityTrouble trouble;
  const bool read = read_quantity(key.default_text, key.dimensions, quantity, trouble);
  assert(read && "the declared default is a quantity");
  (void)read;
  return quantity.value;
}

int Declarations::whole_number(const Node& map, std::string_view path, int lowest, int highest) const {
  const Node& value = map[last_part(path)];
  if (value.present()) return value.whole_number(last_part(path), lowest, highest);
  return std::stoi(at(path).default_text);
}

bool Declarations::on_off(const Node& map, std::string_view path) const {
  const Node& value = map[last_part(path)];
  if (value.present()) return value.on_off(last_part(path));
  return at(path).default_text == "on";
}

std::string Declarations::word(const Node& map, std::string_view path) const {
  const Node& value = map[last_part(path)];
  return value.present() ? word_of(value, path) : at(path).default_text;
}

std::string Declarations::word_of(const Node& value, std::string_view path) const {
  const KeyDeclaration& key = at(path);
  if (value.is_scalar())
    for (const auto& [word, step] : key.later)
      if (value.text() == word)
        throw InputError(fmt::format("`{}: {}` is not built yet: it comes with {}", last_part(path), word,
                                     name_of_step(step)),
                         value.place(), fmt::format("built so far: {}", listed(key.allowed)));
  return value.word(last_part(path), key.allowed);
}

}  // namespace wellwright
