// SPDX-License-Identifier: Apache-2.0
// Profile, operator and factors of one grid, kept together; private to the room.
#pragma once

#include <memory>

#include "levels/pairs.hpp"

namespace wellwright {

/// What was done to the profile before solving, and where the search for levels begins.
struct SearchFloor {
  double energy = 0;        ///< no level is looked for below [eV]
  bool lowered = false;     ///< valence edges that the field lifts into the levels were lowered
  bool broken_gap = false;  ///< the floor is a valence edge above some conduction edge
};

/// One grid's operator. Not movable: the parts point at each other.
struct Operator {
  explicit Operator(Profile whole);
  Operator(const Study& study, Carrier carrier, const Grid& grid, const Potential& potential = {});
  Operator(const Operator&) = delete;
  Operator& operator=(const Operator&) = delete;

  Profile profile;
  SearchFloor floor;
  Hamiltonian hamiltonian;
  Factors factors;
};

}  // namespace wellwright
