// SPDX-License-Identifier: Apache-2.0
// Derivatives of levels with respect to thickness, composition and field: Hellmann-Feynman in the full
// product.
//
// dE = psi' (dT/dlambda at fixed E) psi for psi normalised in the full product. With thickness the element
// boundaries of the layer move: stiffness goes with 1/h, the rest with h, and what lies above is shifted by
// dt in the field. The result is the exact derivative of the discrete level. Source: R.P. Feynman, Phys. Rev.
// 56, 340 (1939).
#include <Eigen/Eigenvalues>
#include <limits>

#include "levels/assemble.hpp"
#include "wellwright/levels.hpp"

namespace wellwright {
namespace {

using constants::hbar2_over_2m0;

// Integrals of one pair (i, j) of one group, by element-local node: weights included.
struct Products {
  Eigen::ArrayXd kinetic;    // hbar^2/2m0 1/m psi_i' psi_j'
  Eigen::ArrayXd potential;  // (U - E) psi_i psi_j
  Eigen::ArrayXd psi;        // psi_i psi_j
  Eigen::ArrayXd all;        // psi_i psi_j + chi_i chi_j: how E moves with a rigid shift of all edges
  Eigen::ArrayXXd per_pole;  // hbar^2/2m0 psi_i' psi_j' / (E - v_j)
  Eigen::ArrayXXd pole;      // chi_i chi_j: with the pole's place v_j
  Eigen::ArrayXd a0;         // hbar^2/2m0 psi_i' psi_j'
};

class Forms {
 public:
  Forms(const Study& study, const Levels& levels)
      : levels_(levels),
        grid_(levels.profile.grid),
        at_(levels.profile.at),
        slope_(slope_of(grid_, levels.envelope)),
        derivatives_(study, levels.profile) {}

  Products products(int i, int j) const {
    const Eigen::ArrayXd w = grid_.weight.array();
    const double E = 0.5 * (levels_.energy[i] + levels_.energy[j]);
    Products p;
    p.a0 = hbar2_over_2m0 * w * slope_.col(i).array() * slope_.col(j).array();
    p.psi = w * levels_.envelope.col(i).array() * levels_.envelope.col(j).array();
    p.potential = (at_.edge.array() - E) * p.psi;
    p.all = p.psi;
    const int poles = at_.poles();
    p.per_pole.resize(grid_.rows(), poles);
    p.pole.resize(grid_.rows(), poles);
    p.kinetic = p.a0 * at_.a0.array();
    for (int k = 0; k < poles; ++k) {
      const Eigen::ArrayXd distance = E - at_.v.col(k).array();
      p.per_pole.col(k) = p.a0 / distance;
      p.kinetic += at_.b.col(k).array() * p.per_pole.col(k);
      p.pole.col(k) = at_.b.col(k).array() * p.per_pole.col(k) / distance;
      p.all += p.pole.col(k);
    }
    return p;
  }

  // How the level moves with the coefficients' own change.
  double material(const Products& p, const MaterialDerivative& d) const {
    const Eigen::Index n = d.edge.size(), r = d.first_row;
    double sum = (p.psi.segment(r, n) * d.edge.array()).sum() + (p.a0.segment(r, n) * d.a0.array()).sum();
    for (int k = 0; k < at_.poles(); ++k) {
      sum += (p.per_pole.col(k).segment(r, n) * d.b.col(k).array()).sum();
      sum += (p.pole.col(k).segment(r, n) * d.v.col(k).array()).sum();
    }
    return sum;
  }

  // Derivative with F, all else fixed.
  double field(const Products& p) const {
    const double sign = levels_.profile.carrier == Carrier::electron ? 1 : -1;
    return sign * (p.all * grid_.z.array()).sum();
  }

  // Derivatives with the thickness of each layer, F fixed, without the smearing's share.
  Eigen::VectorXd thickness(const Products& p, int layers) const {
    const double force =
        levels_.profile.carrier == Carrier::electron ? levels_.profile.field : -levels_.profile.field;
    const int n = grid_.degree + 1;
    Eigen::VectorXd bottom = Eigen::VectorXd::Zero(layers), top = bottom, stretch = bottom, inside = bottom,
                    density = bottom;
    for (int e = 0, last = -1; e < grid_.elements(); ++e) {
      const int layer = grid_.layer[static_cast<std::size_t>(e)];
      if (layer != last) bottom[layer] = grid_.boundaries[static_cast<std::size_t>(e)];
      last = layer;
      top[layer] = grid_.boundaries[static_cast<std::size_t>(e) + 1];
      stretch[layer] += (p.potential - p.kinetic).segment(e * n, n).sum();
      const auto all = p.all.segment(e * n, n);
      density[layer] += all.sum();
      inside[layer] += (all * (grid_.z.array().segment(e * n, n) - bottom[layer])).sum();
    }
    Eigen::VectorXd out(layers);
    double above = 0;
    for (int layer = layers - 1; layer >= 0; --layer) {
      out[layer] = (stretch[layer] + force * inside[layer]) / (top[layer] - bottom[layer]) + force * above;
      above += density[layer];
    }
    return out;
  }

