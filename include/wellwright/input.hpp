// SPDX-License-Identifier: Apache-2.0
// One located YAML reader for studies and material tables: a tree of nodes, each of which knows its place.
#pragma once

#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "wellwright/diagnostics.hpp"
#include "wellwright/units.hpp"

namespace wellwright {

/// A value of a YAML file with its place. Maps keep the order of the file. Copies share what they hold until
/// one of them is changed, so that an alias costs nothing however much it names.
class Node {
 public:
  enum class Kind { absent, null, scalar, sequence, map };
  struct Entry;

  Kind kind() const { return kind_; }
  bool present() const { return kind_ != Kind::absent; }
  bool is_map() const { return kind_ == Kind::map; }
  bool is_sequence() const { return kind_ == Kind::sequence; }
  bool is_scalar() const { return kind_ == Kind::scalar; }

  const Place& place() const { return place_; }      ///< of the value
  const std::string& text() const { return text_; }  ///< of a scalar, as written
  bool quoted() const { return quoted_; }            ///< the scalar stood in quotes
  const std::vector<Entry>& entries() const;         ///< of a map
  const std::vector<Node>& items() const;            ///< of a sequence

  /// The value under `key`, or an absent node.
  const Node& operator[](std::string_view key) const;
  /// The place of the key itself (for "unknown key" errors).
  const Place& key_place(std::string_view key) const;

  /// Readers of scalars: throw InputError at this place, saying what is expected. `name` is the key in the
  /// message.
  double number(std::string_view name) const;
  int whole_number(std::string_view name, int lowest, int highest) const;
  bool on_off(std::string_view name) const;  ///< on | off (true and false are accepted)
  std::string word(std::string_view name, const std::vector<std::string>& allowed) const;
  std::string string(std::string_view name) const;
  Quantity quantity(std::string_view name, const std::vector<Dimension>& allowed) const;
  double quantity(std::string_view name, Dimension dimension) const;  ///< in the internal unit

  /// Throws InputError for the first key that is not in `allowed`, with the nearest candidates.
  void only_keys(const std::vector<std::string>& allowed, std::string_view where) const;

  // For the reader and for `--set`.
  static Node make_scalar(std::string text, Place place, bool quoted = false);
  static Node make_sequence(std::vector<Node> items, Place place);
  static Node make_map(std::vector<Entry> entries, Place place);
  static Node make_null(Place place);
  Place& mutable_place() { return place_; }
  std::vector<Entry>& mutable_entries();
  std::vector<Node>& mutable_items();

 private:
  Kind kind_ = Kind::absent;
  Place place_;
  std::string text_;
  bool quoted_ = false;
  std::shared_ptr<std::vector<Entry>> entries_;  // none: empty
  std::shared_ptr<std::vector<Node>> items_;
};

struct Node::Entry {
  std::string key;
  Place key_place;
  Node value;
};

/// Limits on hostile input; every refusal names the limit.
struct InputLimits {
  std::size_t file_bytes = 8u << 20;
  std::size_t nodes = 600'000;  ///< after alias expansion
  int depth = 64;
};

/// Parses YAML `text`; `file` is the name used in messages. Refuses repeated keys, a second document, .nan
/// and .inf, numbers with a leading zero (010), binary text, tabs as indentation, alias bombs. Throws
/// InputError.
Node read_yaml(std::string_view text, const std::string& file, const InputLimits& limits = {});

/// Reads a whole file. Throws FileTrouble when it cannot be read.
std::string read_file(const std::string& path, std::size_t limit = InputLimits{}.file_bytes);

/// Replaces (or adds) the value at a dotted `path` such as "field" or "layers.wide well.thickness"; `text` is
/// parsed as YAML. Layers are found by name or number (counted from 1 after repeats are unrolled). Throws
/// InputError with the place "--set".
void set_value(Node& study, const std::string& path, const std::string& text);

/// A key of an input file, declared once: validation, printed defaults and the reference page come from it.
struct KeyDeclaration {
  std::string path;  ///< e.g. "model.bands", "layers[].thickness"
  std::string type;  ///< "quantity", "number", "word", "list", "map", "text", "on|off", "whole number"
  std::vector<Dimension> dimensions = {};
  std::string default_text = {};  ///< as printed; empty: no default
  std::vector<std::string> allowed = {};
  std::string sentence = {};  ///< for the reference page
  int step = 1;               ///< the step that brings it; keys of a later step are refused as not yet built
  std::vector<std::pair<std::string, int>> later = {};  ///< words that a later step brings, with that step
  std::vector<std::string> other_names = {};  ///< what else people call it; only for the hint after a slip
};

}  // namespace wellwright
