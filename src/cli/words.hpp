// SPDX-License-Identifier: Apache-2.0
// The words of the command line: each command and option declared once, for the parser, the help texts and
// the candidates offered after a slip.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace wellwright::cli {

struct OptionWords {
  std::string flags;     ///< "-o, --output"
  std::string argument;  ///< "FILE"; empty for a switch
  std::string sentence;
  bool listed = true;          ///< shown in the help text of the command
  std::string elsewhere = {};  ///< why this command refuses it, where another command has it
};

struct CommandWords {
  std::string name;
  std::string operand;  ///< "STUDY.yaml"
  bool operand_needed = true;
  std::string sentence;     ///< for the list of commands
  std::string description;  ///< for its own help
  std::vector<OptionWords> options;
  std::vector<std::string> examples;
};

/// The commands in the order of the help text.
const std::vector<CommandWords>& command_words();
const CommandWords* find_command(std::string_view name);

/// A command or an option that a later step brings, with what it comes with.
struct LaterWords {
  std::string name, comes_with;
};
const std::vector<LaterWords>& later_words();

/// The help text of a command, or of the program for "".
std::string help_text(std::string_view command);

}  // namespace wellwright::cli
