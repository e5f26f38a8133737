// SPDX-License-Identifier: Apache-2.0
// What the command line accepts; its refusals are recorded word by word in tests/words.
#include "cli/command_line.hpp"

#include <catch2/catch.hpp>
#include <initializer_list>

using namespace wellwright::cli;

namespace {

Request read(std::initializer_list<const char*> words) {
  std::vector<const char*> all{"wellwright"};
  all.insert(all.end(), words);
  return read_command_line(static_cast<int>(all.size()), all.data());
}

}  // namespace

TEST_CASE("options stand anywhere after the command") {
  const auto request = read({"run", "-o", "out.h5", "wells.yaml", "--set", "field=12kV/cm", "--csv=tables",
                             "--set", "layers.wide well.thickness=15 nm", "--threads", "2", "-v", "--json"});
  CHECK(request.command == "run");
  CHECK(request.operand == "wells.yaml");
  CHECK(request.output == "out.h5");
  CHECK(request.csv == "tables");
  CHECK(request.settings == std::vector<std::string>{"field=12kV/cm", "layers.wide well.thickness=15 nm"});
  CHECK(request.threads == 2);
  CHECK(request.verbose);
  CHECK(request.json);
  CHECK_FALSE(request.quiet);
}

TEST_CASE("one value follows --set, not two") {
  const auto request = read({"check", "--set", "field=1kV/cm", "wells.yaml"});
  CHECK(request.operand == "wells.yaml");
  CHECK(request.settings.size() == 1);
}

TEST_CASE("values may begin with a minus sign, operands follow --") {
  CHECK(read({"run", "--", "-strange.yaml"}).operand == "-strange.yaml");
  CHECK(read({"run", "a.yaml", "--set", "field=-5 kV/cm"}).settings.front() == "field=-5 kV/cm");
}

TEST_CASE("help and version") {
  CHECK(read({}).help);
  CHECK(read({"--help"}).help);
  CHECK(read({"--version"}).version);
  CHECK(read({"run", "--help"}).command == "run");
  CHECK(read({"help", "check"}).command == "check");
  CHECK(read({"materials"}).operand.empty());
}

TEST_CASE("slips are refused") {
  CHECK_THROWS_AS(read({"runn", "a.yaml"}), UsageError);
  CHECK_THROWS_AS(read({"run"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "b.yaml"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "--thread", "2"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "--threads", "two"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "-o"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "--fresh"}), UsageError);
  CHECK_THROWS_AS(read({"check", "a.yaml", "--csv", "tables"}), UsageError);
  CHECK_THROWS_AS(read({"run", "a.yaml", "--quiet=maybe"}), UsageError);
}
