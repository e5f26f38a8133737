// SPDX-License-Identifier: Apache-2.0
// CSV tables: units in the header, the numbers of the answer digit by digit, whole or not at all.
#include <sys/resource.h>
#include <sys/stat.h>

#include <catch2/catch.hpp>
#include <csignal>
#include <nlohmann/json.hpp>
#include <sstream>

#include "small_answer.hpp"
#include "support/scratch_folder.hpp"

using namespace wellwright;
namespace fs = std::filesystem;
using Catch::Matchers::Contains;
using support::bytes_of;
using support::put;
using support::ScratchFolder;

namespace {

using Row = std::vector<std::string>;

// RFC 4180: lines end in CR LF, a field in quotes holds commas, line ends and doubled quotes.
std::vector<Row> parsed(const std::string& text) {
  std::vector<Row> rows(1, Row(1));
  bool quoted = false;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const char c = text[i];
    if (c == '"' && quoted && i + 1 < text.size() && text[i + 1] == '"')
      rows.back().back() += text[++i];
    else if (c == '"')
      quoted = !quoted;
    else if (c == ',' && !quoted)
      rows.back().emplace_back();
    else if (c == '\r' && !quoted) {
      REQUIRE(text[++i] == '\n');
      rows.emplace_back(1);
    } else
      rows.back().back() += c;
  }
  REQUIRE(rows.back() == Row(1));  // the last line ends, too
  rows.pop_back();
  return rows;
}

// Columns of a table that hold a list of JSON objects, each under its own key.
void compare(const std::vector<Row>& rows, const nlohmann::json& list,
             const std::vector<std::pair<std::string, std::string>>& columns) {
  REQUIRE(rows.size() == list.size() + 1);
  REQUIRE(rows[0].size() == columns.size());
  for (std::size_t c = 0; c < columns.size(); ++c) {
    CHECK(rows[0][c] == columns[c].first);
    for (std::size_t i = 0; i < list.size(); ++i) {
      const nlohmann::json& value = list[i].at(columns[c].second);
      const std::string& cell = rows[i + 1].at(c);
      INFO(columns[c].first << ", row " << i + 1 << ": " << cell << " and " << value);
      if (value.is_null())
        CHECK(cell.empty());
      else if (value.is_string())
        CHECK(cell == value.get<std::string>());
      else if (value.is_boolean())
        CHECK(cell == (value.get<bool>() ? "1" : "0"));
      else
        CHECK(std::stod(cell) == value.get<double>());
    }
  }
}

}  // namespace

TEST_CASE("Tables hold the numbers of the answer, each column with its unit") {
  const ScratchFolder folder;
  const Answer a = small_answer("model: {carrier: [electron, heavy hole], levels: 3}\n" + two_levels_move,
                                "well, \"wide\"");
  write_csv(a, folder / "tables");
  const auto json = nlohmann::json::parse(to_json(a));
  REQUIRE(a.carriers.size() == 2);
  for (std::size_t k = 0; k < 2; ++k) {
    const std::string suffix = k == 0 ? "" : "_heavy_hole";
    compare(parsed(bytes_of(folder / "tables/levels" + suffix + ".csv")), json["carriers"][k]["levels"],
            {{"level", "level"},
             {"energy (eV)", "energy_eV"},
             {"error estimate (eV)", "error_estimate_eV"},
             {"mean position (nm)", "mean_position_nm"},
             {"spread (nm)", "spread_nm"},
             {"lives in", "lives_in"},
             {"probability there", "probability_there"},
             {"in-plane mass (m0)", "in_plane_mass_m0"},
             {"conduction fraction", "conduction_fraction"},
             {"bound", "bound"},
             {"group", "group"}});
    compare(parsed(bytes_of(folder / "tables/transitions" + suffix + ".csv")),
            json["carriers"][k]["transitions"],
            {{"initial", "initial"},
             {"final", "final"},
             {"energy (eV)", "energy_eV"},
             {"wavelength (nm)", "wavelength_nm"},
             {"frequency (THz)", "frequency_THz"},
             {"dipole (nm)", "dipole_nm"},
             {"oscillator strength", "oscillator_strength"},
             {"beat period (ps)", "beat_period_ps"}});
    // The JSON object comes from the same room: the first column is held against the answer itself.
    const auto rows = parsed(bytes_of(folder / "tables/levels" + suffix + ".csv"));
    for (int i = 0; i < a.carriers[k].levels.count(); ++i)
      CHECK(std::stod(rows[static_cast<std::size_t>(i) + 1][1]) == a.carriers[k].levels.energy[i]);
  }
  compare(parsed(bytes_of(folder / "tables/beats.csv")), json["dynamics"]["beats"],
          {{"lower", "lower"},
           {"upper", "upper"},
           {"energy (eV)", "energy_eV"},
           {"period (ps)", "period_ps"},
           {"frequency (THz)", "frequency_THz"},
           {"dipole amplitude (nm)", "dipole_amplitude_nm"}});
}

