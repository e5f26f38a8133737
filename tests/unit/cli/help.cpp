// SPDX-License-Identifier: Apache-2.0
// The manual's page of commands holds the help texts as the program prints them.
#include <catch2/catch.hpp>
#include <fstream>
#include <sstream>

#include "cli/words.hpp"

TEST_CASE("docs/reference/commands.md holds every help text") {
  std::ifstream file(PROJECT_ROOT "/docs/reference/commands.md");
  std::stringstream page;
  page << file.rdbuf();
  std::vector<std::string> names{""};
  for (const auto& command : wellwright::cli::command_words()) names.push_back(command.name);
  for (const auto& name : names) {
    CAPTURE(name);
    const std::string text = "```text\n" + wellwright::cli::help_text(name) + "```\n";
    if (page.str().find(text) == std::string::npos)
      FAIL_CHECK("docs/reference/commands.md lacks this text:\n" << text);
  }
}

TEST_CASE("help texts fit 100 columns") {
  for (const char* name : {"", "run", "check", "materials"}) {
    std::istringstream lines(wellwright::cli::help_text(name));
    for (std::string line; std::getline(lines, line);) CHECK(line.size() <= 100);
  }
}
