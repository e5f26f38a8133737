// SPDX-License-Identifier: Apache-2.0
// A material table from YAML: binaries, alloys, sources, standard errors.
#include <fmt/format.h>

#include <algorithm>

#include "materials/raw_table.hpp"

namespace wellwright {
namespace {

constexpr const char* value_keys[] = {"value", "difference", "source", "recalled",
                                      "trust", "note",       "also",   "range"};

const Node& map_of(const Node& node, std::string_view what) {
  if (!node.is_map()) throw InputError(fmt::format("`{}` is not a map of keys", what), node.place());
  return node;
}

Structure structure_of(const Node& entry, std::string_view name) {
  const Node& node = entry["structure"];
  if (!node.present())
    throw InputError(fmt::format("{} has no `structure`", name), entry.place(),
                     "write structure: zinc blende, wurtzite or diamond");
  const std::string word = node.word("structure", {"zinc blende", "wurtzite", "diamond"});
  return word == "wurtzite"  ? Structure::wurtzite
         : word == "diamond" ? Structure::diamond
                             : Structure::zinc_blende;
}

// "0.565 nm" with the unit that this parameter has.
double number_of(const Node& node, const ParameterInfo& info) {
  if (info.dimension != Dimension::number)
    return node.quantity(info.key, std::vector<Dimension>{info.dimension}).value;
  const std::string text = node.string(info.key);
  const auto blank = text.find(' ');
  double value = 0;
  if (!read_number(text.substr(0, blank), value) ||
      (blank == std::string::npos ? std::string_view{} : std::string_view(text).substr(blank + 1)) !=
          info.unit)
    throw InputError(
        fmt::format("`{}` is `{}`", info.key, text), node.place(),
        info.unit.empty() ? "write a plain number" : fmt::format("write a number in {}", info.unit));
  return value;
}

class Reader {
 public:
  explicit Reader(OwnedTable& table) : table_(table) {}

  void read_binary(const Node::Entry& entry) {
    const Node& node = map_of(entry.value, entry.key);
    node.only_keys({"structure", "values", "variants"}, fmt::format("of {}", entry.key));
    for (const RawBinary& other : table_.binaries)
      if (other.name == entry.key)
        throw InputError(fmt::format("{} stands twice in the table", entry.key), entry.key_place);
    table_.binaries.push_back({table_.keep(entry.key), structure_of(node, entry.key)});
    const int owner = static_cast<int>(table_.binaries.size()) - 1;
    read_values(map_of(node["values"], "values"), false, owner, {});
    read_variants(node, false, owner);
  }

  void read_alloy(const Node::Entry& entry) {
    const Node& node = map_of(entry.value, entry.key);
    node.only_keys({"from", "to", "range", "bowing", "variants"}, fmt::format("of {}", entry.key));
    const auto binary = [&](const char* key) {
      const std::string name = node[key].string(key);
      for (std::size_t i = 0; i < table_.binaries.size(); ++i)
        if (table_.binaries[i].name == name) return static_cast<int>(i);
      throw InputError(fmt::format("{} is no binary of the table", name), node[key].place());
    };
    const std::string range = node["range"].present() ? node["range"].string("range") : "0 to 1";
    const int from = binary("from"), to = binary("to");
    table_.alloys.push_back({table_.keep(entry.key), from, to, table_.keep(range)});
    const int owner = static_cast<int>(table_.alloys.size()) - 1;
    if (node["bowing"].present()) read_values(map_of(node["bowing"], "bowing"), true, owner, {});
    read_variants(node, true, owner);
  }

  void read_source(const Node::Entry& entry) {
    table_.sources.push_back({table_.keep(entry.key), table_.keep(entry.value.string(entry.key))});
  }

  void read_error(const Node::Entry& entry) {
    const Node& node = map_of(entry.value, entry.key);
    node.only_keys({"value", "source"}, "of a standard error");
    const Quantity value = node["value"].quantity("value", {Dimension::energy, Dimension::percent});
    table_.errors.push_back({table_.keep(entry.key), value.value,
                             value.dimension == Dimension::energy ? "eV" : "1",
                             table_.keep(node["source"].string("source"))});
  }

