// SPDX-License-Identifier: Apache-2.0
// Levels of hand-made studies, where a test does not look at the notes.
#pragma once

#include "support/hand_made.hpp"
#include "wellwright/levels.hpp"

namespace hand_made {

inline wellwright::Levels solve(const wellwright::Study& study,
                                wellwright::Carrier carrier = wellwright::Carrier::electron) {
  wellwright::Notes notes;
  return wellwright::solve_levels(study, carrier, notes, {});
}

}  // namespace hand_made