TEST_CASE("Tables of ours are replaced, others, pipes and folders are not") {
  const ScratchFolder folder;
  const Answer a = small_answer();
  write_csv(a, folder / "tables");
  put(folder / "kept.csv", bytes_of(folder / "tables/levels.csv"));
  fs::remove(folder / "tables/levels.csv");
  fs::create_symlink("../kept.csv", folder / "tables/levels.csv");
  write_csv(a, folder / "tables");
  CHECK(fs::is_symlink(folder / "tables/levels.csv"));
  CHECK(bytes_of(folder / "kept.csv") == bytes_of(folder / "tables/levels.csv"));

  const std::string table = folder / "tables/transitions.csv";
  put(table, "my own notes\n");
  CHECK_THROWS_WITH(check_csv(folder / "tables"), Contains("transitions.csv: this file was not written by"));
  CHECK_THROWS_AS(write_csv(a, folder / "tables"), FileTrouble);
  CHECK(bytes_of(table) == "my own notes\n");
  fs::remove(table);
  REQUIRE(mkfifo(table.c_str(), 0600) == 0);
  CHECK_THROWS_WITH(check_csv(folder / "tables"), Contains("transitions.csv: this is a named pipe"));
  CHECK_THROWS_AS(write_csv(a, folder / "tables"), FileTrouble);
  CHECK(fs::directory_iterator(folder / "tables") != fs::directory_iterator());
  for (const auto& entry : fs::directory_iterator(folder / "tables"))
    CHECK_THAT(entry.path().filename().string(), !Contains("unfinished"));
}

TEST_CASE("A full disk leaves the old tables whole and nothing beside them") {
  const ScratchFolder folder;
  write_csv(small_answer(), folder / "tables");
  const std::string levels = bytes_of(folder / "tables/levels.csv");
  // Files may grow to 100 bytes, fewer than the header of a table.
  const auto handler = std::signal(SIGXFSZ, SIG_IGN);
  rlimit old{};
  getrlimit(RLIMIT_FSIZE, &old);
  const rlimit narrow{100, old.rlim_max};
  setrlimit(RLIMIT_FSIZE, &narrow);
  std::string first, again;
  try {
    write_csv(small_answer(two_levels_move), folder / "tables");
  } catch (const FileTrouble& trouble) {
    again = trouble.what();
  }
  try {
    write_csv(small_answer(), folder / "fresh");
  } catch (const FileTrouble& trouble) {
    first = trouble.what();
  }
  setrlimit(RLIMIT_FSIZE, &old);
  std::signal(SIGXFSZ, handler);
  CHECK_THAT(again, Contains("levels.csv: cannot be written: File too large"));
  CHECK_THAT(first, Contains("levels.csv: cannot be written: File too large"));
  CHECK(bytes_of(folder / "tables/levels.csv") == levels);
  CHECK_FALSE(fs::exists(folder / "tables/beats.csv"));
  CHECK(std::distance(fs::directory_iterator(folder / "tables"), {}) == 2);
  CHECK_FALSE(fs::exists(folder / "fresh"));
}
