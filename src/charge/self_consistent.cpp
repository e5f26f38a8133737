// SPDX-License-Identifier: Apache-2.0
// Levels, their filling and the potential of the charge, made consistent.
//
// Each step solves the levels in the present potential, finds the Fermi level from neutrality with the
// subbands' own dispersion, and then solves Poisson's equation by Newton with a density that follows the
// potential: a level moves by what the potential moves at each place. Source: A. Trellakis, A.T. Galick, A.
// Pacelli, U. Ravaioli, J. Appl. Phys. 81, 7880 (1997).
#include <fmt/format.h>

#include <algorithm>
#include <boost/math/tools/toms748_solve.hpp>
#include <cmath>
#include <memory>

#include "charge/acceleration.hpp"
#include "charge/charge_grid.hpp"
#include "charge/classical.hpp"
#include "charge/modules.hpp"
#include "charge/poisson.hpp"
#include "charge/subbands.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

constexpr int most_steps = 40, most_newton = 60;
constexpr int most_levels = 600;
constexpr double small_share = 1e-10;  // of the charge, in the highest level: more levels hold nothing
constexpr double reach_kT = 28;        // exp(-28) is below small_share
constexpr double finest = 1e-7;        // [eV] change of the levels at which the loop ends

class Loop {
 public:
  Loop(const Study& study, const Progress& progress)
      : study_(study), progress_(progress), T_(study.carrier_temperature), module_of_(modules_of(study)) {
    modules_ = *std::max_element(module_of_.begin(), module_of_.end()) + 1;
    const auto& carriers = study.model.carriers;
    const auto asked = [&](Carrier c) {
      return std::find(carriers.begin(), carriers.end(), c) != carriers.end();
    };
    double acceptors = 0;
    for (const Layer& layer : study.stack.layers) acceptors += layer.acceptors;
    carriers_.push_back(Carrier::electron);
    if (acceptors > 0 || asked(Carrier::heavy_hole) || asked(Carrier::light_hole)) {
      carriers_.push_back(Carrier::heavy_hole);
      carriers_.push_back(Carrier::light_hole);
    }
  }

  Charge run() {
    make_grid_for(8);
    charge_.converged = false;
    const bool moves = study_.model.self_consistent;
    if (moves || has_polarization()) start();
    Eigen::VectorXd last;
    for (int step = 0; step < most_steps; ++step) {
      if (progress_ && !progress_(std::min(0.9, 0.06 * step), "charge")) throw Stopped();
      solve_levels_now();
      find_fermi_levels();
      const Eigen::VectorXd now = charged_levels();
      const double change = last.size() == now.size() ? (now - last).cwiseAbs().maxCoeff() : NAN;
      last = now;
      charge_.history.push_back({change, fermi_[0]});
      if (!moves || change < finest) {
        charge_.converged = true;
        break;
      }
      follow();
    }
    return result();
  }

 private:
  // ---- grid and frame ------------------------------------------------------------------------------------
  void make_grid_for(int levels) {
    grid_ = charge_grid(study_, carriers_, levels);
    const auto faces = study_.stack.faces();
    fixed_ = fixed_charge(study_, grid_);
    permittivity_.resize(grid_.rows());
    mass_.resize(grid_.rows());
    edge_.resize(grid_.rows());
    const int n = grid_.degree + 1;
    for (int row = 0; row < grid_.rows(); ++row) {
      const int number = grid_.layer[static_cast<std::size_t>(row / n)];
      const auto at = static_cast<std::size_t>(number);
      const Layer& of = study_.stack.layers[at];
      const BandParameters bands =
          of.grading ? bands_in_layer(study_.stack, number,
                                      std::clamp((grid_.z[row] - faces[at]) / of.thickness, 0.0, 1.0))
                     : study_.stack.bands[at];
      permittivity_[row] = bands.permittivity;
      mass_[row] = bands.electron_mass;
      edge_[row] = bands.conduction_band_edge + study_.field * grid_.z[row];
    }
    const Model& model = study_.model;
    Hold hold;
    hold.periodic = model.ends == Ends::periodic;
    pinned_ = model.bottom.pinned || model.top.pinned;
    if (pinned_) {  // the frame in which V is zero at one pinned face
      const Eigen::Index end = grid_.rows() - 1;
      const double fermi =
          model.top.pinned ? edge_[end] - *model.top.pinned : edge_[0] - *model.bottom.pinned;
      fermi_.assign(static_cast<std::size_t>(modules_), fermi);
      if (model.top.pinned) hold.top = 0;
      if (model.bottom.pinned) hold.bottom = *model.bottom.pinned + fermi - edge_[0];
    } else if (study_.bias && model.self_consistent) {
      hold.bottom = hold.top = 0;
    }
    poisson_ = std::make_unique<Poisson>(grid_, permittivity_, hold);
    V_ = Eigen::VectorXd::Zero(poisson_->nodes());
    if (hold.bottom) V_[0] = *hold.bottom;
    sources_ = poisson_->load(fixed_.density) + poisson_->load_of_sheets(fixed_.sheet);
    if (fermi_.empty()) fermi_.assign(static_cast<std::size_t>(modules_), edge_.minCoeff());
  }
  bool has_polarization() const { return fixed_.sheet.cwiseAbs().maxCoeff() > 0 || fixed_.polarization != 0; }
  bool neutral() const { return !pinned_; }