 private:
  void read_variants(const Node& node, bool of_alloy, int owner) {
    for (const Node::Entry& variant : node["variants"].entries())
      read_values(map_of(variant.value, variant.key), of_alloy, owner, table_.keep(variant.key));
  }

  void read_values(const Node& values, bool of_alloy, int owner, std::string_view variant) {
    for (const Node::Entry& entry : values.entries()) {
      const P parameter = parameter_of(entry.key);
      if (parameter == P::count) {
        std::vector<std::string> keys;
        for (const ParameterInfo& info : parameter_table) keys.emplace_back(info.key);
        const auto near = nearest(entry.key, keys);
        throw InputError(fmt::format("`{}` is no quantity of a material", entry.key), entry.key_place,
                         did_you_mean(near));
      }
      const ParameterInfo& info = parameter_table[static_cast<std::size_t>(parameter)];
      const Node& node = map_of(entry.value, entry.key);
      node.only_keys({std::begin(value_keys), std::end(value_keys)}, fmt::format("of {}", entry.key));
      RawValue raw{};
      raw.of_alloy = of_alloy;
      raw.owner = owner;
      raw.variant = variant;
      raw.parameter = parameter;
      raw.difference = node["difference"].present();
      const Node& value = raw.difference ? node["difference"] : node["value"];
      if (!value.present())
        throw InputError(fmt::format("`{}` has no value", entry.key), entry.key_place,
                         "write {value: ..., source: ...}");
      if (value.is_sequence()) {
        for (const Node& item : value.items()) {
          if (raw.terms == 3) throw InputError("a polynomial has at most three coefficients", item.place());
          raw.c[raw.terms++] = number_of(item, info);
        }
      } else {
        raw.terms = 1;
        raw.c[0] = number_of(value, info);
      }
      if (!node["source"].present())
        throw InputError(fmt::format("`{}` names no source", entry.key), entry.key_place,
                         "write source: and a key of the sources, or common practice");
      raw.source = table_.keep(node["source"].string("source"));
      raw.recalled = node["recalled"].present() && node["recalled"].on_off("recalled");
      if (node["trust"].present()) raw.trust = table_.keep(node["trust"].word("trust", {"medium", "low"}));
      if (node["range"].present()) raw.range = table_.keep(node["range"].string("range"));
      std::string note = node["note"].present() ? node["note"].string("note") : "";
      if (node["also"].present()) note += (note.empty() ? "also " : "; also ") + node["also"].string("also");
      raw.note = table_.keep(note);
      table_.values.push_back(raw);
    }
  }

  OwnedTable& table_;
};

// A source is a key of the sources, perhaps with words behind a semicolon, or says how the value was had.
void check_sources(const OwnedTable& table) {
  for (const RawValue& value : table.values) {
    const std::string_view key = value.source.substr(0, value.source.find(';'));
    if (key.starts_with("derived") || key.starts_with("common practice")) continue;
    const bool known = std::any_of(table.sources.begin(), table.sources.end(),
                                   [&](const RawSource& source) { return source.key == key; });
    if (known) continue;
    const auto owner = static_cast<std::size_t>(value.owner);
    throw InputError(fmt::format("the source {} of {} in {} is not among the sources", key,
                                 parameter_table[static_cast<std::size_t>(value.parameter)].key,
                                 value.of_alloy ? table.alloys[owner].name : table.binaries[owner].name),
                     Place{}, "add it under sources:");
  }
}

}  // namespace

void read_tables(const std::vector<Node>& roots, OwnedTable& table) {
  Reader reader(table);
  for (const Node& root : roots)
    map_of(root, "the material table")
        .only_keys({"binaries", "alloys", "sources", "standard_errors"}, "of a material table");
  for (const Node& root : roots)
    for (const Node::Entry& entry : root["binaries"].entries()) reader.read_binary(entry);
  for (const Node& root : roots) {  // alloys may join binaries of two files
    for (const Node::Entry& entry : root["alloys"].entries()) reader.read_alloy(entry);
    for (const Node::Entry& entry : root["sources"].entries()) reader.read_source(entry);
    for (const Node::Entry& entry : root["standard_errors"].entries()) reader.read_error(entry);
  }
  check_sources(table);
}

}  // namespace wellwright
