// SPDX-License-Identifier: Apache-2.0
// Assumptions and warnings, each once and in order.
#include <algorithm>

#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

void add_once(std::vector<std::string>& list, std::string sentence) {
  if (std::find(list.begin(), list.end(), sentence) == list.end()) list.push_back(std::move(sentence));
}

}  // namespace

void Notes::assume(std::string sentence) {
  add_once(assumptions_, std::move(sentence));
}

void Notes::warn(std::string sentence) {
  add_once(warnings_, std::move(sentence));
}

}  // namespace wellwright
