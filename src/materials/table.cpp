// SPDX-License-Identifier: Apache-2.0
// The table as a value: shipped or the user's, its names, the overrides of a study.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <set>

#include "materials/data.hpp"

namespace wellwright {
namespace {

const std::shared_ptr<const MaterialTable::Data>& shipped() {
  static const auto data =
      std::make_shared<const MaterialTable::Data>(MaterialTable::Data::build(shipped_table));
  return data;
}

std::vector<std::string> study_keys_of_media() {
  std::vector<std::string> keys{"conduction_band_edge"};
  for (const ParameterInfo& info : parameter_table)
    if (info.in_study) keys.emplace_back(info.key);
  return keys;
}

// The values that the study writes for one material.
struct Written {
  std::vector<std::pair<P, double>> values;
  std::optional<double> edge;
  const Node* variant = nullptr;
};

Written read_values(const Node::Entry& entry) {
  if (!entry.value.is_map())
    throw InputError(fmt::format("`{}` is not a map of keys", entry.key), entry.value.place(),
                     fmt::format("write {}: {{electron_mass: 0.067}}", entry.key));
  Written written;
  auto keys = study_keys_of_media();
  keys.emplace_back("variant");
  entry.value.only_keys(keys, fmt::format("of the material {}", entry.key));
  for (const Node::Entry& value : entry.value.entries()) {
    if (value.key == "variant") {
      written.variant = &value.value;
    } else if (value.key == "conduction_band_edge") {
      written.edge = value.value.quantity(value.key, Dimension::energy);
    } else {
      const P p = parameter_of(value.key);
      const double number =
          value.value
              .quantity(value.key,
                        std::vector<Dimension>{parameter_table[static_cast<std::size_t>(p)].dimension})
              .value;
      const bool positive = value.key.ends_with("_mass") || value.key.ends_with("_gap") ||
                            value.key == "lattice_constant" || value.key == "permittivity" ||
                            value.key == "high_frequency_permittivity" || value.key == "density" ||
                            value.key == "c11" || value.key == "c33";
      if (positive && !(number > 0))
        throw InputError(fmt::format("`{}` is {}", value.key, value.value.text()), value.value.place(),
                         "it must be larger than zero");
      written.values.emplace_back(p, number);
    }
  }
  return written;
}

// Chooses the variant of a binary or alloy; its rows take the place of the default ones.
void choose_variant(MaterialTable::Data& data, bool of_alloy, int owner, std::string_view name,
                    const Node& node) {
  const std::string wanted = node.string("variant");
  std::vector<std::string> known;
  bool found = false;
  for (const RawValue& row : data.rows) {
    if (row.of_alloy != of_alloy || row.owner != owner || row.variant.empty()) continue;
    if (std::find(known.begin(), known.end(), row.variant) == known.end()) known.emplace_back(row.variant);
    if (row.variant != wanted) continue;
    apply_row(data, row);
    found = true;
  }
  if (!found)
    throw InputError(fmt::format("{} has no variant `{}`", name, wanted), node.place(),
                     known.empty() ? fmt::format("{} has no variants", name)
                                   : fmt::format("its variants: {}", fmt::join(known, ", ")));
  data.variants.emplace_back(name, wanted);
}

void override_binary(MaterialTable::Data& data, Binary& binary, const Written& written) {
  for (const auto& [p, value] : written.values) {
    at(binary.values, p) = value;
    Origin& origin = binary.origins[static_cast<std::size_t>(p)];
    origin = {};
    origin.source = "override in the study";
    origin.overridden = true;
    if (p == P::band_gap)  // the number holds at every temperature
      for (const P law :
           {P::band_gap_alpha, P::band_gap_beta, P::band_gap_coth_amplitude, P::band_gap_coth_temperature})
        at(binary.values, law) = std::nan("");
    if (p == P::lattice_constant)
      for (const P law : {P::lattice_constant_slope, P::relative_lattice_slope})
        at(binary.values, law) = std::nan("");
  }
  derive(binary);
  if (!written.edge) return;
  Override edge;
  edge.name = binary.name;
  edge.fraction[static_cast<std::size_t>(binary.cation)] = 1;
  edge.fraction[static_cast<std::size_t>(binary.anion)] = 1;
  edge.conduction_band_edge = written.edge;
  data.overrides.push_back(edge);
}

// A binary is found by its elements: one of group III and one of group V, or one of group IV for diamond.
void check_binary_name(const Node::Entry& entry, Structure structure) {
  const std::vector<int> elements = elements_of(entry.key);
  constexpr int first_of_group_five = 3, first_of_group_four = 7;
  const bool known = structure == Structure::diamond
                         ? elements.size() == 1 && elements[0] >= first_of_group_four
                         : elements.size() == 2 && elements[0] < first_of_group_five &&
                               elements[1] >= first_of_group_five && elements[1] < first_of_group_four;
  if (!known)
    throw InputError(fmt::format("`{}` is no binary", entry.key), entry.key_place,
                     structure == Structure::diamond
                         ? "a diamond structure has one element: Si or Ge"
                         : "write Al, Ga or In and then N, P, As or Sb, such as GaAs");
}

// An alloy is found by its elements, which are those of two binaries with one sublattice in common.
void check_alloy_name(const Node::Entry& entry, const Binary& from, const Binary& to) {
  std::vector<int> elements = elements_of(entry.key);
  std::sort(elements.begin(), elements.end());
  const std::set<int> joined = {from.cation, from.anion, to.cation, to.anion};
  const std::size_t wanted = from.structure == Structure::diamond ? 2 : 3;
  if (from.structure != to.structure || joined.size() != wanted)
    throw InputError(fmt::format("{} and {} make no alloy", from.name, to.name), entry.key_place,
                     "its ends have one structure and differ in one element");
  if (!std::equal(elements.begin(), elements.end(), joined.begin(), joined.end()))
    throw InputError(
        fmt::format("`{}` does not name the elements of {} and {}", entry.key, from.name, to.name),
        entry.key_place);
}

}  // namespace

MaterialTable::MaterialTable() : data_(shipped()) {}

MaterialTable MaterialTable::from_yaml(const Node& root) {
  auto owned = std::make_shared<OwnedTable>();
  read_tables({root}, *owned);
  auto binary = owned->binaries.begin();
  for (const Node::Entry& entry : root["binaries"].entries()) check_binary_name(entry, (binary++)->structure);
  auto data = std::make_shared<Data>(Data::build(owned->view("")));
  auto alloy = data->alloys.begin();
  for (const Node::Entry& entry : root["alloys"].entries()) {
    const AlloyRecord& record = *alloy++;
    check_alloy_name(entry, data->binaries[static_cast<std::size_t>(record.from)],
                     data->binaries[static_cast<std::size_t>(record.to)]);
  }
  data->owner = owned;
  std::uint64_t hash = 1469598103934665603ull;  // FNV-1a over the texts and numbers
  const auto mix = [&](std::string_view text) {
    for (const char c : text) hash = (hash ^ static_cast<unsigned char>(c)) * 1099511628211ull;
  };
  for (const std::string& text : owned->texts) mix(text);
  for (const RawValue& row : owned->values) mix(fmt::format("{}", row.c[0]));
  data->hash = fmt::format("{:016x}", hash);
  MaterialTable table;
  table.data_ = std::move(data);
  return table;
}

MaterialTable MaterialTable::with_overrides(const Node& block) const {
  auto data = std::make_shared<Data>(*data_);
  for (const Node::Entry& entry : block.entries()) {
    const Written written = read_values(entry);
    auto binary = std::find_if(data->binaries.begin(), data->binaries.end(),
                               [&](const Binary& b) { return b.name == entry.key; });
    if (binary != data->binaries.end()) {
      if (written.variant) {
        choose_variant(*data, false, static_cast<int>(binary - data->binaries.begin()), binary->name,
                       *written.variant);
        derive(*binary);
      }
      override_binary(*data, *binary, written);
      continue;
    }
    Override made;
    made.name = entry.key;
    made.values = written.values;
    made.conduction_band_edge = written.edge;
    if (const AlloyRecord* record = data->alloy_record(entry.key)) {
      const int owner = static_cast<int>(record - data->alloys.data());
      if (written.variant) choose_variant(*data, true, owner, record->name, *written.variant);
      made.elements = elements_of(entry.key);
      std::sort(made.elements.begin(), made.elements.end());
      if (!made.values.empty() || made.conduction_band_edge) data->overrides.push_back(made);
      continue;
    }
    if (written.variant)
      throw InputError(fmt::format("`{}` is no material of the table, so it has no variants", entry.key),
                       written.variant->place(), "variants belong to a binary or a ternary, such as AlGaAs");
    Alloy alloy;
    try {
      alloy = this->alloy(entry.key, entry.key_place);
    } catch (const InputError& error) {
      // A name with an element and a fraction was meant as an alloy; any other is a medium of its own.
      const bool looks_like_alloy =
          !elements_of(entry.key.substr(0, entry.key.find_first_of("0123456789."))).empty() &&
          entry.key.find_first_of("0123456789") != std::string::npos;
      if (looks_like_alloy && !written.edge) throw;
      if (!written.edge) {
        const auto near = nearest(entry.key, names());
        throw InputError(fmt::format("`{}` is no material of the table, and a medium of its own needs "
                                     "`conduction_band_edge`",
                                     entry.key),
                         entry.key_place,
                         near.empty()
                             ? "add conduction_band_edge: with a unit, counted from the zero of energy"
                             : did_you_mean(near));
      }
      made.is_medium = true;
      data->overrides.push_back(made);
      continue;
    }
    if (alloy.is_medium())
      throw InputError(fmt::format("the medium `{}` is defined twice", entry.key), entry.key_place);
    made.fraction = alloy.fraction;
    data->overrides.push_back(made);
  }
  MaterialTable table;
  table.data_ = std::move(data);
  return table;
}

bool MaterialTable::knows_medium(std::string_view name) const {
  return data_->medium(name) != nullptr;
}

std::vector<std::string> MaterialTable::names() const {
  std::vector<std::string> out;
  for (const Binary& b : data_->binaries) out.emplace_back(b.name);
  for (const AlloyRecord& a : data_->alloys) out.emplace_back(a.name);
  for (const Override& o : data_->overrides)
    if (o.is_medium) out.push_back(o.name);
  return out;
}

Structure MaterialTable::structure(const Alloy& alloy) const {
  return structure_of_alloy(*data_, alloy);
}

bool MaterialTable::edge_is_final(const Alloy& alloy) const {
  if (alloy.is_medium()) return true;
  const auto overrides = data_->overrides_of(alloy);
  return std::any_of(overrides.begin(), overrides.end(),
                     [](const Override* o) { return o->conduction_band_edge.has_value(); });
}

std::string MaterialTable::hash() const {
  return data_->hash;
}

}  // namespace wellwright
