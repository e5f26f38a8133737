// SPDX-License-Identifier: Apache-2.0
// Levels, transitions and beats as comma-separated tables with units in the header (RFC 4180).
#include <fmt/format.h>
#include <unistd.h>  // for access

#include <cmath>
#include <filesystem>
#include <fstream>
#include <memory>
#include <set>

#include "results/names.hpp"
#include "results/target.hpp"
#include "results/unfinished.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace {

namespace fs = std::filesystem;

constexpr const char* level_header =
    "level,energy (eV),error estimate (eV),mean position (nm),spread (nm),lives in,probability "
    "there,in-plane mass (m0),"
    "conduction fraction,bound,group";
constexpr const char* transition_header =
    "initial,final,energy (eV),wavelength (nm),frequency (THz),dipole (nm),oscillator strength,beat period "
    "(ps)";
constexpr const char* beat_header =
    "lower,upper,energy (eV),period (ps),frequency (THz),dipole amplitude (nm)";

// All digits, so that the table holds the number of the result file.
std::string number(double value) {
  return std::isfinite(value) ? fmt::format("{}", value) : std::string();
}

std::string quoted(const std::string& text) {
  if (text.find_first_of(",\"\r\n") == std::string::npos) return text;
  std::string out = "\"";
  for (const char c : text) {
    if (c == '"') out += '"';
    out += c;
  }
  return out + '"';
}

std::string levels_table(const Study& study, const Levels& levels) {
  std::string out = std::string(level_header) + "\r\n";
  for (int i = 0; i < levels.count(); ++i) {
    Eigen::Index layer = 0;
    const double most = levels.layer_probability.row(i).maxCoeff(&layer);
    const std::string name =
        study.stack.layers[static_cast<std::size_t>(layer)].label(static_cast<int>(layer) + 1);
    const auto at = static_cast<std::size_t>(i);
    out += fmt::format("{},{},{},{},{},{},{},{},{},{},{}\r\n", i + 1, number(levels.energy[i]),
                       number(levels.error_estimate[i]), number(levels.mean_position[i]),
                       number(levels.spread[i]), quoted(name), number(most), number(levels.in_plane_mass[i]),
                       number(levels.conduction_fraction[i]), levels.bound[at], levels.group[at]);
  }
  return out;
}

std::string transitions_table(const Transitions& t) {
  std::string out = std::string(transition_header) + "\r\n";
  for (Eigen::Index i = 0; i < t.energy.rows(); ++i)
    for (Eigen::Index f = i + 1; f < t.energy.cols(); ++f)
      out += fmt::format("{},{},{},{},{},{},{},{}\r\n", i + 1, f + 1, number(t.energy(i, f)),
                         number(t.wavelength(i, f)), number(t.frequency(i, f)), number(t.dipole(i, f)),
                         number(t.oscillator_strength(i, f)), number(t.beat_period(i, f)));
  return out;
}

std::string beats_table(const Dynamics& dynamics) {
  std::string out = std::string(beat_header) + "\r\n";
  for (const Beat& b : dynamics.beats)
    out += fmt::format("{},{},{},{},{},{}\r\n", b.lower, b.upper, number(b.energy), number(b.period),
                       number(b.frequency), number(b.dipole_amplitude));
  return out;
}

// The file to write for a table. One that is there is replaced only when it begins with the header of that
// table.
fs::path checked_table(const fs::path& path, std::string_view header) {
  const fs::path end = writable_file(path.string());
  std::error_code none;
  if (!fs::exists(end, none)) return end;
  std::ifstream file(end);
  if (!file)
    throw FileTrouble(fmt::format("{}: the file there cannot be read and is left as it is", path.string()));
  std::string first;
  std::getline(file, first);
  if (std::string_view(first).substr(0, header.size()) != header)
    throw FileTrouble(
        fmt::format("{}: this file was not written by wellwright and is left as it is", path.string()));
  return end;
}

void write_tables(const Answer& answer, const std::string& folder) {
  std::vector<std::tuple<fs::path, std::string_view, std::string>> tables;
  for (const CarrierAnswer& part : answer.carriers) {
    const Carrier carrier = part.levels.profile.carrier;
    tables.emplace_back(fs::path(folder) / (group_of("levels", carrier) + ".csv"), level_header,
                        levels_table(answer.study, part.levels));
    tables.emplace_back(fs::path(folder) / (group_of("transitions", carrier) + ".csv"), transition_header,
                        transitions_table(part.transitions));
  }
  if (answer.dynamics)
    tables.emplace_back(fs::path(folder) / "beats.csv", beat_header, beats_table(*answer.dynamics));
  // All of them are written before the first is put in place.
  std::vector<std::unique_ptr<Unfinished>> files;
  std::set<fs::path> folders = {folder};
  for (const auto& [path, header, text] : tables) {
    const fs::path end = checked_table(path, header);
    folders.insert(folder_of(end));
    files.push_back(std::make_unique<Unfinished>(end, path.string()));
    files.back()->write(text);
  }
  for (const auto& file : files) file->put_in_place();
  for (const fs::path& each : folders) sync_folder(each);
}

}  // namespace

void check_csv(const std::string& folder) {
  std::error_code none;
  if (!fs::exists(folder, none)) {
    // The nearest folder above that is there will hold the new one.
    fs::path above = fs::absolute(folder, none).lexically_normal();
    while (above.has_relative_path() && !fs::exists(above, none)) above = above.parent_path();
    if (!fs::is_directory(above, none) || access(above.c_str(), W_OK) != 0)
      throw FileTrouble(fmt::format("{}: the folder cannot be made", folder));
    return;
  }
  if (!fs::is_directory(folder, none)) throw FileTrouble(fmt::format("{}: this is no folder", folder));
  if (access(folder.c_str(), W_OK) != 0)
    throw FileTrouble(fmt::format("{}: the folder cannot be written to", folder));
  for (const Carrier carrier : {Carrier::electron, Carrier::heavy_hole, Carrier::light_hole}) {
    checked_table(fs::path(folder) / (group_of("levels", carrier) + ".csv"), level_header);
    checked_table(fs::path(folder) / (group_of("transitions", carrier) + ".csv"), transition_header);
  }
  checked_table(fs::path(folder) / "beats.csv", beat_header);
}

void write_csv(const Answer& answer, const std::string& folder) {
  std::error_code error;
  if (fs::exists(folder, error) && !fs::is_directory(folder, error))
    throw FileTrouble(fmt::format("{}: this is no folder", folder));
  const bool made = fs::create_directories(folder, error);
  if (error) throw FileTrouble(fmt::format("{}: the folder cannot be made: {}", folder, error.message()));
  try {
    write_tables(answer, folder);
  } catch (const FileTrouble&) {
    if (made) fs::remove(folder, error);
    throw;
  }
}

}  // namespace wellwright
