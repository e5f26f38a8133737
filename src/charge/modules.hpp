// SPDX-License-Identifier: Apache-2.0
// Which part of a stack is neutral by itself; private to the room.
#pragma once

#include "wellwright/charge.hpp"

namespace wellwright {

/// Module of each layer, 0-based: all 0 in equilibrium; with `per module` the copies of a repeat, and layers
/// outside go with the copy below them.
std::vector<int> modules_of(const Study& study);
/// The module in which each level mostly lives.
std::vector<int> modules_of_levels(const Levels& levels, const std::vector<int>& module_of_layer);

}  // namespace wellwright
