// SPDX-License-Identifier: Apache-2.0
// 1,500 random stacks: what the certificate says against the full spectrum of a dense matrix.
#include <catch2/catch.hpp>

#include <cstdio>
#include <random>

#include "support/dense_matrix.hpp"
#include "support/shooting.hpp"
#include "support/study_builder.hpp"

namespace {

/// Numbers from a fixed seed, the same on every library.
class Dice {
 public:
  double between(double a, double b) { return a + (b - a) * static_cast<double>(engine_()) / 4294967296.0; }
  int pick(int count) { return static_cast<int>(engine_() % static_cast<std::uint32_t>(count)); }

 private:
  std::mt19937 engine_{1926};
};

plain::Stack random_stack(Dice& dice, bool narrow_gaps) {
  plain::Stack stack;
  stack.bands = 1 + dice.pick(3);
  if (!narrow_gaps && dice.pick(6) == 0) {
    stack.bands = 1;
    stack.carrier = dice.pick(2) == 0 ? plain::Carrier::heavy_hole : plain::Carrier::light_hole;
  }
  if (narrow_gaps) stack.bands = 2 + dice.pick(2);
  const auto medium = [&] {
    plain::Medium m;
    m.edge = dice.pick(3) == 0 ? 0 : dice.between(0, 0.5);
    m.gap = narrow_gaps ? dice.between(0.1, 0.4) : dice.between(0.8, 2.5);
    m.split_off = dice.between(0.02, 0.5);
    m.mass =
        stack.carrier == plain::Carrier::electron ? m.gap * dice.between(0.03, 0.08) : dice.between(0.1, 0.5);
    return m;
  };
  const int layers = 2 + dice.pick(6);
  for (int i = 0; i < layers; ++i) {
    const double thickness = dice.pick(5) == 0 ? dice.between(0.3, 1) : dice.between(1, 11);
    if (dice.pick(6) == 0)
      stack.layers.push_back(plain::graded(medium(), medium(), 1 + dice.pick(2), thickness));
    else
      stack.layers.push_back(plain::uniform(medium(), thickness));
  }
  double lowest = 1e300;  // holes count from the highest valence edge: the lowest edge is their zero
  for (const auto& layer : stack.layers) lowest = std::min({lowest, layer.medium.edge, layer.top.edge});
  for (auto& layer : stack.layers) layer.medium.edge -= lowest, layer.top.edge -= lowest;
  if (dice.pick(3) != 0) stack.field = dice.between(-0.01, 0.01) * (narrow_gaps ? 3 : 1);
  return stack;
}

}  // namespace

TEST_CASE("the certificate never disagrees with a dense solve") {
  Dice dice;
  int certified = 0, narrow = 0, energies = 0;
  double largest = 0;
  constexpr int stacks = 1500;
  for (int i = 0; i < stacks; ++i) {
    const bool narrow_gaps = i % 15 == 14;
    const plain::Stack stack = random_stack(dice, narrow_gaps);
    std::string request = std::to_string(1 + dice.pick(7));
    if (dice.pick(narrow_gaps ? 2 : 4) == 0) {
      const double above = dice.between(0, 0.3);
      request = "{above: " + plain::digits(above) +
                " eV, below: " + plain::digits(above + dice.between(0.05, 0.3)) + " eV}";
    }
    CAPTURE(i, stack.bands, request, plain::study_yaml(stack, request, "1 ueV"));
    wellwright::Levels found;
    try {
      found = plain::levels_of(stack, request, "1 ueV");
    } catch (const std::exception& trouble) {
      FAIL_CHECK(trouble.what());
      continue;
    }
    const auto& certificate = found.certificate;
    if (!certificate.certified) {
      CHECK_FALSE(certificate.reason.empty());
      CHECK(narrow_gaps);  // nothing but a pole in the way is a reason here
      continue;
    }
    ++certified;
    const double top =
        std::max(certificate.window_top, found.count() > 0 ? found.energy[found.count() - 1] : 0);
    const auto all = dense::spectrum(stack, top);
    // A certificate speaks of energies above every pole, where all companions count among the eigenvalues
    // below.
    CHECK(certificate.window_bottom > static_cast<double>(shooting::Shooter(stack).highest_pole()));
    const auto levels_below = [&](double E) { return all.below(E) - all.companions; };
    if (narrow_gaps) ++narrow;
    CAPTURE(certificate.window_bottom, certificate.window_top, certificate.count_below,
            found.energy.transpose(), found.error_estimate.transpose());
    const int below = levels_below(certificate.window_bottom),
              inside = levels_below(certificate.window_top) - below;
    CHECK(below == certificate.count_below);
    CHECK(inside == found.count());
    for (int n = 0; n < found.count() && below + n + all.companions < all.energy.size(); ++n) {
      const double error = std::abs(found.energy[n] - all.energy[all.companions + below + n]);
      largest = std::max(largest, error);
      ++energies;
      CHECK(error < 1e-6 + found.error_estimate[n]);
    }
  }
  std::printf(
      "random stacks: %d of %d certified (%d with narrow gaps), %d energies within %.1e eV of the "
      "dense matrix\n",
      certified, stacks, narrow, energies, largest);
  CHECK(certified > stacks * 95 / 100);
}

// A stack on which the Lanczos iteration once gave up.
TEST_CASE("a narrow window between close levels of a wide graded stack") {
  plain::Stack stack{{}, 0.0052786385733634231};
  const auto medium = [](double edge, double mass) { return plain::Medium{edge, mass}; };
  stack.layers = {
      plain::uniform(medium(0, 0.11329759812551661), 0.9578692536335438),
      plain::uniform(medium(0.42216357646975666, 0.040620030553457198), 6.5636389274150133),
      plain::graded(medium(0.2019308137241751, 0.10423664586300624),
                    medium(0.44248913100454956, 0.14044022181990062), 1, 7.9539885455742478),
      plain::uniform(medium(0.37542597763240337, 0.078224881976360003), 10.26715332781896),
      plain::uniform(medium(0.31389265030156821, 0.092670161548304944), 10.191026827320457),
      plain::graded(medium(0, 0.16140586959210923), medium(0, 0.062918528959159073), 2, 6.1477602566592395)};
  const auto found =
      plain::levels_of(stack, "{above: 0.11590511058457195 eV, below: 0.18395903856726364 eV}", "1 ueV");
  CHECK(found.certificate.certified);
  const shooting::Shooter shooter(stack);
  CHECK(found.count() == shooter.count(0.18395903856726364) - shooter.count(0.11590511058457195));
}
