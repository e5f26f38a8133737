// SPDX-License-Identifier: Apache-2.0
// The chain from a study to its answer, once, for the command, for planning and for tests.
#pragma once

#include <optional>
#include <vector>

#include "wellwright/dynamics.hpp"

namespace wellwright {

/// Everything about one carrier.
struct CarrierAnswer {
  Levels levels;
  Dispersion dispersion;
  std::optional<Minibands> minibands;
  Sensitivity sensitivity;
  Transitions transitions;
  std::optional<Filled> filled;  ///< where the stack holds charge
};

struct Answer {
  Study study;
  EdgeProfile edges;
  std::optional<Charge> charge;         ///< where the stack holds any
  std::vector<CarrierAnswer> carriers;  ///< in the order of model.carriers
  std::vector<Interband> interband;     ///< one a hole kind when electrons are there too
  std::optional<Dynamics> dynamics;     ///< of the first carrier (the electron where there is one)
  Notes notes;                          ///< assumptions and warnings
  bool converged = true;
  std::vector<std::pair<std::string, double>> timings;  ///< [ms], for --verbose

  const CarrierAnswer* find(Carrier carrier) const;
};

/// Answers the study. Throws InputError, NotConverged, Stopped.
Answer answer(const Study& study, Notes notes, const Progress& progress);

}  // namespace wellwright
