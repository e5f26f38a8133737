// SPDX-License-Identifier: Apache-2.0
// The table in force, from its rows.
#include "materials/data.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace wellwright {
namespace {

constexpr double unknown = std::numeric_limits<double>::quiet_NaN();

// A value that follows from others, with the source of one of them; the study's own stays.
void set_derived(Binary& b, P p, double value, P from, std::string_view note) {
  Origin& origin = b.origins[static_cast<std::size_t>(p)];
  if (origin.overridden || std::isnan(value)) return;
  at(b.values, p) = value;
  origin = b.origins[static_cast<std::size_t>(from)];
  origin.note = note;
}

// V01 gives masses along [001] and in the plane of (001) from the Luttinger parameters.
void hole_masses_of_cubic(Binary& b) {
  const double g1 = at(b.values, P::luttinger_1), g2 = at(b.values, P::luttinger_2);
  const auto set = [&](P p, double value) {
    set_derived(b, p, value, P::luttinger_1, "from the Luttinger parameters");
  };
  set(P::heavy_hole_mass, 1 / (g1 - 2 * g2));
  set(P::light_hole_mass, 1 / (g1 + 2 * g2));
  set(P::heavy_hole_in_plane_mass, 1 / (g1 + g2));
  set(P::light_hole_in_plane_mass, 1 / (g1 - g2));
}

// Unstrained wurtzite: heavy = Gamma9, light = upper Gamma7 (S.L. Chuang, C.S. Chang, Phys. Rev. B 54, 2491
// (1996), eqs. 36-41).
void hole_masses_of_wurtzite(Binary& b) {
  const double d1 = at(b.values, P::crystal_field_splitting), d2 = at(b.values, P::spin_orbit_splitting) / 3;
  const double half = 0.5 * (d1 - d2), root = std::sqrt(half * half + 2 * d2 * d2);
  const double upper = half + root, lower = half - root;
  const double A1 = at(b.values, P::valence_a1), A2 = at(b.values, P::valence_a2),
               A3 = at(b.values, P::valence_a3), A4 = at(b.values, P::valence_a4);
  const double share = upper / (upper - lower);
  const auto set = [&](P p, double value) {
    set_derived(b, p, value, P::valence_a1, "from the valence-band parameters A, unstrained");
  };
  set(P::heavy_hole_mass, -1 / (A1 + A3));
  set(P::heavy_hole_in_plane_mass, -1 / (A2 + A4));
  set(P::light_hole_mass, -1 / (A1 + share * A3));
  set(P::light_hole_in_plane_mass, -1 / (A2 + share * A4));
}

Origin origin_of(const RawValue& row) {
  return {row.source, row.range, row.note, row.trust, row.recalled, false};
}

int element_at(std::string_view name, std::size_t& at) {
  for (const std::size_t length : {std::size_t{2}, std::size_t{1}}) {
    if (at + length > name.size()) continue;
    const auto found = std::find(element_names.begin(), element_names.end(), name.substr(at, length));
    if (found == element_names.end()) continue;
    at += length;
    return static_cast<int>(found - element_names.begin());
  }
  return -1;
}

}  // namespace

std::vector<int> elements_of(std::string_view name) {
  std::vector<int> elements;
  for (std::size_t at = 0; at < name.size();) {
    const int element = element_at(name, at);
    if (element < 0) return {};
    elements.push_back(element);
  }
  return elements;
}

double AlloyRecord::excess(P p, double x, double from_value, double to_value) const {
  const Bow& b = bow[static_cast<std::size_t>(p)];
  if (!b.known) return 0;
  if (b.difference) return x * (b.c[0] + x * (b.c[1] + x * b.c[2])) - x * (to_value - from_value);
  return -x * (1 - x) * (b.c[0] + x * (b.c[1] + x * b.c[2]));
}

