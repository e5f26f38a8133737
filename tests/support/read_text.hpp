// SPDX-License-Identifier: Apache-2.0
// A study from text, for tests of the rooms that read it.
#pragma once

#include <string>
#include <vector>

#include "wellwright/study.hpp"

namespace wellwright::tests {

inline Study read_text(const std::string& text, const std::vector<std::string>& settings = {}) {
  static const MaterialTable table;
  Notes notes;
  return read_study(text, "study.yaml", table, settings, notes);
}

}  // namespace wellwright::tests
