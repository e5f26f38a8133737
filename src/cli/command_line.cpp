// SPDX-License-Identifier: Apache-2.0
// Reading the command line; every refusal in our own words, with the nearest candidates.
#include "cli/command_line.hpp"

#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <algorithm>

#include "cli/words.hpp"
#include "wellwright/diagnostics.hpp"

namespace wellwright::cli {
namespace {

[[noreturn]] void refuse(const std::string& command, const std::string& sentence, const std::string& hint) {
  std::string text = "wellwright" + (command.empty() ? "" : " " + command) + ": " + sentence + "\n";
  if (!hint.empty()) text += "  " + hint + "\n";
  throw UsageError(text);
}

// "-o, --output" -> {"-o", "--output"}
std::vector<std::string> spellings(const std::string& flags) {
  const auto comma = flags.find(", ");
  if (comma == std::string::npos) return {flags};
  return {flags.substr(0, comma), flags.substr(comma + 2)};
}

[[noreturn]] void refuse_command(const std::string& word) {
  for (const auto& later : later_words())
    if (later.name == word)
      refuse("", fmt::format("`{}` is not built yet: it comes with {}", word, later.comes_with), "");
  std::vector<std::string> names;
  for (const auto& command : command_words()) names.push_back(command.name);
  if (word.ends_with(".yaml") || word.ends_with(".yml"))
    refuse("", fmt::format("`{}` is no command", word),
           fmt::format("to answer that study: wellwright run {}", word));
  const auto near = nearest(word, names);
  refuse("", fmt::format("there is no command `{}`", word),
         near.empty() ? "the commands are " + listed(names) + "; wellwright --help says more"
                      : did_you_mean(near));
}

[[noreturn]] void refuse_option(const CommandWords& command, const std::string& word) {
  const std::string flag = word.substr(0, word.find('='));
  for (const auto& later : later_words())
    if (later.name == flag)
      refuse(command.name, fmt::format("`{}` is not built yet: it comes with {}", flag, later.comes_with),
             "");
  std::vector<std::string> known, others;
  for (const auto& option : command.options)
    for (const auto& spelling : spellings(option.flags)) known.push_back(spelling);
  for (const auto& other : command_words())
    for (const auto& option : other.options)
      for (const auto& spelling : spellings(option.flags))
        if (spelling == flag)
          refuse(command.name, fmt::format("`{}` has no option `{}`", command.name, flag),
                 fmt::format("it belongs to `wellwright {}`", other.name));
  const auto near = nearest(flag, known);
  refuse(command.name, fmt::format("there is no option `{}`", flag),
         near.empty() ? fmt::format("wellwright {} --help lists the options", command.name)
                      : did_you_mean(near));
}

// What stands behind each option of a command.
void bind(CLI::App& app, const OptionWords& words, Request& request) {
  const auto flags = spellings(words.flags);
  std::string joined = flags.front();
  if (flags.size() > 1) joined += "," + flags.back();
  const std::string& name = flags.back();
  const std::pair<const char*, std::string*> texts[] = {{"--output", &request.output},
                                                        {"--materials", &request.materials},
                                                        {"--csv", &request.csv},
                                                        {"--temperature", &request.temperature},
                                                        {"--substrate", &request.substrate},
                                                        {"--matched-to", &request.matched_to}};
  const std::pair<const char*, bool*> switches[] = {{"--json", &request.json},
                                                    {"--quiet", &request.quiet},
                                                    {"--verbose", &request.verbose},
                                                    {"--help", &request.help}};
  for (const auto& [flag, target] : texts)
    if (name == flag)
      app.add_option(joined, *target)->check([](const std::string& value) {
        return value.empty() ? std::string("missing") : std::string();
      });
  for (const auto& [flag, target] : switches)
    if (name == flag) app.add_flag(joined, *target);
  if (name == "--set") app.add_option(joined, request.settings)->allow_extra_args(false);
  if (name == "--threads") app.add_option(joined, request.threads);
}

// An option other than --set that stands twice; the parser would only say that something does not match.
std::string given_twice(const CommandWords& command, int argc, const char* const* argv) {
  for (const auto& option : command.options) {
    int times = 0;
    const auto flags = spellings(option.flags);
    for (int i = 2; i < argc && std::string_view(argv[i]) != "--"; ++i) {
      const std::string_view word = std::string_view(argv[i]).substr(0, std::string_view(argv[i]).find('='));
      if (std::find(flags.begin(), flags.end(), word) != flags.end()) ++times;
    }
    if (times > 1 && option.flags != "--set") return flags.back();
  }
  return "";
}

void check(const Request& request, const CommandWords& command, const std::vector<std::string>& operands) {
  if (operands.size() > 1)
    refuse(command.name,
           fmt::format("one {} is taken at a time, not {}", command.name == "materials" ? "alloy" : "study",
                       operands.size()),
           fmt::format("`{}` came after `{}`", operands[1], operands[0]));
  if (operands.empty() && command.operand_needed)
    refuse(command.name, "no study is named", fmt::format("for example: {}", command.examples.front()));
  if (request.threads < 0 || request.threads > 4096)
    refuse(command.name, fmt::format("`--threads {}` is no number of threads", request.threads),
           "from 1 to 4096; 0 takes as many as there are processors");
  if (request.json && request.quiet)
    refuse(command.name, "`--json` and `--quiet` contradict each other", "keep one of them");
  if (command.name == "materials" && operands.empty())
    for (const auto& [flag, text] : {std::pair{"--temperature", &request.temperature},
                                     {"--substrate", &request.substrate},
                                     {"--matched-to", &request.matched_to}})
      if (!text->empty())
        refuse(command.name, fmt::format("`{}` needs the name of an alloy", flag),
               fmt::format("for example: {}",
                           command.examples[std::string_view(flag) == "--matched-to" ? 1 : 0]));
}

}  // namespace

Request read_command_line(int argc, const char* const* argv) {
  Request request;
  if (argc < 2) {
    request.help = true;
    return request;
  }
  const std::string first = argv[1];
  if (first == "--version" || first == "--help" || first == "-h" || first == "help") {
    (first == "--version" ? request.version : request.help) = true;
    if (first == "help" && argc > 2) {
      request.command = argv[2];
      if (!find_command(request.command)) refuse_command(request.command);
    } else if (argc > 2) {
      refuse("", fmt::format("`{}` stands after `{}`", argv[2], first), "put the command first");
    }
    return request;
  }
  if (first.starts_with('-') && first != "-") {
    for (const auto& command : command_words())
      for (const auto& option : command.options)
        for (const auto& spelling : spellings(option.flags))
          if (first.substr(0, first.find('=')) == spelling)
            refuse("", fmt::format("`{}` stands before the command", spelling),
                   fmt::format("put the command first: wellwright {} ...", command.name));
    const auto near = nearest(first, {"--version", "--help"});
    refuse("", fmt::format("there is no option `{}`", first),
           near.empty() ? "wellwright --help says how it is used" : did_you_mean(near));
  }
  const CommandWords* command = find_command(first);
  if (!command) refuse_command(first);
  request.command = first;

  if (const std::string twice = given_twice(*command, argc, argv); !twice.empty())
    refuse(request.command, fmt::format("`{}` is given twice", twice), "keep one of them");
  CLI::App app;
  app.set_help_flag();
  app.allow_extras();
  for (const auto& option : command->options) bind(app, option, request);
  std::vector<std::string> arguments(argv + 2, argv + argc), operands;
  std::reverse(arguments.begin(), arguments.end());  // the parser takes them from the back
  try {
    app.parse(arguments);
  } catch (const CLI::ParseError& trouble) {
    // The library's text begins with the option it is about.
    const std::string what = trouble.what();
    std::string flag = what.substr(0, what.find_first_of(": "));
    for (const auto& option : command->options)
      for (const auto& spelling : spellings(option.flags))
        if (spelling == flag || what.find(spelling + " ") != std::string::npos) {
          if (option.argument.empty())
            refuse(request.command, fmt::format("`{}` takes no value", spelling), "");
          if (trouble.get_name() == "ConversionError")
            refuse(request.command, fmt::format("`{}` wants a whole number", spelling), "");
          refuse(request.command, fmt::format("`{}` wants {} behind it", spelling, option.argument),
                 fmt::format("{}: {}", spelling, option.sentence));
        }
    refuse(request.command, "the command line cannot be read", "wellwright " + request.command + " --help");
  }
  if (request.help) return request;
  bool only_operands = false;
  for (const auto& word : app.remaining()) {
    if (word == "--" && !only_operands) {
      only_operands = true;
      continue;
    }
    if (!only_operands && word.size() > 1 && word.front() == '-') refuse_option(*command, word);
    operands.push_back(word);
  }
  check(request, *command, operands);
  if (!operands.empty()) request.operand = operands.front();
  return request;
}

}  // namespace wellwright::cli