void derive(Binary& binary) {
  if (binary.structure == Structure::wurtzite)
    hole_masses_of_wurtzite(binary);
  else
    hole_masses_of_cubic(binary);  // its in-plane electron mass is the one along z
}

void apply_row(MaterialTable::Data& data, const RawValue& row) {
  const auto p = static_cast<std::size_t>(row.parameter), owner = static_cast<std::size_t>(row.owner);
  if (!row.of_alloy) {
    data.binaries[owner].values[p] = row.c[0];
    data.binaries[owner].origins[p] = origin_of(row);
    return;
  }
  Bow& bow = data.alloys[owner].bow[p];
  bow.known = true;
  bow.difference = row.difference;
  std::copy(std::begin(row.c), std::end(row.c), bow.c);
  bow.origin = origin_of(row);
}

MaterialTable::Data MaterialTable::Data::build(const RawTable& raw) {
  Data data;
  for (const RawBinary& b : raw.binaries) {
    Binary binary;
    binary.name = b.name;
    binary.structure = b.structure;
    binary.values.fill(unknown);
    const auto elements = elements_of(b.name);
    if (!elements.empty()) {
      binary.cation = elements.front();
      binary.anion = elements.back();
    }
    data.binaries.push_back(binary);
  }
  for (const RawAlloy& a : raw.alloys) {
    AlloyRecord record;
    record.name = a.name;
    record.range = a.range;
    record.from = a.from;
    record.to = a.to;
    data.alloys.push_back(record);
  }
  data.rows.assign(raw.values.begin(), raw.values.end());
  data.sources.assign(raw.sources.begin(), raw.sources.end());
  data.errors.assign(raw.errors.begin(), raw.errors.end());
  data.hash = raw.hash;
  for (const RawValue& row : data.rows)
    if (row.variant.empty()) apply_row(data, row);
  for (Binary& binary : data.binaries) derive(binary);
  return data;
}

const Binary* MaterialTable::Data::binary(std::string_view name) const {
  for (const Binary& b : binaries)
    if (b.name == name) return &b;
  return nullptr;
}

const AlloyRecord* MaterialTable::Data::alloy_record(std::string_view name) const {
  for (const AlloyRecord& a : alloys)
    if (a.name == name) return &a;
  // The same elements in another order.
  auto elements = elements_of(name);
  std::sort(elements.begin(), elements.end());
  for (const AlloyRecord& a : alloys) {
    auto other = elements_of(a.name);
    std::sort(other.begin(), other.end());
    if (!elements.empty() && other == elements) return &a;
  }
  return nullptr;
}

const Override* MaterialTable::Data::medium(std::string_view name) const {
  for (const Override& o : overrides)
    if (o.is_medium && o.name == name) return &o;
  return nullptr;
}

std::vector<const Override*> MaterialTable::Data::overrides_of(const Alloy& alloy) const {
  std::vector<const Override*> found;
  if (overrides.empty() || alloy.text.empty()) return found;  // a mixture without a name carries none
  std::vector<int> elements;
  for (int e = 0; e < 9; ++e)
    if (alloy.fraction[static_cast<std::size_t>(e)] != 0) elements.push_back(e);
  for (const Override& o : overrides)
    if (!o.is_medium && !o.elements.empty() && o.elements == elements) found.push_back(&o);
  for (const Override& o : overrides) {
    if (o.is_medium || !o.elements.empty()) continue;
    bool same = true;
    for (std::size_t e = 0; e < 9; ++e) same = same && std::abs(o.fraction[e] - alloy.fraction[e]) < 1e-9;
    if (same) found.push_back(&o);
  }
  return found;
}

std::string MaterialTable::Data::source_text(std::string_view source) const {
  const auto semicolon = source.find(';');
  const std::string_view key = source.substr(0, semicolon);
  for (const RawSource& s : sources)
    if (s.key == key)
      return std::string(s.text) +
             (semicolon == std::string_view::npos ? "" : std::string(source.substr(semicolon)));
  return std::string(source);
}

}  // namespace wellwright
