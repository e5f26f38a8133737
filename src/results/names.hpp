// SPDX-License-Identifier: Apache-2.0
// Names of carriers' groups and words that several files of the room share; private to the room.
#pragma once

#include <string>

#include "wellwright/study.hpp"

namespace wellwright {

/// "levels", "levels_heavy_hole", "levels_light_hole".
inline std::string group_of(const std::string& stem, Carrier carrier) {
  switch (carrier) {
    case Carrier::heavy_hole:
      return stem + "_heavy_hole";
    case Carrier::light_hole:
      return stem + "_light_hole";
    default:
      return stem;
  }
}

inline constexpr std::string_view format_name = "wellwright result";
inline constexpr std::string_view format_version = "1.0";

}  // namespace wellwright
