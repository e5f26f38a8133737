// SPDX-License-Identifier: Apache-2.0
// The grid of the charge loop; private to the room.
#pragma once

#include <vector>

#include "wellwright/charge.hpp"

namespace wellwright {

/// A grid on which levels of all these carriers, some `levels` of each and what the temperature fills, are
/// resolved.
Grid charge_grid(const Study& study, const std::vector<Carrier>& carriers, int levels);

}  // namespace wellwright