  // ---- the start: classical electrons and holes ----------------------------------------------------------
  void start() {
    if (!study_.model.self_consistent) {  // polarization alone, no charge that moves
      poisson_->factor(Eigen::VectorXd::Zero(poisson_->nodes()));
      V_ += poisson_->solve(-poisson_->residual(V_, closed(sources_)));
      return;
    }
    const ClassicalGas gas(study_, grid_, edge_, mass_, carriers_.size() > 1);
    if (neutral()) fermi_.assign(fermi_.size(), gas.neutral_fermi(fixed_.total()));
    newton([&](int row, double shift) { return gas.charge(row, fermi_[0], shift); },
           Eigen::VectorXd::Zero(V_.size()));
  }

  // Fixed charge alone between flat ends: what is left over sits on the top face, outside.
  Eigen::VectorXd closed(Eigen::VectorXd charge) const {
    if (poisson_->floating()) charge[charge.size() - 1] -= charge.sum();
    return charge;
  }

  // ---- levels and filling --------------------------------------------------------------------------------
  void solve_levels_now() {
    const Eigen::VectorXd V = poisson_->scatter(V_);
    std::vector<Subbands> fresh;
    for (std::size_t c = 0; c < carriers_.size(); ++c) {
      Profile profile = make_profile(study_, carriers_[c], grid_);
      add_potential(profile, V, exchange_);
      const Subbands* near = c < bands_.size() ? &bands_[c] : nullptr;
      const int count = near ? near->levels.count() : std::max(6, 2 * modules_);
      fresh.push_back(subbands_of(profile, count, near, reach()));
      fresh.back().module = modules_of_levels(fresh.back().levels, module_of_);
    }
    bands_ = std::move(fresh);
  }
  double reach() const { return 0.05 + reach_kT * constants::boltzmann * T_ + 2 * deepest_; }

  // Charge that moves, of one module [nm^-2].
  double mobile(double fermi, int module) const {
    double sum = 0;
    for (const Subbands& bands : bands_)
      for (int i = 0; i < bands.levels.count(); ++i)
        if (bands.module[static_cast<std::size_t>(i)] == module)
          sum += (bands.electrons() ? -1 : 1) * bands.sheet(i, fermi, T_);
    return sum;
  }
  double fixed_in(int module) const {
    // Bound charge draws carriers only where their charge bends the bands.
    if (modules_ == 1 && study_.model.self_consistent) return fixed_.total();
    double sum = 0;
    for (std::size_t l = 0; l < module_of_.size(); ++l)
      if (module_of_[l] == module) sum += study_.stack.layers[l].donors - study_.stack.layers[l].acceptors;
    return sum;
  }

  void find_fermi_levels() {
    for (;;) {
      for (int module = 0; module < modules_; ++module)
        if (neutral()) fermi_[static_cast<std::size_t>(module)] = neutral_fermi(module);
      bool more = false;
      for (std::size_t c = 0; c < bands_.size(); ++c) {
        if (!holds_enough(bands_[c])) {
          more = true;
          add_levels(c);
        }
      }
      if (!more) break;
    }
    deepest_ = 0;
    for (const Subbands& bands : bands_)
      for (int i = 0; i < bands.levels.count(); ++i)
        deepest_ = std::max(deepest_, bands.filling(i, fermi_of(bands, i)));
  }
  double fermi_of(const Subbands& bands, int level) const {
    return fermi_[static_cast<std::size_t>(bands.module[static_cast<std::size_t>(level)])];
  }

