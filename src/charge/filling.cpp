// SPDX-License-Identifier: Apache-2.0
// Sheet density of one subband with its own dispersion.
//
// N = (1/2 pi) int dx f(E(x)), x = k^2, both spins. By parts N = (1/2 pi) int dE (-df/dE) x(E); the parabola
// that touches x(E) at the bottom is taken in closed form, (c kT/2 pi) ln(1 + exp(eta/kT)), and what is left
// by quadrature. Source: T. Ando, A.B. Fowler, F. Stern, Rev. Mod. Phys. 54, 437 (1982), sec. II.
#include <boost/math/interpolators/barycentric_rational.hpp>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <memory>
#include <numbers>

#include "charge/statistics.hpp"
#include "wellwright/charge.hpp"

namespace wellwright {
namespace {

constexpr double reach = 38;  // in kT: -df/dE is below rounding beyond
constexpr double piece = 2;   // [kT] per quadrature of ten points

// k^2 over the energy above the bottom: smooth, and c at the bottom.
class SquaredMomentum {
 public:
  SquaredMomentum(const Eigen::VectorXd& k, const Eigen::VectorXd& above)
      : last_(above.size() - 1), top_(above[last_]) {
    std::vector<double> energy, ratio;
    for (Eigen::Index i = 1; i <= last_; ++i) {
      energy.push_back(above[i]);
      ratio.push_back(k[i] * k[i] / above[i]);
    }
    ratio_ = std::make_unique<boost::math::barycentric_rational<double>>(
        energy.data(), ratio.data(), energy.size(), std::min<std::size_t>(4, energy.size() - 1));
  }
  double ratio(double E) const { return (*ratio_)(std::min(E, top_)); }
  double at_bottom() const { return ratio(0); }

 private:
  Eigen::Index last_;
  double top_;
  std::unique_ptr<boost::math::barycentric_rational<double>> ratio_;
};

}  // namespace

double log_one_plus_exp(double x) {
  return x > 0 ? x + std::log1p(std::exp(-x)) : std::log1p(std::exp(x));
}

double subband_density(const Eigen::VectorXd& k, const Eigen::VectorXd& above, double filling,
                       double temperature) {
  const SquaredMomentum squared(k, above);
  const double c = squared.at_bottom(), two_pi = 2 * std::numbers::pi;
  const double kT = constants::boltzmann * temperature;
  if (kT <= 0) return filling <= 0 ? 0 : filling * squared.ratio(filling) / two_pi;
  const double bottom = std::max(-filling / kT, -reach);
  double rest = 0;
  const int pieces = bottom < reach ? static_cast<int>(std::ceil((reach - bottom) / piece)) : 0;
  for (int i = 0; i < pieces; ++i) {
    const double from = bottom + (reach - bottom) * i / pieces,
                 to = bottom + (reach - bottom) * (i + 1) / pieces;
    rest += boost::math::quadrature::gauss<double, 10>::integrate(
        [&](double t) {
          const double E = filling + kT * t, cosh = std::cosh(0.5 * t);
          return (squared.ratio(E) - c) * E / (4 * cosh * cosh);
        },
        from, to);
  }
  return (c * kT * log_one_plus_exp(filling / kT) + rest) / two_pi;
}

}  // namespace wellwright
