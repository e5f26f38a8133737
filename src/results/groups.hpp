// SPDX-License-Identifier: Apache-2.0
// The groups of a result file; private to the room.
#pragma once

#include "results/hdf5.hpp"
#include "wellwright/answer.hpp"

namespace wellwright {

inline constexpr double per_cm2 = 1e14;  ///< nm^-2

void write_layers(const hdf5::Group& root, const Answer& answer);
void write_profile(const hdf5::Group& root, const Answer& answer);
void write_charge(const hdf5::Group& root, const Charge& charge);
void write_carrier(const hdf5::Group& root, const CarrierAnswer& part);
void write_interband(const hdf5::Group& root, const Interband& pairs);
void write_dynamics(const hdf5::Group& root, const Levels& levels, const Dynamics& dynamics);

}  // namespace wellwright
