// SPDX-License-Identifier: Apache-2.0
// Units that the table lacks, through UDUNITS-2.
//
// UDUNITS calls reciprocals convertible, reads "ML" as megalitre, "5-2 nm" as a power and "nm-0.5" as 0.5,
// and carries the electronvolt of 1986. It therefore gets a unit word only, dimensions must be equal, and
// energies are asked for in joule.
#include <udunits2.h>

#include <mutex>

#include "units/table.hpp"

namespace wellwright {
namespace {

// The unit of `dimension` in UDUNITS' words and the factor from it to the internal unit; null: not asked
// there.
const char* reference(Dimension dimension, double& to_internal) {
  to_internal = 1;
  switch (dimension) {
    case Dimension::length:
      return "nm";
    case Dimension::energy:
      to_internal = 1 / constants::elementary_charge;
      return "J";
    case Dimension::time:
      return "ps";
    case Dimension::temperature:
      return "K";
    case Dimension::electric_field:
      return "V nm-1";
    case Dimension::voltage:
      return "V";
    case Dimension::sheet_density:
      return "nm-2";
    case Dimension::volume_density:
      return "nm-3";
    case Dimension::inverse_length:
      return "nm-1";
    case Dimension::frequency:
      return "THz";
    case Dimension::pressure:
      return "GPa";
    case Dimension::polarization:
      return "C m-2";
    case Dimension::mass_density:
      return "g cm-3";
    case Dimension::speed:
      return "m s-1";
    case Dimension::speed_of_growth:
      return "nm s-1";
    default:
      return nullptr;
  }
}

// Letters, * / ^ and whole exponents only.
bool is_unit_word(const std::string& text) {
  bool after_power = false;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const char c = text[i];
    const bool letter = (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || c == '_';
    const bool digit = c >= '0' && c <= '9';
    if (c == '^') {
      after_power = true;
      continue;
    }
    if (c == '-' && after_power && text[i - 1] == '^') continue;
    if (digit && after_power) continue;
    if (digit && i == 0 && c == '1' && text.size() > 1 && text[1] == '/') continue;
    if (!letter && c != '*' && c != '/') return false;
    after_power = false;
  }
  return !text.empty();
}

ut_system* units_system() {
  static ut_system* const system = [] {
    ut_set_error_message_handler(ut_ignore);
    return ut_read_xml(nullptr);
  }();
  return system;
}

std::mutex one_at_a_time;  // the library keeps state of its own

}  // namespace

bool is_udunits_unit(const std::string& normalised) {
  if (!is_unit_word(normalised)) return false;
  const std::lock_guard lock(one_at_a_time);
  ut_system* system = units_system();
  ut_unit* unit = system ? ut_parse(system, normalised.c_str(), UT_UTF8) : nullptr;
  if (unit) ut_free(unit);
  return unit != nullptr;
}

bool udunits_conversion(const std::string& normalised, Dimension dimension, double& factor, double& offset) {
  double to_internal = 1;
  const char* internal = reference(dimension, to_internal);
  if (!internal || !is_unit_word(normalised)) return false;
  const std::lock_guard lock(one_at_a_time);
  ut_system* system = units_system();
  if (!system) return false;
  ut_unit* from = ut_parse(system, normalised.c_str(), UT_UTF8);
  ut_unit* to = ut_parse(system, internal, UT_UTF8);
  bool fine = false;
  if (from && to) {
    ut_unit* ratio = ut_divide(from, to);  // of equal dimension when nothing is left of it
    cv_converter* converter = ratio && ut_is_dimensionless(ratio) ? ut_get_converter(from, to) : nullptr;
    if (converter) {
      offset = cv_convert_double(converter, 0.0);
      factor = (cv_convert_double(converter, 1.0) - offset) * to_internal;
      offset *= to_internal;
      fine = true;
      cv_free(converter);
    }
    if (ratio) ut_free(ratio);
  }
  if (from) ut_free(from);
  if (to) ut_free(to);
  return fine;
}

}  // namespace wellwright
