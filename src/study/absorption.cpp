// SPDX-License-Identifier: Apache-2.0
// The absorption block.
#include <fmt/format.h>

#include <algorithm>
#include <numbers>

#include "study/read.hpp"

namespace wellwright {
namespace {

constexpr const char* range_hint = "write photon_energy: {from: 50 meV, to: 400 meV, points: 501}";

const Node& needed(const Node& map, const char* block, const char* key, const char* hint) {
  if (!map[key].present()) throw InputError(fmt::format("`{}` has no `{}`", block, key), map.place(), hint);
  return map[key];
}

double above_zero(const Node& value, const char* key, double number) {
  if (!(number > 0))
    throw InputError(fmt::format("`{}` is not above zero", key), value.place(),
                     fmt::format("write {}: 8 meV", key));
  return number;
}

void read_range(const Node& block, AbsorptionRequest& request) {
  const auto& keys = study_declarations();
  const Node& range = needed(block, "absorption", "photon_energy", range_hint);
  if (!range.is_map()) throw InputError("`photon_energy` is not a range", range.place(), range_hint);
  keys.check(range, "absorption.photon_energy");
  const Node &from = needed(range, "photon_energy", "from", range_hint),
             &to = needed(range, "photon_energy", "to", range_hint);
  request.from = photon_energy_of(from, "from");
  request.to = photon_energy_of(to, "to");
  if (request.from == request.to)
    throw InputError("`from` and `to` are the same photon energy", to.place(), from.place(), range_hint);
  if (request.from > request.to) {
    if (from.quantity("from",
                      {Dimension::energy, Dimension::length, Dimension::frequency, Dimension::inverse_length})
            .dimension == Dimension::length)
      std::swap(request.from, request.to);  // wavelengths rise the other way
    else
      throw InputError("`from` is above `to`", from.place(), to.place(), "let the photon energy rise");
  }
  request.points = keys.whole_number(range, "absorption.photon_energy.points", 2, largest_sample_count);
}

constexpr Dimension energies[] = {Dimension::energy, Dimension::length, Dimension::frequency,
                                  Dimension::inverse_length};

}  // namespace

double photon_energy_of(const Node& value, const char* key) {
  const Quantity q = value.quantity(key, std::vector<Dimension>(std::begin(energies), std::end(energies)));
  if (!(q.value > 0))
    throw InputError(fmt::format("`{}` is not above zero", key), value.place(),
                     fmt::format("write {}: 1.56 eV", key));
  switch (q.dimension) {
    case Dimension::length:
      return energy_of_wavelength(q.value);
    case Dimension::frequency:
      return constants::planck * q.value;
    case Dimension::inverse_length:
      return energy_of_wavelength(1 / q.value);
    default:
      return q.value;
  }
}

AbsorptionRequest read_absorption(const Node& root) {
  const auto& keys = study_declarations();
  const Node& block = root["absorption"];
  if (!block.is_map()) throw InputError("`absorption` is not a map", block.place(), range_hint);
  keys.check(block, "absorption");
  AbsorptionRequest request;
  request.place = root.key_place("absorption");
  read_range(block, request);
  const Node& width = needed(block, "absorption", "full_width", "write full_width: 8 meV");
  if (width.is_scalar() && width.text() == "computed") keys.word_of(width, "absorption.full_width");
  request.full_width = above_zero(width, "full_width", width.quantity("full_width", Dimension::energy));
  const Node& shape = block["shape"];
  if (shape.is_map()) {
    keys.check(shape, "absorption.shape");
    const char* hint = "write shape: {voigt: {gaussian_width: 4 meV}}";
    const Node& voigt = needed(shape, "shape", "voigt", hint);
    if (!voigt.is_map()) throw InputError("`voigt` is not a map", voigt.place(), hint);
    keys.check(voigt, "absorption.shape.voigt");
    const Node& part = needed(voigt, "voigt", "gaussian_width", hint);
    request.shape = LineShape::voigt;
    request.gaussian_width =
        above_zero(part, "gaussian_width", part.quantity("gaussian_width", Dimension::energy));
  } else if (keys.word(block, "absorption.shape") == "gaussian") {
    request.shape = LineShape::gaussian;
  }
  request.angle = keys.quantity(block, "absorption.angle");
  if (request.angle < 0 || request.angle >= 0.5 * std::numbers::pi)
    throw InputError("`angle` is not between 0 and 90 deg", block["angle"].place(),
                     "it is measured inside the stack, from the growth axis");
  request.passes = keys.whole_number(block, "absorption.passes", 1, 1000);
  request.collective = keys.on_off(block, "absorption.collective");
  return request;
}

}  // namespace wellwright