  ProfileDerivatives& derivatives() { return derivatives_; }

 private:
  const Levels& levels_;
  const Grid& grid_;
  const Coefficients& at_;
  Eigen::MatrixXd slope_;
  ProfileDerivatives derivatives_;
};

// The derivative with the composition that a layer's address means: its own, or of both ends of a grading
// that have one.
bool has_composition(const Layer& layer) {
  return layer.material.first >= 0 && !layer.material.is_medium();
}

// Derivatives of the members of a group: eigenvalues of the derivative matrix, or the number itself.
class GroupDerivative {
 public:
  explicit GroupDerivative(int size) : matrix_(size, size) {}
  double& operator()(int i, int j) { return matrix_(i, j); }
  Eigen::VectorXd values() const {
    if (matrix_.rows() == 1) return matrix_.diagonal();
    return Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd>(matrix_, Eigen::EigenvaluesOnly).eigenvalues();
  }

 private:
  Eigen::MatrixXd matrix_;
};

}  // namespace

Sensitivity sensitivity(const Study& study, const Levels& levels,
                        const std::vector<std::pair<int, int>>& transitions) {
  const int n = levels.count(), layers = static_cast<int>(study.stack.layers.size());
  Forms forms(study, levels);
  Sensitivity s;
  s.thickness.setZero(n, layers);
  s.composition.setConstant(n, layers, std::numeric_limits<double>::quiet_NaN());
  s.field.resize(n);
  const double length = study.stack.length();
  const bool by_bias = study.bias.has_value();
  const bool smeared = study.stack.interdiffusion > 0;

  std::vector<MaterialDerivative> by_composition(static_cast<std::size_t>(layers)),
      by_thickness(static_cast<std::size_t>(layers));
  for (int layer = 0; n > 0 && layer < layers; ++layer) {
    const auto at = static_cast<std::size_t>(layer);
    if (has_composition(study.stack.layers[at]))
      by_composition[at] = forms.derivatives().composition(layer, false);
    if (smeared) by_thickness[at] = forms.derivatives().thickness(layer);
  }

  for (int i = 0; i < n;) {
    int end = i + 1;
    while (end < n &&
           levels.group[static_cast<std::size_t>(end)] == levels.group[static_cast<std::size_t>(i)])
      ++end;
    const int size = end - i;
    GroupDerivative field(size);
    std::vector<GroupDerivative> thickness(static_cast<std::size_t>(layers), GroupDerivative(size)),
        composition(static_cast<std::size_t>(layers), GroupDerivative(size));
    for (int a = 0; a < size; ++a)
      for (int b = 0; b <= a; ++b) {
        const Products p = forms.products(i + a, i + b);
        const double dF = forms.field(p);
        field(a, b) = field(b, a) = dF;
        const Eigen::VectorXd geometry = forms.thickness(p, layers);
        for (int layer = 0; layer < layers; ++layer) {
          const auto at = static_cast<std::size_t>(layer);
          double dt = geometry[layer];
          if (smeared) dt += forms.material(p, by_thickness[at]);
          if (by_bias) dt -= dF * study.field / length;  // F = -bias / length
          thickness[at](a, b) = thickness[at](b, a) = dt;
          if (has_composition(study.stack.layers[at]))
            composition[at](a, b) = composition[at](b, a) = forms.material(p, by_composition[at]);
        }
      }
    s.field.segment(i, size) = field.values();
    for (int layer = 0; layer < layers; ++layer) {
      const auto at = static_cast<std::size_t>(layer);
      s.thickness.col(layer).segment(i, size) = thickness[at].values();
      if (has_composition(study.stack.layers[at]))
        s.composition.col(layer).segment(i, size) = composition[at].values();
    }
    i = end;
  }

  const auto count = static_cast<Eigen::Index>(transitions.size());
  s.transitions = transitions;
  s.transition_thickness.resize(count, layers);
  s.transition_composition.resize(count, layers);
  s.transition_field.resize(count);
  for (Eigen::Index t = 0; t < count; ++t) {
    const int initial = transitions[static_cast<std::size_t>(t)].first - 1;
    const int final = transitions[static_cast<std::size_t>(t)].second - 1;
    s.transition_thickness.row(t) = s.thickness.row(final) - s.thickness.row(initial);
    s.transition_composition.row(t) = s.composition.row(final) - s.composition.row(initial);
    s.transition_field[t] = s.field[final] - s.field[initial];
  }
  return s;
}

}  // namespace wellwright
