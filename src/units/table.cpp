// SPDX-License-Identifier: Apache-2.0
// The units that occur in practice. Every row that UDUNITS knows is checked against it by the tests.
#include "units/table.hpp"

#include <algorithm>
#include <iterator>

namespace wellwright {
namespace {

using enum Dimension;

constexpr KnownUnit table[] = {
    {"nm", length, 1},
    {"um", length, 1e3},
    {"micron", length, 1e3},
    {"angstrom", length, 0.1},
    {"pm", length, 1e-3},
    {"mm", length, 1e6},
    {"cm", length, 1e7},
    {"m", length, 1e9},
    {"eV", energy, 1},
    {"meV", energy, 1e-3},
    {"ueV", energy, 1e-6},
    {"neV", energy, 1e-9},
    {"keV", energy, 1e3},
    {"J", energy, 1 / constants::elementary_charge},
    {"ps", time, 1},
    {"fs", time, 1e-3},
    {"as", time, 1e-6},
    {"ns", time, 1e3},
    {"us", time, 1e6},
    {"ms", time, 1e9},
    {"s", time, 1e12},
    {"K", temperature, 1},
    {"mK", temperature, 1e-3},
    {"degC", temperature, 1, 273.15},
    {"kV/cm", electric_field, 1e-4},
    {"V/nm", electric_field, 1},
    {"mV/nm", electric_field, 1e-3},
    {"V/cm", electric_field, 1e-7},
    {"MV/cm", electric_field, 0.1},
    {"V/m", electric_field, 1e-9},
    {"kV/m", electric_field, 1e-6},
    {"MV/m", electric_field, 1e-3},
    {"V/um", electric_field, 1e-3},
    {"kV/mm", electric_field, 1e-3},
    {"V", voltage, 1},
    {"mV", voltage, 1e-3},
    {"uV", voltage, 1e-6},
    {"kV", voltage, 1e3},
    {"cm^-2", sheet_density, 1e-14},
    {"m^-2", sheet_density, 1e-18},
    {"um^-2", sheet_density, 1e-6},
    {"nm^-2", sheet_density, 1},
    {"cm^-3", volume_density, 1e-21},
    {"m^-3", volume_density, 1e-27},
    {"um^-3", volume_density, 1e-9},
    {"nm^-3", volume_density, 1},
    {"nm^-1", inverse_length, 1},
    {"um^-1", inverse_length, 1e-3},
    {"cm^-1", inverse_length, 1e-7},
    {"m^-1", inverse_length, 1e-9},
    {"angstrom^-1", inverse_length, 10},
    {"rad", angle, 1},
    {"mrad", angle, 1e-3},
    {"deg", angle, 0.017453292519943295},
    {"THz", frequency, 1},
    {"GHz", frequency, 1e-3},
    {"MHz", frequency, 1e-6},
    {"kHz", frequency, 1e-9},
    {"Hz", frequency, 1e-12},
    {"ps^-1", frequency, 1},
    {"s^-1", frequency, 1e-12},
    {"m0", mass, 1},
    {"GPa", pressure, 1},
    {"MPa", pressure, 1e-3},
    {"Pa", pressure, 1e-9},
    {"kbar", pressure, 0.1},
    {"C/m^2", polarization, 1},
    {"C*m^-2", polarization, 1},
    {"uC/cm^2", polarization, 1e-2},
    {"g/cm^3", mass_density, 1},
    {"kg/m^3", mass_density, 1e-3},
    {"m/s", speed, 1},
    {"km/s", speed, 1e3},
    {"cm/s", speed, 1e-2},
    {"nm/s", speed_of_growth, 1},
    {"nm/min", speed_of_growth, 1.0 / 60},
    {"nm/h", speed_of_growth, 1.0 / 3600},
    {"um/h", speed_of_growth, 1e3 / 3600},
    {"angstrom/s", speed_of_growth, 0.1},
    {"ML", monolayers, 1},
    {"%", percent, 0.01},
};

void replace_all(std::string& text, std::string_view from, std::string_view to) {
  for (auto at = text.find(from); at != std::string::npos; at = text.find(from, at + to.size()))
    text.replace(at, from.size(), to);
}

bool is_letter(char c) {
  return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z');
}

}  // namespace

const KnownUnit* begin_units() {
  return std::begin(table);
}
const KnownUnit* end_units() {
  return std::end(table);
}

const KnownUnit* find_unit(std::string_view normalised) {
  const auto found = std::find_if(std::begin(table), std::end(table),
                                  [&](const KnownUnit& unit) { return unit.name == normalised; });
  return found == std::end(table) ? nullptr : found;
}

std::string normalise(std::string_view unit) {
  std::string text(unit);
  constexpr std::string_view superscripts[][2] = {{"⁻", "-"}, {"¹", "1"}, {"²", "2"}, {"³", "3"}};
  for (const auto& [from, to] : superscripts) replace_all(text, from, to);
  replace_all(text, "µ", "u");  // micro sign
  replace_all(text, "μ", "u");  // Greek mu
  replace_all(text, "Å", "angstrom");
  replace_all(text, "Å", "angstrom");  // the sign of its own
  replace_all(text, "°C", "degC");
  replace_all(text, "°", "deg");
  replace_all(text, "·", "*");
  replace_all(text, "**", "^");
  if (text == "Angstrom") text = "angstrom";
  if (text == "degrees" || text == "degree") text = "deg";
  if (text == "kelvin") text = "K";
  // "1/cm^2" and "/cm2": a reciprocal of one word.
  const bool over = text.starts_with("1/") || text.starts_with("/");
  std::string word = over ? text.substr(text.find('/') + 1) : text;
  std::size_t letters = 0;
  while (letters < word.size() && is_letter(word[letters])) ++letters;
  std::string_view rest = std::string_view(word).substr(letters);
  if (rest.starts_with("^")) rest.remove_prefix(1);
  const bool plain_power =
      letters > 0 && rest.size() <= 2 &&
      (rest.empty() || (rest.back() >= '1' && rest.back() <= '9' && (rest.size() == 1 || rest[0] == '-')));
  if (!plain_power || (rest.empty() && !over)) {
    // "cm-2" inside a longer unit is left to UDUNITS; "C/m2" gets its power mark.
    std::string out;
    for (std::size_t i = 0; i < text.size(); ++i) {
      if (i > 0 && text[i] >= '2' && text[i] <= '9' && is_letter(text[i - 1]) && text.find('/') < i)
        out += '^';
      out += text[i];
    }
    return out;
  }
  int power = rest.empty() ? 1 : rest.back() - '0';
  if (rest.size() == 2) power = -power;
  if (over) power = -power;
  word.resize(letters);
  if (power == 1) return word;
  word += '^';
  word += std::to_string(power);
  return word;
}

}  // namespace wellwright
