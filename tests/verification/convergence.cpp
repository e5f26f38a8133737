// SPDX-License-Identifier: Apache-2.0
// Observed order of convergence: halving the elements at degree p lowers the error of a level by 2^(2p).
#include <catch2/catch.hpp>

#include <cstdio>

#include "support/closed_forms.hpp"
#include "support/shooting.hpp"
#include "support/study_builder.hpp"

namespace {

wellwright::Grid equal_elements(const wellwright::Study& study, int per_layer, int degree) {
  std::vector<double> inner;
  for (int i = 1; i < per_layer; ++i) inner.push_back(double(i) / per_layer);
  const auto faces = study.stack.faces();
  return wellwright::make_grid(faces, std::vector<std::vector<double>>(faces.size() - 1, inner), degree);
}

}  // namespace

// Theory: a(u,u) is approximated with h^(2p) for eigenvalues; the Gauss-Lobatto rule keeps that order (C.
// Canuto et al., Spectral Methods (2006), ch. 5 and G. Strang, G. Fix, An Analysis of the Finite Element
// Method (1973), ch. 6).
TEST_CASE("observed order of convergence") {
  const plain::Medium w{0, 0.067, 1.519, 0.341}, b{0.22446, 0.0919, 1.85, 0.32};
  std::printf("%-30s %6s %9s %12s %8s %8s\n", "second level", "degree", "elements", "error [eV]", "order",
              "theory");
  for (const double field : {0.0, 0.004})
    for (int model = 1; model <= 3; ++model) {
      const plain::Stack stack{
          {plain::uniform(b, 8), plain::uniform(w, 8), plain::uniform(b, 8)}, field, model};
      const auto study = plain::study_of(stack, "2");
      const double exact = static_cast<double>(shooting::Shooter(stack).level(1));
      const std::string name = std::string(model == 1   ? "one band"
                                           : model == 2 ? "two bands"
                                                        : "three bands") +
                               (field > 0 ? ", 40 kV/cm" : "");
      for (int degree = 1; degree <= 5; ++degree) {
        double last = 0, order = 0;
        for (int pieces = degree < 3 ? 8 : degree < 5 ? 2 : 1; pieces <= 256; pieces *= 2) {
          const auto E = wellwright::energies_on_grid(study, wellwright::Carrier::electron,
                                                      equal_elements(study, pieces, degree), 2);
          const double error = std::abs(E[1] - exact);
          if (error < 5e-16) break;  // rounding
          if (last > 0) order = std::log2(last / error);
          std::printf("%-30s %6d %9d %12.2e %8.2f %8d\n", degree == 1 && last == 0 ? name.c_str() : "",
                      degree, 3 * pieces, error, order, 2 * degree);
          last = error;
        }
        CAPTURE(name, degree);
        CHECK(order > 2 * degree - 0.2);
        if (degree <= 3) CHECK(order < 2 * degree + 0.1);  // the next term of the error has died out by then
      }
    }
}