  double neutral_fermi(int module) const {
    const double wanted = fixed_in(module);
    const auto excess = [&](double fermi) { return mobile(fermi, module) + wanted; };
    double lowest = 1e300, highest = -1e300;
    for (const Subbands& bands : bands_)
      for (int i = 0; i < bands.levels.count(); ++i) {
        const double at = bands.electrons() ? bands.levels.energy[i]
                                            : bands.levels.profile.hole_edge - bands.levels.energy[i];
        lowest = std::min(lowest, at);
        highest = std::max(highest, at);
      }
    if (wanted < 0 && bands_.size() == 1)
      throw NotConverged(
          "the fixed charge is negative and no holes are there to balance it; list a hole kind under "
          "`carrier`");
    if (wanted == 0 && bands_.size() == 1) return lowest - 1 - 50 * constants::boltzmann * T_;  // empty
    double low = lowest - 0.5, high = highest + 0.5;
    while (excess(low) < 0) low -= 0.5;
    for (int i = 0; excess(high) > 0; ++i, high += 0.5)
      if (i > 100) throw NotConverged("no Fermi level makes the stack neutral");
    std::uintmax_t steps = 200;
    const auto close = boost::math::tools::eps_tolerance<double>(52);
    const auto root = boost::math::tools::toms748_solve(excess, low, high, close, steps);
    return 0.5 * (root.first + root.second);
  }

  bool holds_enough(const Subbands& bands) const {
    const int last = bands.levels.count() - 1;
    if (last + 1 >= most_levels) return true;
    const double top = *std::max_element(fermi_.begin(), fermi_.end());
    const double fermi = bands.electrons() ? top : *std::min_element(fermi_.begin(), fermi_.end());
    const double filling = bands.filling(last, fermi);
    if (T_ == 0) return filling < 0;
    double total = 0;
    for (int i = 0; i <= last; ++i) total += bands.sheet(i, fermi_of(bands, i), T_);
    return bands.sheet(last, fermi, T_) <= small_share * total || total < 1e-20;
  }
  void add_levels(std::size_t c) {
    const int count =
        std::min(most_levels, bands_[c].levels.count() + std::max(3, bands_[c].levels.count() / 3));
    deepest_ = std::max(deepest_, 0.3);
    bands_[c] = subbands_of(bands_[c].levels.profile, count, nullptr, reach());
    bands_[c].module = modules_of_levels(bands_[c].levels, module_of_);
  }

  // The levels that hold charge, and the Fermi level where it is free to move.
  Eigen::VectorXd charged_levels() const {
    std::vector<double> all;
    for (const Subbands& bands : bands_)
      for (int i = 0; i < bands.levels.count(); ++i)
        if (i == 0 || bands.filling(i, fermi_of(bands, i)) > -8 * constants::boltzmann * T_)
          all.push_back(bands.levels.energy[i]);
    all.push_back(fermi_[0]);
    return Eigen::Map<Eigen::VectorXd>(all.data(), static_cast<Eigen::Index>(all.size()));
  }

  // ---- the potential follows -----------------------------------------------------------------------------
  Eigen::VectorXd density(bool electrons) const {
    Eigen::VectorXd n = Eigen::VectorXd::Zero(grid_.rows());
    for (const Subbands& bands : bands_)
      if (bands.electrons() == electrons)
        for (int i = 0; i < bands.levels.count(); ++i)
          n += bands.sheet(i, fermi_of(bands, i), T_) * bands.density.col(i);
    return n;
  }

  void follow() {
    struct One {
      const Subbands* bands;
      int level;
      double filling, mass, scale;
    };
    std::vector<One> all;
    for (const Subbands& bands : bands_)
      for (int i = 0; i < bands.levels.count(); ++i) {
        const double fermi = fermi_of(bands, i), filling = bands.filling(i, fermi);
        const double mass = bands.levels.in_plane_mass[i];
        const double exact = bands.sheet(i, fermi, T_), plain = parabolic_density(mass, filling, T_).density;
        all.push_back({&bands, i, filling, mass, plain > 0 ? exact / plain : 1});
      }
    const Eigen::VectorXd before = V_;
    newton(
        [&](int row, double shift) {
          double charge = 0, slope = 0;
          for (const One& one : all) {
            const double sign = one.bands->electrons() ? 1 : -1;
            const Parabolic here = parabolic_density(one.mass, one.filling - sign * shift, T_);
            const double share = one.scale * one.bands->density(row, one.level);
            charge -= sign * share * here.density;
            slope += share * here.slope;
          }
          return std::pair(charge, slope);
        },
        before);
    V_ = acceleration_.next(before, V_);
  }

