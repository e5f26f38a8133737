// SPDX-License-Identifier: Apache-2.0
// UTF-8 text as the characters and columns a terminal shows; private to the room.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace wellwright {

struct Character {
  std::string text;  ///< as shown: tabs are one blank, control characters a replacement mark
  char32_t code = 0;
  int width = 1;  ///< columns
};

/// The characters of `text`; bytes that are no UTF-8 are shown as the replacement mark.
std::vector<Character> characters_of(std::string_view text);

}  // namespace wellwright
