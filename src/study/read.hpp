// SPDX-License-Identifier: Apache-2.0
// Readers of the parts of a study; private to the room.
#pragma once

#include "wellwright/study.hpp"

namespace wellwright {

const Declarations& study_declarations();

/// A "path=value" text of --set, taken apart. Throws InputError.
struct Setting {
  std::string path, value;
  Place place;
};
Setting setting_of(const std::string& text);

/// Writes the settings into the tree of the study, as if the file had been edited. Throws InputError.
void apply_settings(Node& root, const std::vector<std::string>& settings, const MaterialTable& table);

/// Reads `model` apart from the keys that make the stack, and checks it against the stack. Throws InputError.
Model read_model(const Node& root, const Stack& stack);

/// Reads `dynamics`. Throws InputError.
DynamicsRequest read_dynamics(const Node& dynamics, const Study& study);

/// Refuses media that lack a value which the study's questions need, and carriers that the material does not
/// allow. Throws InputError.
void check_media(const Node& root, const Study& study);

/// "1st level" stands above the count that the study asks for: throws InputError at the value.
void check_level(const Node& value, int level, const LevelRequest& levels);

}  // namespace wellwright
