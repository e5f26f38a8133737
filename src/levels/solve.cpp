// SPDX-License-Identifier: Apache-2.0
// The study's level request: which levels, on which grid, how good, and none missing.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "levels/assemble.hpp"
#include "levels/operator.hpp"

namespace wellwright {
namespace {

constexpr int first_degree = 5, last_degree = 19, degree_step = 2;
constexpr int most_halvings = 6;
constexpr int most_rows = 4'000'000;
constexpr double slow = 0.5;       // ratio of differences above which elements are halved instead
constexpr double small = 0.5;      // of the accuracy, below which an algebraic tail is accepted
constexpr double far_above = 0.5;  // [eV] above every edge: levels there live everywhere
constexpr double mostly = 0.5;     // probability with which a level lives in the layers asked for
constexpr double eps = std::numeric_limits<double>::epsilon();

/// Levels `first` .. `first + count - 1`, counted from the lowest above the floor, and the neighbours that
/// bound their window: one above, and one below where there is one.
struct Range {
  int first = 0, count = 0;
  int lower() const { return first > 0 ? 1 : 0; }
  int start() const { return first - lower(); }
  int total() const { return count + lower() + 1; }
  bool operator==(const Range&) const = default;
};

class Solver {
 public:
  Solver(const Study& study, Carrier carrier, Notes& notes, const Progress& progress,
         const Potential& potential)
      : study_(study),
        carrier_(carrier),
        notes_(notes),
        progress_(progress),
        potential_(potential),
        request_(study.model.levels) {}

  Levels run() {
    divide();
    for (halvings_ = 0;; ++halvings_) {
      if (auto done = climb()) return std::move(*done);
      if (halvings_ == most_halvings)
        throw NotConverged(fmt::format("the levels of the {} do not settle to {:.3g} eV on the finest grid",
                                       name_of(carrier_), study_.model.accuracy));
      cuts_ = halved(cuts_);
      pairs_ = {};
    }
  }

 private:
  // The first division and the range of levels, on the lowest degree.
  void divide() {
    if (!potential_.empty()) {  // a polynomial on its own elements only
      cuts_ = cuts_of(potential_.grid, study_.stack.faces());
      build(first_degree);
      find_range();
      return;
    }
    double top = request_.below ? *request_.below : guessed_top(study_, carrier_, request_.count.value_or(6));
    for (int attempt = 0; attempt < 4; ++attempt) {
      cuts_ = first_cuts(study_, carrier_, top);
      build(first_degree);
      find_range();
      const double highest = pairs_.energy[pairs_.count() - 1];
      if (highest <= top + 0.25 * (top - op_->profile.at.edge.minCoeff())) return;
      top = highest;
    }
  }

  void build(int degree) {
    const Grid grid = make_grid(study_.stack.faces(), cuts_, degree);
    if (grid.rows() > most_rows) throw NotConverged("the grid that these levels need is too large");
    op_ = std::make_unique<Operator>(study_, carrier_, grid, potential_);
    base_ = op_->floor.broken_gap ? levels_below(op_->factors, op_->floor.energy) : 0;
    if (progress_ &&
        !progress_(std::min(0.9, 0.1 * (degree - first_degree) / degree_step + 0.2 * halvings_), "levels"))
      throw Stopped();
  }

  int below(double E) { return levels_below(op_->factors, E) - base_; }

  Pairs cold(const Range& range) {
    return cold_levels(op_->hamiltonian, op_->factors, base_ + range.start(), range.total(),
                       op_->floor.energy, enough());
  }

  // Residual that does while the grid still changes: its square over the gaps is far below the accuracy.
  double enough() const { return std::min(1e-8, 1e-2 * study_.model.accuracy); }

  // What the request comes to on this grid, groups uncut aside.
  Range requested() {
    if (request_.count) return {0, *request_.count};
    const int bottom = request_.above ? below(std::max(*request_.above, op_->floor.energy)) : 0;
    return {bottom, std::max(0, below(std::max(*request_.below, op_->floor.energy)) - bottom)};
  }

