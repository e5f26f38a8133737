// SPDX-License-Identifier: Apache-2.0
// The units that occur in practice, with their factor to the internal unit; private to the room.
#pragma once

#include <string>
#include <string_view>

#include "wellwright/units.hpp"

namespace wellwright {

struct KnownUnit {
  std::string_view name;  ///< as normalise() spells it
  Dimension dimension;
  double factor;      ///< value [internal unit] = factor * number + offset
  double offset = 0;  ///< temperatures counted from another zero
};

/// Finds a unit in the table; null where it is not there.
const KnownUnit* find_unit(std::string_view normalised);
/// All units of the table.
const KnownUnit* begin_units();
const KnownUnit* end_units();

/// One spelling for each unit: "1/cm^2", "/cm2", "cm-2" and "cm⁻²" become "cm^-2"; µ becomes u, Å angstrom.
std::string normalise(std::string_view unit);

/// The unit through UDUNITS-2, for what the table lacks: the factor and offset to the internal unit of
/// `dimension`. False when the word is no unit or has another dimension; reciprocals count as another.
bool udunits_conversion(const std::string& normalised, Dimension dimension, double& factor, double& offset);
/// Whether UDUNITS-2 knows the word as a unit of anything.
bool is_udunits_unit(const std::string& normalised);

}  // namespace wellwright
