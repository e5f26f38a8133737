// SPDX-License-Identifier: Apache-2.0
// What the energies alone tell of a motion: beats, classical period, revival time; private to the room.
#pragma once

#include "wellwright/dynamics.hpp"

namespace wellwright {

/// Pairs of levels that beat in <z>(t), strongest first.
std::vector<Beat> beats_of(const Levels& levels, const Transitions& transitions,
                           const Eigen::VectorXcd& amplitude);

/// Fills classical_period and revival_time where the levels around the mean one are a ladder.
void find_periods(const Levels& levels, Dynamics& dynamics);

}  // namespace wellwright