  // Decides the range from the request and leaves its pairs in pairs_.
  void find_range() {
    if (!request_.in_layers.empty()) return find_range_in_layers();
    range_ = asked_ = requested();
    if (range_.count > largest_level_count)
      throw NotConverged(fmt::format("{} levels lie in the window asked for; at most {} are computed",
                                     range_.count, largest_level_count));
    solve_range();
  }

  void solve_range() {
    pairs_ = cold(range_);
    extend();
  }
  void extend() {
    while (widened()) pairs_ = cold(range_);
  }

  // A group closer than the accuracy is never cut.
  bool widened() {
    const auto& E = pairs_.energy;
    const double accuracy = study_.model.accuracy;
    const int low = range_.lower();
    if (range_.count == 0) return false;
    bool wider = false;
    if (E[low + range_.count] - E[low + range_.count - 1] < accuracy) {
      const int more = below(E[low + range_.count - 1] + accuracy) - (range_.first + range_.count);
      range_.count += std::max(1, more);
      wider = true;
    }
    if (low == 1 && E[1] - E[0] < accuracy) {
      --range_.first;
      ++range_.count;
      wider = true;
    }
    return wider;
  }

  bool in_wanted_layer(int layer) const {
    return std::find(request_.in_layers.begin(), request_.in_layers.end(), layer) != request_.in_layers.end();
  }

  double share_in_layers(int pair) const {
    const Grid& grid = op_->profile.grid;
    const Eigen::VectorXd density =
        density_of(op_->hamiltonian, pairs_.energy[pair], pairs_.psi.col(pair)).cwiseProduct(grid.weight);
    double sum = 0;
    for (int e = 0; e < grid.elements(); ++e)
      if (in_wanted_layer(grid.layer[static_cast<std::size_t>(e)]))
        sum += density.segment(e * (grid.degree + 1), grid.degree + 1).sum();
    return sum;
  }

  // Nothing that lives mostly in these layers lies below their lowest edge.
  void find_range_in_layers() {
    const Grid& grid = op_->profile.grid;
    double lowest = std::numeric_limits<double>::infinity();
    for (int e = 0; e < grid.elements(); ++e)
      if (in_wanted_layer(grid.layer[static_cast<std::size_t>(e)]))
        lowest =
            std::min(lowest, op_->profile.at.edge.segment(e * (grid.degree + 1), grid.degree + 1).minCoeff());
    const int wanted = request_.count.value_or(1);
    range_.first = below(std::max(lowest, op_->floor.energy));
    const int up_to_far = below(op_->profile.at.edge.maxCoeff() + far_above) - range_.first;
    const int most = std::clamp(up_to_far, 1, largest_level_count);
    range_.count = std::min(2 * wanted, most);
    for (;;) {
      solve_range();
      int found = 0, last = 0;
      for (int i = 0; i < range_.count && found < wanted; ++i)
        if (share_in_layers(i + range_.lower()) > mostly) {
          ++found;
          last = i;
        }
      if (found == wanted || range_.count >= most) {
        range_.count = found == 0 ? 0 : last + 1;
        solve_range();
        return;
      }
      range_.count = std::min(2 * range_.count, most);
    }
  }

  // Raises the degree on the present elements; empty when the elements must be halved.
  std::optional<Levels> climb() {
    std::vector<Eigen::VectorXd> history;
    for (int degree = first_degree; degree <= last_degree; degree += degree_step) {
      if (degree > first_degree || halvings_ > 0) follow(degree);  // the first is solved by divide()
      history.push_back(pairs_.energy);
      if (history.size() < 3) continue;
      if (history[history.size() - 3].size() != pairs_.energy.size() ||
          history[history.size() - 2].size() != pairs_.energy.size())
        continue;
      const Eigen::VectorXd estimate = estimate_of(history);
      if (!estimate.allFinite()) {
        // Raising the degree no longer helps once the ratio stayed high twice.
        if (degree + degree_step > last_degree || history.size() >= 4) return std::nullopt;
        continue;
      }
      const double noise = noise_of();
      const double worst = range_.count > 0 ? estimate.segment(range_.lower(), range_.count).maxCoeff() : 0;
      if (worst <= std::max(study_.model.accuracy, 4 * noise)) {
        const Range before = range_;
        if (!request_.count && request_.in_layers.empty()) {  // the window on the final grid
          if (requested() == asked_)
            extend();
          else
            find_range();
        }
        if (!(range_ == before)) {
          history = {};
          continue;
        }
        if (!settled()) {  // a level was missed on the way
          pairs_ = cold(range_);
          if (!complete() || ++recoveries_ > 2) return finish(estimate, worst);
          history = {pairs_.energy};
          continue;
        }
        return finish(estimate, worst);
      }
    }
    return std::nullopt;
  }

