// SPDX-License-Identifier: Apache-2.0
// Numbers and quantities from text.
#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "units/table.hpp"

namespace wellwright {
namespace {

struct Words {
  const char* name;     // "a length"
  const char* example;  // "14.5 nm"
};

Words words_of(Dimension dimension) {
  switch (dimension) {
    case Dimension::number:
      return {"a plain number", "0.5"};
    case Dimension::length:
      return {"a length", "14.5 nm"};
    case Dimension::energy:
      return {"an energy", "120 meV"};
    case Dimension::time:
      return {"a time", "10 ps"};
    case Dimension::temperature:
      return {"a temperature", "77 K"};
    case Dimension::electric_field:
      return {"an electric field", "10 kV/cm"};
    case Dimension::voltage:
      return {"a voltage", "0.2 V"};
    case Dimension::sheet_density:
      return {"a sheet density", "3e10 cm^-2"};
    case Dimension::volume_density:
      return {"a volume density", "1e17 cm^-3"};
    case Dimension::inverse_length:
      return {"a wavenumber", "0.1 nm^-1"};
    case Dimension::angle:
      return {"an angle", "45 deg"};
    case Dimension::frequency:
      return {"a frequency", "1.5 THz"};
    case Dimension::mass:
      return {"a mass in electron masses, without unit", "0.067"};
    case Dimension::pressure:
      return {"an elastic constant", "118 GPa"};
    case Dimension::polarization:
      return {"a polarization", "-0.034 C/m^2"};
    case Dimension::mass_density:
      return {"a density", "5.32 g/cm^3"};
    case Dimension::speed:
      return {"a speed", "5240 m/s"};
    case Dimension::speed_of_growth:
      return {"a growth rate", "0.28 nm/s"};
    case Dimension::monolayers:
      return {"a number of monolayers", "9 ML"};
    case Dimension::percent:
      return {"a per cent", "1 %"};
  }
  return {"", ""};
}

constexpr Dimension every_dimension[] = {
    Dimension::length,         Dimension::energy,    Dimension::time,          Dimension::temperature,
    Dimension::electric_field, Dimension::voltage,   Dimension::sheet_density, Dimension::volume_density,
    Dimension::inverse_length, Dimension::frequency, Dimension::pressure,      Dimension::polarization,
    Dimension::mass_density,   Dimension::speed};

bool is_one_of(Dimension dimension, const std::vector<Dimension>& allowed) {
  return std::find(allowed.begin(), allowed.end(), dimension) != allowed.end();
}

// "a length", "a length or a number of monolayers"
std::string wanted(const std::vector<Dimension>& allowed) {
  std::string text;
  for (std::size_t i = 0; i < allowed.size(); ++i) {
    if (i > 0) text += i + 1 == allowed.size() ? " or " : ", ";
    text += words_of(allowed[i]).name;
  }
  return text;
}

std::string examples(const std::vector<Dimension>& allowed) {
  std::string text;
  for (std::size_t i = 0; i < allowed.size(); ++i)
    text += (i == 0                    ? ""
             : i + 1 == allowed.size() ? " or "
                                       : ", ") +
            std::string(words_of(allowed[i]).example);
  return text;
}

// How many characters at the start of `text` are a decimal number; 0 when none.
std::size_t number_length(std::string_view text) {
  std::size_t at = 0;
  const auto digits = [&] {
    const std::size_t start = at;
    while (at < text.size() && text[at] >= '0' && text[at] <= '9') ++at;
    return at - start;
  };
  if (at < text.size() && (text[at] == '+' || text[at] == '-')) ++at;
  const std::size_t whole_start = at;
  const std::size_t whole = digits();
  if (whole > 1 && text[whole_start] == '0') return 0;  // 010 is octal to some and decimal to others
  std::size_t part = 0;
  if (at < text.size() && text[at] == '.') {
    ++at;
    part = digits();
  }
  if (whole + part == 0) return 0;
  const std::size_t mantissa = at;
  if (at < text.size() && (text[at] == 'e' || text[at] == 'E')) {
    ++at;
    if (at < text.size() && (text[at] == '+' || text[at] == '-')) ++at;
    if (digits() == 0) at = mantissa;  // "5 eV", "5eV"
  }
  return at;
}

std::string_view trimmed(std::string_view text) {
  while (!text.empty() && (text.front() == ' ' || text.front() == '\t')) text.remove_prefix(1);
  while (!text.empty() && (text.back() == ' ' || text.back() == '\t')) text.remove_suffix(1);
  return text;
}

std::string lower(std::string_view text) {
  std::string out(text);
  for (char& c : out)
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  return out;
}

// The known unit that differs only by upper and lower case, among those allowed.
std::string other_case(const std::string& normalised, const std::vector<Dimension>& allowed) {
  for (const KnownUnit* unit = begin_units(); unit != end_units(); ++unit)
    if (is_one_of(unit->dimension, allowed) && lower(unit->name) == lower(normalised))
      return std::string(unit->name);
  return {};
}

// What a unit of the wrong kind measures; empty when it is no unit at all.
std::string measured_by(const std::string& normalised) {
  if (const KnownUnit* unit = find_unit(normalised)) return words_of(unit->dimension).name;
  double factor = 0, offset = 0;
  for (const Dimension dimension : every_dimension)
    if (udunits_conversion(normalised, dimension, factor, offset)) return words_of(dimension).name;
  return {};
}

}  // namespace

std::string_view internal_unit(Dimension dimension) {
  switch (dimension) {
    case Dimension::length:
      return "nm";
    case Dimension::energy:
      return "eV";
    case Dimension::time:
      return "ps";
    case Dimension::temperature:
      return "K";
    case Dimension::electric_field:
      return "V/nm";
    case Dimension::voltage:
      return "V";
    case Dimension::sheet_density:
      return "nm^-2";
    case Dimension::volume_density:
      return "nm^-3";
    case Dimension::inverse_length:
      return "nm^-1";
    case Dimension::angle:
      return "rad";
    case Dimension::frequency:
      return "THz";
    case Dimension::mass:
      return "m0";
    case Dimension::pressure:
      return "GPa";
    case Dimension::polarization:
      return "C/m^2";
    case Dimension::mass_density:
      return "g/cm^3";
    case Dimension::speed:
      return "m/s";
    case Dimension::speed_of_growth:
      return "nm/s";
    case Dimension::monolayers:
      return "ML";
    case Dimension::number:
    case Dimension::percent:
      return "1";
  }
  return "";
}

bool read_number(std::string_view text, double& value) {
  if (text.empty() || number_length(text) != text.size()) return false;
  if (text.front() == '+') text.remove_prefix(1);
  double read = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), read);
  if (error != std::errc{} || end != text.data() + text.size() || !std::isfinite(read)) return false;
  value = read;
  return true;
}

