// SPDX-License-Identifier: Apache-2.0
// Commands, options and help texts.
#include "cli/words.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "cli/text.hpp"

namespace wellwright::cli {
namespace {

constexpr int help_width = 100;
constexpr int help_indent = 26;

const OptionWords set{"--set", "PATH=VALUE",
                      "change a value of the study, as in --set field=12kV/cm or "
                      "--set \"layers.wide well.thickness=15 nm\"; may be given several times"};
const OptionWords materials{"--materials", "FILE",
                            "read the material table from FILE instead of the built-in one"};
const OptionWords json{"--json", "", "print one JSON object instead of tables"};
const OptionWords quiet{"-q, --quiet", "",
                        "print no tables and no progress; warnings still go to standard error"};
const OptionWords threads{"--threads", "N", "use at most N threads; the answer does not depend on it"};
const OptionWords verbose{"-v, --verbose", "",
                          "say on standard error how long each part took, and list every layer"};
const OptionWords help{"-h, --help", "", "print this text"};

std::vector<CommandWords> make_commands() {
  return {
      {"run",
       "STUDY.yaml",
       true,
       "answer everything a study asks",
       "Computes what the study asks: levels with their certificate, transitions, beats. Prints a summary\n"
       "and writes the result file (HDF5, which netCDF-4 readers open too).",
       {{"-o, --output", "FILE", "the result file; without it, the study's name with .h5, beside the study"},
        set,
        materials,
        {"--csv", "FOLDER", "write levels, transitions and beats as CSV tables into FOLDER too"},
        json,
        quiet,
        threads,
        verbose,
        help},
       {"wellwright run wells.yaml", "wellwright run wells.yaml --set field=12kV/cm -o wells_12.h5"}},
      {"check",
       "STUDY.yaml",
       true,
       "read and resolve a study without computing",
       "Reads the study, resolves its layers and prints the layer table, the values in force with the\n"
       "defaults marked, the strain of the stack and the warnings. Computes and writes nothing.",
       {set, materials, json, quiet, verbose, help},
       {"wellwright check wells.yaml"}},
      {"materials",
       "NAME",
       false,
       "list the material table or show one alloy",
       "Without a name, lists what the table holds. With an alloy such as Al0.3Ga0.7As, prints every value\n"
       "as the program uses it, with its source. With a ternary and --matched-to, prints the composition\n"
       "whose lattice constant is that of the substrate at 300 K.",
       {{"--temperature", "T", "lattice temperature, such as 77K; without it, 300 K"},
        {"--substrate", "NAME", "strain the alloy to this substrate, grown on (001) or (0001)"},
        {"--matched-to", "NAME", "the composition of a ternary that matches this substrate"},
        materials,
        json,
        help},
       {"wellwright materials Al0.3Ga0.7As --temperature 77K",
        "wellwright materials InGaAs --matched-to InP"}},
  };
}

std::string usage_of(const CommandWords& command) {
  return fmt::format("wellwright {} {}{}", command.name,
                     command.operand_needed ? command.operand : "[" + command.operand + "]",
                     command.options.empty() ? "" : " [options]");
}

// "  --set PATH=VALUE       sentence, wrapped under itself"
std::string help_line(const std::string& left, const std::string& sentence) {
  std::string head = "  " + left;
  std::string body = wrapped(sentence, help_width, help_indent, help_indent);
  if (static_cast<int>(head.size()) + 2 > help_indent) return head + "\n" + body;
  return head + body.substr(head.size());
}

}  // namespace

const std::vector<CommandWords>& command_words() {
  static const std::vector<CommandWords> commands = make_commands();
  return commands;
}

const CommandWords* find_command(std::string_view name) {
  const auto& all = command_words();
  const auto found = std::find_if(all.begin(), all.end(), [&](const auto& c) { return c.name == name; });
  return found == all.end() ? nullptr : &*found;
}

const std::vector<LaterWords>& later_words() {
  static const std::vector<LaterWords> later = {{"report", "the report page"}, {"--fresh", "planning"}};
  return later;
}

std::string help_text(std::string_view name) {
  std::string text;
  if (const CommandWords* command = find_command(name)) {
    text = fmt::format("Usage: {}\n\n{}\n\nOptions:\n", usage_of(*command), command->description);
    for (const auto& option : command->options)
      text +=
          help_line(option.flags + (option.argument.empty() ? "" : " " + option.argument), option.sentence);
    text += "\nExamples:\n";
    for (const auto& example : command->examples) text += "  " + example + "\n";
    return text;
  }
  text =
      "wellwright: subbands, light and quantum beats of semiconductor layer stacks\n\n"
      "Usage: wellwright COMMAND ...\n\nCommands:\n";
  for (const auto& command : command_words())
    text += help_line(fmt::format("{} {}", command.name,
                                  command.operand_needed ? command.operand : "[" + command.operand + "]"),
                      command.sentence);
  text += "\nOptions:\n";
  text += help_line("--version", "print the version");
  text += help_line("-h, --help", "print this text; after a command, the text of that command");
  text +=
      "\nEnds with 0 when all went well, 2 for a mistake in the study or on the command line, 3 when an\n"
      "iteration did not converge, 4 for trouble with a file.\n";
  return text;
}

}  // namespace wellwright::cli
