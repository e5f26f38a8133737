// SPDX-License-Identifier: Apache-2.0
// Every value of an alloy with its source, for the command, for result files and for warnings.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "materials/data.hpp"

namespace wellwright {
namespace {

// Laws of temperature are fitted to measurements that end far below the melting points; devices work below
// this [K] (common practice).
constexpr double hottest = 1000;

bool is_law(P p) {
  switch (p) {
    case P::band_gap_alpha:
    case P::band_gap_beta:
    case P::band_gap_coth_amplitude:
    case P::band_gap_coth_temperature:
    case P::x_gap_alpha:
    case P::x_gap_beta:
    case P::x_gap_slope:
    case P::l_gap_alpha:
    case P::l_gap_beta:
    case P::delta_gap_alpha:
    case P::delta_gap_beta:
    case P::lattice_constant_slope:
    case P::relative_lattice_slope:
    case P::relative_c_lattice_slope:
      return true;
    default:
      return false;
  }
}

// The binaries that an alloy is made of.
std::vector<const Binary*> binaries_of(const MaterialTable::Data& data, const Alloy& alloy) {
  std::vector<const Binary*> out;
  for (const Binary& b : data.binaries) {
    if (b.cation < 0) continue;
    if (alloy.fraction[static_cast<std::size_t>(b.cation)] > 0 &&
        alloy.fraction[static_cast<std::size_t>(b.anion)] > 0)
      out.push_back(&b);
  }
  return out;
}

// The records whose two ends both belong to the alloy.
std::vector<const AlloyRecord*> records_of(const MaterialTable::Data& data,
                                           const std::vector<const Binary*>& ends) {
  std::vector<const AlloyRecord*> out;
  for (const AlloyRecord& a : data.alloys) {
    const auto has = [&](int index) {
      return std::find(ends.begin(), ends.end(), &data.binaries[static_cast<std::size_t>(index)]) !=
             ends.end();
    };
    if (has(a.from) && has(a.to)) out.push_back(&a);
  }
  return out;
}

std::string lowest_trust(std::string_view one, std::string_view other) {
  if (one == "low" || other == "low") return "low";
  return one.empty() ? std::string(other) : std::string(one);
}

std::string number(double value) {
  return fmt::format("{:.6g}", value);
}

std::string in_words(const Bow& bow, std::string_view unit) {
  std::string text = number(bow.c[0]);
  if (bow.difference) text += " x";
  for (int k = 1; k < 3; ++k)
    if (bow.c[k] != 0)
      text += fmt::format(
          " {} {} x{}", bow.c[k] < 0 ? "-" : "+", number(std::abs(bow.c[k])),
          k + (bow.difference ? 1 : 0) == 1 ? "" : fmt::format("^{}", k + (bow.difference ? 1 : 0)));
  return text + (unit.empty() ? "" : fmt::format(" {}", unit));
}

}  // namespace

std::vector<ResolvedValue> MaterialTable::explain(const Alloy& alloy, const Environment& environment) const {
  std::vector<ResolvedValue> out;
  const Values v = values_of(*data_, alloy, environment.temperature);
  const auto ends = binaries_of(*data_, alloy);
  const auto records = records_of(*data_, ends);
  const auto overrides = data_->overrides_of(alloy);
  const auto add = [&](std::string key, double value, std::string_view unit, std::string source) {
    ResolvedValue r;
    r.key = std::move(key);
    r.value = value;
    r.unit = unit;
    r.source = std::move(source);
    out.push_back(std::move(r));
    return &out.back();
  };
  const BandParameters b = resolve(alloy, environment);
  const std::string computed =
      environment.strain ? "from the values below, strained to the substrate" : "from the values below";
  if (std::isfinite(b.conduction_band_edge)) {
    const std::string_view scale = edge_is_final(alloy) ? "given in the study" : std::string_view(computed);
    add("conduction_band_edge", b.conduction_band_edge, "eV", std::string(scale));
    add("heavy_hole_band_edge", b.heavy_hole_edge, "eV", computed);
    add("light_hole_band_edge", b.light_hole_edge, "eV", computed);
    add("split_off_band_edge", b.split_off_edge, "eV", computed);
  }
  for (int k = 0; k < parameter_count; ++k) {
    const P p = static_cast<P>(k);
    const auto i = static_cast<std::size_t>(k);
    if (!std::isfinite(v[i]) || (is_law(p) && ends.size() != 1)) continue;
    const ParameterInfo& info = parameter_table[i];
    if (alloy.is_medium()) {
      add(std::string(info.key), v[i], info.unit, "given in the study");
      continue;
    }
    ResolvedValue* r = add(std::string(info.key), v[i], info.unit, "");
    bool overridden = false;
    for (const Override* o : overrides)
      for (const auto& [which, value] : o->values) overridden = overridden || which == p;
    if (overridden) {
      r->source = "override in the study";
      continue;
    }
    if (ends.size() == 1) {
      const Origin& origin = ends[0]->origins[i];
      r->source = data_->source_text(origin.source);
      r->recalled = origin.recalled;
      r->trust = origin.trust;
      r->range = origin.range;
      r->note = origin.note;
      continue;
    }
    std::string names, sources, bowings;
    for (const Binary* end : ends) {
      const Origin& origin = end->origins[i];
      names += (names.empty() ? "" : ", ") + std::string(end->name);
      const std::string text = data_->source_text(origin.source);
      if (sources.find(text) == std::string::npos) sources += (sources.empty() ? "" : "; ") + text;
      r->recalled = r->recalled || origin.recalled;
      r->trust = lowest_trust(r->trust, origin.trust);
    }
    for (const AlloyRecord* record : records) {
      const Bow& bow = record->bow[i];
      if (!bow.known) continue;
      bowings += fmt::format(", {} {} {} ({}{})", record->name, bow.difference ? "difference" : "bowing",
                             in_words(bow, info.unit), data_->source_text(bow.origin.source),
                             bow.origin.recalled ? ", recalled" : "");
      if (!bow.origin.note.empty()) r->note += (r->note.empty() ? "" : "; ") + std::string(bow.origin.note);
      r->range = record->range;
      r->trust = lowest_trust(r->trust, bow.origin.trust);
    }
    r->source = fmt::format("interpolated between {}{}; ends: {}", names, bowings, sources);
  }
  return out;
}

void MaterialTable::warn(const Alloy& alloy, const Environment& environment, Notes& notes) const {
  if (alloy.is_medium()) return;
  const auto ends = binaries_of(*data_, alloy);
  const Values v = values_of(*data_, alloy, environment.temperature);
  if (environment.temperature > hottest)
    notes.warn(
        fmt::format("at {:g} K the laws of gap and lattice constant reach far beyond the measurements they "
                    "are fitted to",
                    environment.temperature));
  if (structure_of_alloy(*data_, alloy) == Structure::zinc_blende) {
    const double gamma = at(v, P::band_gap), x = at(v, P::x_gap), l = at(v, P::l_gap);
    const double lowest = std::fmin(x, l);
    if (lowest < gamma)
      notes.warn(
          fmt::format("{}: the {} valley lies {:.0f} meV below Gamma at {:g} K; electrons there are left out",
                      alloy.text, x < l ? "X" : "L", 1e3 * (gamma - lowest), environment.temperature));
  }
  for (std::size_t i = 0; i < ends.size(); ++i)
    for (std::size_t j = 0; j < i; ++j) {
      const Binary &one = *ends[i], &other = *ends[j];
      if ((one.cation == other.cation) == (one.anion == other.anion) && one.structure != Structure::diamond)
        continue;
      const bool known = std::any_of(data_->alloys.begin(), data_->alloys.end(), [&](const AlloyRecord& a) {
        const Binary *from = &data_->binaries[static_cast<std::size_t>(a.from)],
                     *to = &data_->binaries[static_cast<std::size_t>(a.to)];
        return (from == &one && to == &other) || (from == &other && to == &one);
      });
      if (!known)
        notes.warn(
            fmt::format("{}: no bowing is tabled between {} and {}; their values are interpolated linearly",
                        alloy.text, other.name, one.name));
    }
  // What decides band edges and masses, where its source is trusted little.
  std::string doubtful;
  const auto doubt = [&](std::string_view owner, P p, const Origin& origin) {
    if (origin.trust == "low")
      doubtful += fmt::format("{}{} of {}", doubtful.empty() ? "" : ", ",
                              parameter_table[static_cast<std::size_t>(p)].key, owner);
  };
  for (const P p : {P::band_gap, P::valence_band_offset, P::electron_mass, P::spin_orbit_splitting,
                    P::deformation_a1, P::deformation_d1}) {
    const bool of_strain = p == P::deformation_a1 || p == P::deformation_d1;
    if (of_strain && !environment.strain) continue;
    for (const Binary* end : ends) doubt(end->name, p, end->origins[static_cast<std::size_t>(p)]);
    for (const AlloyRecord* record : records_of(*data_, ends))
      if (record->bow[static_cast<std::size_t>(p)].known)
        doubt(record->name, p, record->bow[static_cast<std::size_t>(p)].origin);
  }
  if (!doubtful.empty()) notes.warn(fmt::format("{}: values of low trust enter: {}", alloy.text, doubtful));
}

ResolvedValue MaterialTable::standard_error(std::string_view quantity_class) const {
  ResolvedValue r;
  r.key = quantity_class;
  r.value = std::nan("");
  for (const RawError& e : data_->errors)
    if (e.quantity_class == quantity_class) {
      r.value = e.value;
      r.unit = e.unit;
      r.source = e.source;
    }
  return r;
}

std::string MaterialTable::used_entries(const std::vector<Alloy>& alloys) const {
  std::vector<const Binary*> used;
  std::string out;
  for (const Alloy& alloy : alloys)
    for (const Binary* b : binaries_of(*data_, alloy))
      if (std::find(used.begin(), used.end(), b) == used.end()) used.push_back(b);
  const auto quoted = [](std::string_view text) {
    std::string safe = "\"";
    for (const char c : text) safe += c == '"' ? '\'' : c;
    return safe + '"';
  };
  const auto entry = [&](const ParameterInfo& info, const std::string& value, const Origin& origin) {
    out += fmt::format("      {}: {{value: {}, source: {}{}{}}}\n", info.key, value,
                       quoted(data_->source_text(origin.source)), origin.recalled ? ", recalled: on" : "",
                       origin.trust.empty() ? "" : fmt::format(", trust: {}", origin.trust));
  };
  const auto with_unit = [](double value, std::string_view unit) {
    return fmt::format("{:.10g}{}{}", value, unit.empty() ? "" : " ", unit);
  };
  if (!used.empty()) out += "binaries:\n";
  for (const Binary* b : used) {
    out += fmt::format("  {}:\n    values:\n", b->name);
    for (std::size_t k = 0; k < parameter_table.size(); ++k)
      if (std::isfinite(b->values[k]))
        entry(parameter_table[k], with_unit(b->values[k], parameter_table[k].unit), b->origins[k]);
  }
  const auto records = records_of(*data_, used);
  if (!records.empty()) out += "alloys:\n";
  for (const AlloyRecord* record : records) {
    out += fmt::format("  {}:\n    bowing:\n", record->name);
    for (std::size_t k = 0; k < parameter_table.size(); ++k)
      if (record->bow[k].known) {
        const Bow& bow = record->bow[k];
        const auto& unit = parameter_table[k].unit;
        std::string value = with_unit(bow.c[0], unit);
        if (bow.c[1] != 0 || bow.c[2] != 0)
          value = fmt::format("[{}, {}, {}]", value, with_unit(bow.c[1], unit), with_unit(bow.c[2], unit));
        entry(parameter_table[k], value, bow.origin);
      }
  }
  if (!data_->variants.empty()) {
    out += "variants:\n";
    for (const auto& [material, variant] : data_->variants)
      out += fmt::format("  {}: {}\n", material, variant);
  }
  if (!data_->overrides.empty()) {
    out += "overrides:\n";
    for (const Override& o : data_->overrides) {
      out += fmt::format("  {}:\n", o.name);
      if (o.conduction_band_edge)
        out += fmt::format("    conduction_band_edge: {} eV\n", *o.conduction_band_edge);
      for (const auto& [p, value] : o.values) {
        const ParameterInfo& info = parameter_table[static_cast<std::size_t>(p)];
        out += fmt::format("    {}: {}\n", info.key, with_unit(value, info.unit));
      }
    }
  }
  return out;
}

}  // namespace wellwright