  double noise_of() const { return 8 * eps * op_->hamiltonian.rounding_norm(); }

  // 2 |dE| / (1 - r) + 8 eps ||A||: the differences of successive degrees fall at least like r^n. Where r >
  // 0.5 they fall like a power of the degree p (a grading that is not analytic at its face): what is left is
  // below p |dE| for every power above one half, and is taken twice that once it is small; infinite before.
  Eigen::VectorXd estimate_of(const std::vector<Eigen::VectorXd>& history) const {
    const std::size_t n = history.size();
    const Eigen::VectorXd last = (history[n - 1] - history[n - 2]).cwiseAbs();
    const Eigen::VectorXd before = (history[n - 2] - history[n - 3]).cwiseAbs();
    const double noise = noise_of(), degree = op_->profile.grid.degree;
    Eigen::VectorXd estimate(last.size());
    for (Eigen::Index i = 0; i < last.size(); ++i) {
      const double r = last[i] / before[i], tail = 2 * degree * last[i] + noise;
      if (last[i] <= noise)
        estimate[i] = 2 * last[i] + noise;
      else if (r <= slow)
        estimate[i] = 2 * last[i] / (1 - r) + noise;
      else
        estimate[i] = tail <= small * study_.model.accuracy ? tail : std::numeric_limits<double>::infinity();
    }
    return estimate;
  }

  // The pairs of the previous grid, carried to another and polished there; cold where that misses one.
  void follow(int degree) {
    const Pairs previous = std::move(pairs_);
    const Grid old_grid = op_->profile.grid;
    build(degree);
    if (previous.count() == range_.total()) {
      pairs_.energy = previous.energy;
      pairs_.psi = raise_degree(old_grid, previous.psi, degree);
      Rayleigh rayleigh(op_->hamiltonian, op_->factors);
      if (rayleigh.polish_all(pairs_, enough())) return;  // counted at the end
    }
    pairs_ = cold(range_);
  }

  // Two counts at mid-gap between the window and its neighbours.
  bool complete() {
    const double bottom = window_bottom(), top = window_top();
    return below(bottom) == range_.first && below(top) == range_.first + range_.count;
  }
  // The same with pairs polished to rounding.
  bool settled() {
    Rayleigh rayleigh(op_->hamiltonian, op_->factors);
    settled_ = settled_ || (rayleigh.polish_all(pairs_) && complete());
    return settled_;
  }
  double window_bottom() const {
    return range_.lower() == 1 ? 0.5 * (pairs_.energy[0] + pairs_.energy[1]) : op_->floor.energy;
  }
  double window_top() const {
    const int last = range_.lower() + range_.count;
    return last == 0 ? 0.5 * (op_->floor.energy + pairs_.energy[0])
                     : 0.5 * (pairs_.energy[last - 1] + pairs_.energy[last]);
  }

  Levels finish(const Eigen::VectorXd& estimate, double worst) {
    const bool is_complete = settled();
    Pairs listed;
    listed.energy = pairs_.energy.segment(range_.lower(), range_.count);
    listed.residual = pairs_.residual.segment(range_.lower(), range_.count);
    listed.psi = pairs_.psi.middleCols(range_.lower(), range_.count);
    Levels levels = assemble(op_->hamiltonian, listed);
    levels.error_estimate = estimate.segment(range_.lower(), range_.count);
    Certificate& certificate = levels.certificate;
    certificate.window_bottom = window_bottom();
    certificate.window_top = window_top();
    certificate.count_below = base_ + range_.first;
    certify(certificate, is_complete, estimate);
    if (worst > study_.model.accuracy)
      notes_.warn(
          fmt::format("the accuracy asked for, {:.1e} eV, is below the rounding of this grid; the {} "
                      "levels are good to {:.1e} eV",
                      study_.model.accuracy, name_of(carrier_), worst));
    if (op_->floor.lowered)
      notes_.warn(
          "the field lifts the valence edge of one end of the stack above conduction edges of the other; "
          "tunnelling between the bands is left out");
    if (op_->floor.broken_gap)
      notes_.warn(
          fmt::format("a valence edge lies above a conduction edge (broken gap); levels below {:.4f} eV "
                      "are not looked for",
                      op_->floor.energy));
    if (!request_.in_layers.empty()) return those_in_layers(levels);
    return levels;
  }

