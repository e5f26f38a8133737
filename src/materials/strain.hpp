// SPDX-License-Identifier: Apache-2.0
// Pseudomorphic strain of an alloy on the substrate; private to the room.
#pragma once

#include "materials/data.hpp"

namespace wellwright {

struct Strain {
  double in_plane = 0, along = 0;
};

/// Strain at the environment's temperature; zero without substrate and for media of the study.
Strain strain_of(const MaterialTable::Data& data, const Alloy& alloy, const Values& values,
                 const Environment& environment);

}  // namespace wellwright
