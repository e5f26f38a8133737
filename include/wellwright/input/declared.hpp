// SPDX-License-Identifier: Apache-2.0
// Reading by declaration: unknown keys, keys of a later step, defaults and allowed words all come from one
// list.
#pragma once

#include <map>
#include <string>
#include <string_view>
#include <vector>

#include "wellwright/input.hpp"

namespace wellwright {

/// The keys of one kind of file. A path names its parents by dots and the items of a list by []:
/// "model.bands", "layers[].thickness". The key itself is the last part.
class Declarations {
 public:
  explicit Declarations(std::vector<KeyDeclaration> keys);
  const std::vector<KeyDeclaration>& all() const { return keys_; }
  /// The declaration of `path`; asking for one that was not declared is a bug.
  const KeyDeclaration& at(std::string_view path) const;
  /// The keys declared directly below `path` ("" is the top of the file), in order.
  const std::vector<std::string>& below(std::string_view path) const;

  /// Refuses the first key of `map` that is not declared below `path` (with the nearest candidates, or where
  /// the key belongs) or that a later step brings. Throws InputError.
  void check(const Node& map, std::string_view path) const;

  /// The value of the key `path` in its parent `map`, or its default, in the internal unit. Throws
  /// InputError.
  double quantity(const Node& map, std::string_view path) const;
  int whole_number(const Node& map, std::string_view path, int lowest, int highest) const;
  bool on_off(const Node& map, std::string_view path) const;
  /// One of the declared words; a word of a later step is refused as not yet built.
  std::string word(const Node& map, std::string_view path) const;
  /// The same for a value that stands by itself, such as an item of a list.
  std::string word_of(const Node& value, std::string_view path) const;

 private:
  std::vector<KeyDeclaration> keys_;
  std::map<std::string, std::size_t, std::less<>> index_;
  std::map<std::string, std::vector<std::string>, std::less<>> below_;
};

/// The last part of a path: "thickness" of "layers[].thickness".
std::string_view last_part(std::string_view path);

/// What a step brings, in words: "charge and light" for 2.
std::string_view name_of_step(int step);

}  // namespace wellwright
