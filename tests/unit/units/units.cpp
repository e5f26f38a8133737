// SPDX-License-Identifier: Apache-2.0
// Constants against CODATA, every unit of the table against UDUNITS-2, and the traps of reading quantities.
#include <udunits2.h>
#include <catch2/catch.hpp>
#include <cmath>

#include "units/table.hpp"

using namespace wellwright;

namespace {

bool read(const char* text, std::vector<Dimension> allowed, double& value, QuantityTrouble& trouble) {
  Quantity quantity;
  const bool fine = read_quantity(text, allowed, quantity, trouble);
  value = quantity.value;
  return fine;
}

double value_of(const char* text, Dimension dimension) {
  double value = 0;
  QuantityTrouble trouble;
  INFO(text);
  REQUIRE(read(text, {dimension}, value, trouble));
  return value;
}

std::string trouble_of(const char* text, std::vector<Dimension> allowed) {
  double value = 0;
  QuantityTrouble trouble;
  INFO(text);
  REQUIRE_FALSE(read(text, allowed, value, trouble));
  CHECK_FALSE(trouble.what.empty());
  CHECK_FALSE(trouble.hint.empty());
  return trouble.what + " | " + trouble.hint;
}

}  // namespace

TEST_CASE("Constants are those of CODATA") {
  using namespace constants;
  // h = 6.62607015e-34 J s, e = 1.602176634e-19 C, k = 1.380649e-23 J/K, c = 299792458 m/s: exact since 2019.
  CHECK(planck == Approx(6.62607015e-34 / 1.602176634e-19 * 1e12).epsilon(1e-15));
  CHECK(hbar ==
        Approx(6.62607015e-34 / 1.602176634e-19 * 1e12 / (2 * 3.14159265358979323846)).epsilon(1e-15));
  CHECK(boltzmann == Approx(1.380649e-23 / 1.602176634e-19).epsilon(1e-15));
  // hbar^2 / 2 m0 = 0.0380998 eV nm^2 (common practice: 3.80998 eV A^2).
  CHECK(hbar2_over_2m0 == Approx(0.0380998).epsilon(1e-6));
  // h c = 1239.841984 eV nm; h = 4.135667697 ps meV; 0.2417989242 THz and 8.065543942 cm^-1 per meV (CODATA
  // 2018).
  CHECK(wavelength_of(1.0) == Approx(1239.841984).epsilon(1e-9));
  CHECK(beat_period_of(-1e-3) == Approx(4.135667697).epsilon(1e-9));
  CHECK(frequency_of(1e-3) == Approx(0.2417989242).epsilon(1e-9));
  CHECK(wavenumber_of(1e-3) == Approx(8.065543942).epsilon(1e-9));
  CHECK(energy_of_wavelength(wavelength_of(0.117)) == Approx(0.117).epsilon(1e-15));
}

TEST_CASE("Every unit of the table that UDUNITS knows has its factor") {
  ut_set_error_message_handler(ut_ignore);
  ut_system* system = ut_read_xml(nullptr);
  REQUIRE(system);
  int compared = 0;
  for (const KnownUnit* unit = begin_units(); unit != end_units(); ++unit) {
    double factor = 0, offset = 0;
    const std::string name(unit->name);
    if (name == "eV" || name.ends_with("eV")) continue;  // UDUNITS carries the electronvolt of 1986
    if (name == "ML" || name == "%" || name == "m0" || name == "deg") continue;  // our own words
    if (!udunits_conversion(name, unit->dimension, factor, offset)) continue;
    INFO(name);
    CHECK(factor == Approx(unit->factor).epsilon(1e-13));
    CHECK(offset == Approx(unit->offset).margin(1e-9));
    ++compared;
  }
  CHECK(compared > 45);
  ut_free_system(system);
}

TEST_CASE("Units in their spellings") {
  CHECK(value_of("14.5 nm", Dimension::length) == 14.5);
  CHECK(value_of("145Å", Dimension::length) == Approx(14.5));
  CHECK(value_of("0.0145 µm", Dimension::length) == Approx(14.5));
  CHECK(value_of("1.45e-6 cm", Dimension::length) == Approx(14.5));
  CHECK(value_of("1 inch", Dimension::length) == Approx(2.54e7));  // through UDUNITS
  CHECK(value_of("9 ML", Dimension::monolayers) == 9);
  CHECK(value_of("10 kV/cm", Dimension::electric_field) == Approx(1e-3));
  for (const char* text : {"3e10 cm^-2", "3e10 cm-2", "3e10/cm^2", "3e10 1/cm2", "3e10 cm⁻²", "3e14 m^-2"})
    CHECK(value_of(text, Dimension::sheet_density) == Approx(3e-4));
  CHECK(value_of("45 deg", Dimension::angle) == Approx(std::atan(1.0)));
  CHECK(value_of("45°", Dimension::angle) == Approx(std::atan(1.0)));
  CHECK(value_of("-10 °C", Dimension::temperature) == Approx(263.15));
  CHECK(value_of("2 %", Dimension::percent) == Approx(0.02));
  CHECK(value_of("1 J", Dimension::energy) == Approx(1 / 1.602176634e-19));
  CHECK(value_of("0.067", Dimension::mass) == 0.067);
}

TEST_CASE("Equal dimension is asked for, not convertibility, and the traps of UDUNITS stay outside") {
  CHECK(trouble_of("5 nm-1", {Dimension::length}).find("wavenumber") != std::string::npos);
  CHECK(trouble_of("5 1/nm", {Dimension::length}).find("wavenumber") != std::string::npos);
  CHECK(trouble_of("5 s", {Dimension::length}).find("is a time") != std::string::npos);
  CHECK(trouble_of("5", {Dimension::length, Dimension::monolayers}).find("has no unit") != std::string::npos);
  CHECK(trouble_of("5 A", {Dimension::length}).find("angstrom") != std::string::npos);
  CHECK(trouble_of("5 NM", {Dimension::length}).find("did you mean `nm`") != std::string::npos);
  for (const char* text :
       {"5-2 nm", "5 nm-0.5", "5 nm nm", "5 log(re 1 nm)", "5 nm since 1970-01-01", "5 foo", "5 2 nm"})
    trouble_of(text, {Dimension::length});
  CHECK(trouble_of("9 ML", {Dimension::length}).find("monolayers") != std::string::npos);
  CHECK(trouble_of("0.3 nm", {Dimension::number}).find("carries a unit") != std::string::npos);
  CHECK(trouble_of("2 erg", {Dimension::length}).find("energy") != std::string::npos);
}

TEST_CASE("Numbers are finite decimals") {
  double value = 0;
  for (const char* text : {"010", "00.5", "0x10", ".nan", ".inf", "inf", "nan", "1,5", "1e", "e5", "--1",
                           "1e999", "", " 1", "1 ", "+", "."}) {
    INFO(text);
    CHECK_FALSE(read_number(text, value));
  }
  const std::pair<const char*, double> good[] = {{"0", 0},  {"-0.5", -0.5}, {"+3", 3},     {".5", 0.5},
                                                 {"5.", 5}, {"1e-3", 1e-3}, {"12E2", 1200}};
  for (const auto& [text, exact] : good) {
    INFO(text);
    CHECK(read_number(text, value));
    CHECK(value == exact);
  }
  CHECK(trouble_of("010 nm", {Dimension::length}).find("begins with a zero") != std::string::npos);
}