bool read_quantity(std::string_view whole, const std::vector<Dimension>& allowed, Quantity& quantity,
                   QuantityTrouble& trouble) {
  const std::string_view text = trimmed(whole);
  const std::size_t length = number_length(text);
  const auto offset_of = [&](std::string_view part) {
    return static_cast<std::size_t>(part.data() - whole.data());
  };
  double number = 0;
  if (length == 0 || !read_number(text.substr(0, length), number)) {
    trouble.offset = offset_of(text);
    const bool octal = text.size() > 1 && text[0] == '0' && text[1] >= '0' && text[1] <= '9';
    const bool too_large = length > 0;
    trouble.what = octal       ? fmt::format("`{}` begins with a zero", text)
                   : too_large ? fmt::format("`{}` is too large or too small for a number", text)
                               : fmt::format("`{}` is not {}", text, wanted(allowed));
    trouble.hint = octal       ? "write the number without the leading zero"
                   : too_large ? ""
                               : fmt::format("write {}, such as {}", wanted(allowed), examples(allowed));
    return false;
  }
  const std::string_view unit = trimmed(text.substr(length));
  if (unit.size() > 1 && unit[0] == ',' && unit[1] >= '0' && unit[1] <= '9') {
    std::string pointed(text);
    pointed[offset_of(unit) - offset_of(text)] = '.';
    trouble = {fmt::format("`{}` has a comma in its number", text),
               fmt::format("decimals stand after a point: {}", pointed), offset_of(text)};
    return false;
  }
  const bool plain = is_one_of(Dimension::number, allowed) || is_one_of(Dimension::mass, allowed);
  if (unit.empty()) {
    if (plain) {
      quantity = {number, is_one_of(Dimension::number, allowed) ? Dimension::number : Dimension::mass, ""};
      return true;
    }
    trouble = {fmt::format("`{}` has no unit", text),
               fmt::format("write {}, such as {}", wanted(allowed), examples(allowed)), offset_of(text)};
    return false;
  }
  const std::string normalised = normalise(unit);
  if (const KnownUnit* known = find_unit(normalised); known && is_one_of(known->dimension, allowed)) {
    quantity = {known->factor * number + known->offset, known->dimension, std::string(unit)};
    return true;
  }
  const bool own_word = find_unit(normalised) != nullptr || normalised == "A";
  if (!own_word)
    for (const Dimension dimension : allowed) {
      double factor = 0, offset = 0;
      if (!udunits_conversion(normalised, dimension, factor, offset)) continue;
      quantity = {factor * number + offset, dimension, std::string(unit)};
      return true;
    }
  trouble.offset = offset_of(unit);
  trouble.hint = fmt::format("write {}, such as {}", wanted(allowed), examples(allowed));
  if (normalised == "A" && is_one_of(Dimension::length, allowed)) {
    trouble.what = "`A` is the ampere";
    trouble.hint = "write Å or angstrom for the length";
    return false;
  }
  if (normalised == "C" && is_one_of(Dimension::temperature, allowed)) {
    trouble.what = "`C` is the coulomb";
    trouble.hint = "write degC for degrees Celsius, or K";
    return false;
  }
  if (const std::string near = other_case(normalised, allowed); !near.empty()) {
    trouble.what = fmt::format("`{}` is not {}", unit, wanted(allowed));
    trouble.hint = fmt::format("did you mean `{}`?", near);
    return false;
  }
  const std::string kind = measured_by(normalised);
  if (plain)
    trouble.what = fmt::format("`{}` carries a unit, but {} is wanted", text, wanted(allowed));
  else if (!kind.empty())
    trouble.what = fmt::format("`{}` is {}, not {}", text, kind, wanted(allowed));
  else if (is_udunits_unit(normalised))
    trouble.what = fmt::format("`{}` is not {}", text, wanted(allowed));
  else
    trouble.what = fmt::format("`{}` is no unit that is known", unit);
  return false;
}

}  // namespace wellwright
