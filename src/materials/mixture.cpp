// SPDX-License-Identifier: Apache-2.0
// Values of an alloy at a temperature: laws of the ends, then the sum of bowings.
//
// Gap: Varshni E0 - alpha T^2 / (T + beta) (Y.P. Varshni, Physica 34, 149 (1967)), with the exceptions GaP
// Gamma (E0 + A (1 - coth(T0 / T))) and InP X (linear). Alloys of four elements: every pair on a sublattice
// adds its bowing, weighted with the other sublattice (G.P. Donati, R. Kaspar, K.J. Malloy, J. Appl. Phys.
// 94, 5814 (2003)).
#include <cmath>

#include "materials/data.hpp"

namespace wellwright {
namespace {

constexpr double reference_temperature = 300;  // of the lattice constants [K]

double square(double x) {
  return x * x;
}

// A binary's values with gaps and lattice at the temperature.
Values at_temperature(const Binary& b, double T) {
  Values v = b.values;
  if (const double A = at(v, P::band_gap_coth_amplitude); std::isfinite(A)) {
    const double T0 = at(v, P::band_gap_coth_temperature);
    at(v, P::band_gap) += T > 0 ? A * (1 - 1 / std::tanh(T0 / T)) : 0;
  } else {
    at(v, P::band_gap) = gap_at(b.values, P::band_gap, P::band_gap_alpha, P::band_gap_beta, P::count, T);
  }
  at(v, P::x_gap) = gap_at(b.values, P::x_gap, P::x_gap_alpha, P::x_gap_beta, P::x_gap_slope, T);
  at(v, P::l_gap) = gap_at(b.values, P::l_gap, P::l_gap_alpha, P::l_gap_beta, P::count, T);
  at(v, P::delta_gap) = gap_at(b.values, P::delta_gap, P::delta_gap_alpha, P::delta_gap_beta, P::count, T);
  const double warmer = T - reference_temperature;
  if (const double slope = at(v, P::lattice_constant_slope); std::isfinite(slope))
    at(v, P::lattice_constant) += slope * warmer;
  if (const double slope = at(v, P::relative_lattice_slope); std::isfinite(slope))
    at(v, P::lattice_constant) *= 1 + slope * warmer;
  if (const double slope = at(v, P::relative_c_lattice_slope); std::isfinite(slope))
    at(v, P::c_lattice_constant) *= 1 + slope * warmer;
  return v;
}

const Binary* binary_of(const MaterialTable::Data& data, int cation, int anion) {
  for (const Binary& b : data.binaries)
    if (b.cation == cation && b.anion == anion) return &b;
  return nullptr;
}

std::string formula(int cation, int anion) {
  return std::string(element_names[static_cast<std::size_t>(cation)]) +
         std::string(element_names[static_cast<std::size_t>(anion)]);
}

struct End {
  const Binary* binary;
  double share;
  Values values;
};

// The ends of the alloy with their shares; none of them may be missing from the table.
std::vector<End> ends_of(const MaterialTable::Data& data, const Alloy& alloy, double T) {
  std::vector<End> ends;
  const auto& f = alloy.fraction;
  for (int e = 7; e < 9; ++e)
    if (f[static_cast<std::size_t>(e)] != 0)
      if (const Binary* b = binary_of(data, e, e))
        ends.push_back({b, f[static_cast<std::size_t>(e)], at_temperature(*b, T)});
  for (int c = 0; c < 3; ++c)
    for (int a = 3; a < 7; ++a) {
      const double share = f[static_cast<std::size_t>(c)] * f[static_cast<std::size_t>(a)];
      if (share == 0) continue;
      const Binary* b = binary_of(data, c, a);
      if (!b) throw InputError("the material table does not hold " + formula(c, a), Place{});
      ends.push_back({b, share, at_temperature(*b, T)});
    }
  return ends;
}

const AlloyRecord* record_of(const MaterialTable::Data& data, const Binary* one, const Binary* other,
                             bool& turned) {
  for (const AlloyRecord& a : data.alloys) {
    const Binary* from = &data.binaries[static_cast<std::size_t>(a.from)];
    const Binary* to = &data.binaries[static_cast<std::size_t>(a.to)];
    turned = from == other && to == one;
    if (turned || (from == one && to == other)) return &a;
  }
  return nullptr;
}

void add_bowings(const MaterialTable::Data& data, const Alloy& alloy, const std::vector<End>& ends,
                 Values& sum) {
  const auto& f = alloy.fraction;
  for (std::size_t i = 0; i < ends.size(); ++i)
    for (std::size_t j = 0; j < i; ++j) {
      const Binary &one = *ends[i].binary, &other = *ends[j].binary;
      // Two ends bow when they share a sublattice's element (or are both of group IV).
      const bool same_cation = one.cation == other.cation, same_anion = one.anion == other.anion;
      if (one.structure != Structure::diamond && same_cation == same_anion) continue;
      bool turned = false;
      const AlloyRecord* record = record_of(data, &one, &other, turned);
      if (!record) continue;
      const auto varied = [&](const Binary& b) {
        return f[static_cast<std::size_t>(same_cation && one.structure != Structure::diamond ? b.anion
                                                                                             : b.cation)];
      };
      const double from = varied(turned ? other : one), to = varied(turned ? one : other);
      const double kept = one.structure == Structure::diamond ? 1
                          : same_cation                       ? f[static_cast<std::size_t>(one.cation)]
                                                              : f[static_cast<std::size_t>(one.anion)];
      const double both = from + to;
      if (both == 0) continue;
      const Values &from_values = ends[turned ? j : i].values, &to_values = ends[turned ? i : j].values;
      for (int k = 0; k < parameter_count; ++k) {
        const P p = static_cast<P>(k);
        if (record->bow[static_cast<std::size_t>(k)].known && std::isfinite(at(sum, p)))
          at(sum, p) +=
              kept * square(both) * record->excess(p, to / both, at(from_values, p), at(to_values, p));
      }
    }
}

}  // namespace

double gap_at(const Values& v, P gap, P alpha, P beta, P slope, double T) {
  double E = at(v, gap);
  if (std::isfinite(at(v, alpha)) && T > 0) E -= at(v, alpha) * T * T / (T + at(v, beta));
  if (slope != P::count && std::isfinite(at(v, slope))) E -= at(v, slope) * T;
  return E;
}

Values values_of(const MaterialTable::Data& data, const Alloy& alloy, double temperature) {
  Values sum;
  sum.fill(0);
  if (const Override* medium = alloy.is_medium() ? data.medium(alloy.medium) : nullptr) {
    sum.fill(std::nan(""));
    for (const auto& [p, value] : medium->values) at(sum, p) = value;
    return sum;
  }
  const auto ends = ends_of(data, alloy, temperature);
  for (const End& end : ends)
    for (std::size_t k = 0; k < sum.size(); ++k) sum[k] += end.share * end.values[k];
  if (ends.size() > 1) add_bowings(data, alloy, ends, sum);
  for (const Override* o : data.overrides_of(alloy))
    for (const auto& [p, value] : o->values) at(sum, p) = value;
  return sum;
}

Structure structure_of_alloy(const MaterialTable::Data& data, const Alloy& alloy) {
  for (const Binary& b : data.binaries) {
    if (b.cation < 0) continue;
    if (alloy.fraction[static_cast<std::size_t>(b.cation)] != 0 &&
        alloy.fraction[static_cast<std::size_t>(b.anion)] != 0)
      return b.structure;
  }
  return Structure::zinc_blende;
}

}  // namespace wellwright