  void certify(Certificate& certificate, bool is_complete, const Eigen::VectorXd& estimate) const {
    const auto gap_is_clear = [&](int upper) {
      return pairs_.energy[upper] - pairs_.energy[upper - 1] > estimate[upper] + estimate[upper - 1];
    };
    const int last = range_.lower() + range_.count;
    if (!is_complete)
      certificate.reason = "the count of levels in the window differs from the levels found";
    else if (last > 0 && !gap_is_clear(last))
      certificate.reason = "the next level above is closer than the error estimates";
    else if (range_.lower() == 1 && range_.count > 0 && !gap_is_clear(1))
      certificate.reason = "the next level below is closer than the error estimates";
    else if (op_->floor.lowered)
      certificate.reason = "valence edges lie above the levels, and tunnelling between the bands is left out";
    certificate.certified = certificate.reason.empty();
  }

  Levels those_in_layers(const Levels& levels) {
    const int wanted = request_.count.value_or(1);
    std::vector<int> indices;
    for (int i = 0; i < levels.count() && static_cast<int>(indices.size()) < wanted; ++i) {
      double share = 0;
      for (const int layer : request_.in_layers) share += levels.layer_probability(i, layer);
      if (share > mostly) indices.push_back(i);
    }
    if (static_cast<int>(indices.size()) < wanted)
      notes_.warn(fmt::format("only {} of the {} levels asked for live mostly in the layers named",
                              indices.size(), wanted));
    return chosen(levels, indices);
  }

  const Study& study_;
  Carrier carrier_;
  Notes& notes_;
  const Progress& progress_;
  const Potential& potential_;
  LevelRequest request_;
  std::vector<std::vector<double>> cuts_;
  std::unique_ptr<Operator> op_;
  Pairs pairs_;
  Range range_, asked_;  // asked_: before groups were kept whole
  int base_ = 0;         // levels below the floor: none, but for a broken gap
  int halvings_ = 0, recoveries_ = 0;
  bool settled_ = false;
};

}  // namespace

Levels solve_levels(const Study& study, Carrier carrier, Notes& notes, const Progress& progress,
                    const Potential& potential) {
  Levels levels = Solver(study, carrier, notes, progress, potential).run();
  if (!potential.empty()) levels.potential = std::make_shared<const Potential>(potential);
  return levels;
}

Levels levels_on_profile(const Profile& profile, int count, const Levels* near) {
  Operator op(profile);
  const int base = op.floor.broken_gap ? levels_below(op.factors, op.floor.energy) : 0;
  Pairs pairs;
  if (near && near->count() == count) {
    pairs.energy = near->energy;
    pairs.psi.resize(op.hamiltonian.nodes(), count);
    for (int i = 0; i < count; ++i) pairs.psi.col(i) = gather(profile.grid, near->envelope.col(i));
    if (profile.ends == Ends::periodic) pairs.psi.row(op.hamiltonian.nodes() - 1) = pairs.psi.row(0);
    Rayleigh rayleigh(op.hamiltonian, op.factors);
    const double above = 1e-9 + 4 * rayleigh.floor();
    if (rayleigh.polish_all(pairs) &&
        levels_below(op.factors, pairs.energy[count - 1] + above) == base + count)
      return assemble(op.hamiltonian, pairs);
  }
  return assemble(op.hamiltonian, cold_levels(op.hamiltonian, op.factors, base, count, op.floor.energy));
}

Eigen::VectorXd energies_on_grid(const Study& study, Carrier carrier, const Grid& grid, int count) {
  Operator op(study, carrier, grid);
  const int base = levels_below(op.factors, op.floor.energy);
  return cold_levels(op.hamiltonian, op.factors, base, count, op.floor.energy).energy;
}

}  // namespace wellwright