  // Solves Poisson's equation with a charge density that follows V; `at(row, V - reference)` gives charge and
  // its derivative in V [nm^-3], [nm^-3/eV].
  template <class At>
  void newton(At at, const Eigen::VectorXd& reference) {
    const auto state = [&](const Eigen::VectorXd& V, Eigen::VectorXd& response) {
      const Eigen::VectorXd shift = poisson_->scatter(V - reference);
      Eigen::VectorXd charge(grid_.rows()), slope(grid_.rows());
      for (int row = 0; row < grid_.rows(); ++row) {
        const auto [c, s] = at(row, shift[row]);
        charge[row] = c;
        slope[row] = s;
      }
      response = poisson_->load(slope);
      return Eigen::VectorXd(poisson_->load(charge) + sources_);
    };
    Eigen::VectorXd response, charge = state(V_, response);
    double size = poisson_->residual(V_, charge).norm();
    for (int step = 0; step < most_newton; ++step) {
      poisson_->factor(response);
      const Eigen::VectorXd move = poisson_->solve(-poisson_->residual(V_, charge));
      double part = 1;
      for (int half = 0;; ++half) {
        Eigen::VectorXd trial_response;
        const Eigen::VectorXd trial = V_ + part * move, trial_charge = state(trial, trial_response);
        const double trial_size = poisson_->residual(trial, trial_charge).norm();
        if (trial_size < size * (1 - 1e-4 * part) || half == 12) {
          V_ = trial;
          charge = trial_charge;
          response = trial_response;
          size = trial_size;
          break;
        }
        part *= 0.5;
      }
      if (move.cwiseAbs().maxCoeff() * part < 1e-10) break;
    }
    if (poisson_->floating()) V_.array() -= V_[0];
    if (study_.model.exchange_correlation) exchange_ = exchange();
  }

  Eigen::VectorXd exchange() const {
    if (bands_.empty()) return {};
    const Eigen::VectorXd n = density(true);
    Eigen::VectorXd v(n.size());
    for (Eigen::Index row = 0; row < n.size(); ++row)
      v[row] = hedin_lundqvist(n[row], mass_[row], permittivity_[row]).potential;
    return v;
  }

  // ---- the answer ----------------------------------------------------------------------------------------
  Charge result() {
    charge_.grid = grid_;
    const double shift = V_[0];  // the potential is zero at the bottom
    charge_.potential.grid = grid_;
    charge_.potential.energy = poisson_->scatter(V_).array() - shift;
    charge_.potential.exchange_correlation = exchange_;
    if (!study_.model.self_consistent && !has_polarization()) charge_.potential = {};
    for (double& fermi : fermi_) fermi -= shift;
    charge_.fermi_level = fermi_[0];
    charge_.module_fermi_level = fermi_;
    charge_.donor_sheet_density = fixed_.donors;
    charge_.acceptor_sheet_density = fixed_.acceptors;
    for (double& fermi : fermi_) fermi += shift;
    charge_.electron_density = density(true);
    charge_.hole_density = density(false);
    const double bound = study_.model.self_consistent ? fixed_.polarization : 0;
    double balance = fixed_.donors - fixed_.acceptors + bound +
                     grid_.weight.dot(charge_.hole_density - charge_.electron_density);
    if (pinned_) balance = 0;  // the faces hold what is left
    charge_.neutrality =
        fixed_.donors + fixed_.acceptors > 0 ? balance / (fixed_.donors + fixed_.acceptors) : balance;
    for (const Subbands& bands : bands_) {
      Filled filled;
      filled.carrier = bands.levels.profile.carrier;
      filled.temperature = T_;
      filled.widest_k = bands.dispersion.k[bands.dispersion.k.size() - 1];
      const int n = bands.levels.count();
      filled.fermi_level.resize(n);
      filled.sheet_density.resize(n);
      for (int i = 0; i < n; ++i) {
        const double fermi = fermi_of(bands, i);
        filled.fermi_level[i] = bands.own_axis(fermi - shift);
        filled.sheet_density[i] = bands.sheet(i, fermi, T_);
      }
      charge_.filled.push_back(std::move(filled));
    }
    return std::move(charge_);
  }

  const Study& study_;
  const Progress& progress_;
  double T_;
  std::vector<int> module_of_;
  int modules_ = 1;
  std::vector<Carrier> carriers_;
  Grid grid_;
  FixedCharge fixed_;
  Eigen::VectorXd permittivity_, mass_, edge_;  // local nodes
  std::unique_ptr<Poisson> poisson_;
  Eigen::VectorXd V_, sources_;  // global nodes
  Eigen::VectorXd exchange_;     // local nodes
  std::vector<Subbands> bands_;
  std::vector<double> fermi_;  // of each module, on the electron's axis in the frame of V_
  double deepest_ = 0.1;       // [eV] largest filling
  bool pinned_ = false;
  Acceleration acceleration_;
  Charge charge_;
};

}  // namespace

Charge solve_charge(const Study& study, const Progress& progress) {
  return Loop(study, progress).run();
}

}  // namespace wellwright
