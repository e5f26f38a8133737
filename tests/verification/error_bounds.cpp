// SPDX-License-Identifier: Apache-2.0
// The error estimate against the true error where the potential is not analytic: power-law gradings.
#include <catch2/catch.hpp>

#include <cstdio>

#include "support/shooting.hpp"
#include "support/study_builder.hpp"

TEST_CASE("the error estimate bounds the error on power-law gradings") {
  const plain::Medium well{0, 0.067, 1.519, 0.341}, rim{0.25, 0.092, 1.92, 0.325};
  std::printf("%-16s %6s %12s %12s %12s\n", "power", "bands", "accuracy", "largest error", "its estimate");
  for (const double power : {0.25, 0.5, 0.6, 0.75, 0.9, 1.1, 1.25, 1.5, 1.75, 2.25, 2.5, 3.0, 3.5, 4.75})
    for (int model = 1; model <= 3; ++model) {
      const plain::Stack stack{{plain::uniform(rim, 8), plain::graded(rim, well, power, 11),
                                plain::graded(well, rim, power, 7), plain::uniform(rim, 8)},
                               0.002,
                               model};
      const shooting::Shooter shooter(stack);
      const auto exact = shooter.levels(0, 4);
      for (const char* accuracy : {"1 meV", "1 ueV", "1e-9 eV"}) {
        CAPTURE(power, model, accuracy);
        const auto found = plain::levels_of(stack, "4", accuracy);
        REQUIRE(found.count() == 4);
        double worst = 0, its_estimate = 0;
        for (int n = 0; n < 4; ++n) {
          const double error =
              std::abs(static_cast<double>(found.energy[n] - exact[static_cast<std::size_t>(n)]));
          CAPTURE(n, error, found.error_estimate[n]);
          CHECK(error <= found.error_estimate[n]);
          if (error > worst) worst = error, its_estimate = found.error_estimate[n];
        }
        std::printf("%-16g %6d %12s %12.1e %12.1e\n", power, model, accuracy, worst, its_estimate);
      }
    }
}
