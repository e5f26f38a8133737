// SPDX-License-Identifier: Apache-2.0
// Amplitudes of the levels at t = 0 for each kind of start; private to the room.
#pragma once

#include "wellwright/dynamics.hpp"

namespace wellwright {

/// Amplitudes, normalised, and the part of the start state that the levels hold.
struct Started {
  Eigen::VectorXcd amplitude;
  double captured = 1;
};

/// Throw InputError at `place`.
Started start_packet(const PacketStart& start, const Levels& levels, const Place& place);
Started start_mix(const MixStart& start, const Levels& levels, const Place& place);
Started start_localized(const LocalizedStart& start, const Levels& levels, const Place& place);
Started start_field_step(const FieldStepStart& start, const Study& study, const Levels& levels,
                         const Place& place, Notes& notes);
Started start_photoexcited(const PhotoexcitedStart& start, const Levels& levels, const Levels& holes,
                           const Place& place, Notes& notes);

}  // namespace wellwright
