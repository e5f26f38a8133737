// SPDX-License-Identifier: Apache-2.0
// Names of alloys: elements with fractions that sum to one on each sublattice.
#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "materials/data.hpp"

namespace wellwright {
namespace {

constexpr int first_of_sublattice[] = {0, 3, 7, 9};
constexpr const char* sublattice_names[] = {"group-III", "group-V", "group-IV"};
constexpr double sum_tolerance = 1e-6;

int sublattice_of(int element) {
  return element < 3 ? 0 : element < 7 ? 1 : 2;
}

struct Part {
  int element = 0;
  bool has_fraction = false;
  double fraction = 1;
};

// "Al0.3Ga0.7As" as its parts; empty when it is no formula.
std::vector<Part> parts_of(std::string_view text) {
  std::vector<Part> parts;
  for (std::size_t at = 0; at < text.size();) {
    Part part;
    part.element = -1;
    for (const std::size_t length : {std::size_t{2}, std::size_t{1}}) {
      const auto found = std::find(element_names.begin(), element_names.end(), text.substr(at, length));
      if (at + length > text.size() || found == element_names.end()) continue;
      part.element = static_cast<int>(found - element_names.begin());
      at += length;
      break;
    }
    if (part.element < 0) return {};
    std::size_t end = at;
    while (end < text.size() && ((text[end] >= '0' && text[end] <= '9') || text[end] == '.')) ++end;
    if (end > at) {
      part.has_fraction = true;
      if (!read_number(text.substr(at, end - at), part.fraction)) return {};
    }
    at = end;
    parts.push_back(part);
  }
  return parts;
}

// The formula as the user might have meant it, with fractions that fill the sublattice.
std::string with_example_fractions(const std::vector<Part>& parts) {
  std::string text;
  for (const Part& part : parts) {
    int alike = 0, before = 0;
    for (const Part& other : parts) {
      if (sublattice_of(other.element) != sublattice_of(part.element)) continue;
      if (&other < &part) ++before;
      ++alike;
    }
    text += element_names[static_cast<std::size_t>(part.element)];
    if (alike == 2) text += before == 0 ? "0.3" : "0.7";
    if (alike == 3) text += before == 2 ? "0.5" : before == 1 ? "0.3" : "0.2";
  }
  return text;
}

// The same with what people write besides taken away: blanks, underscores, a decimal comma; empty where that
// is no formula either.
std::string tidied(std::string_view text) {
  std::string tidy;
  for (const char c : text)
    if (c == ',')
      tidy += '.';
    else if (c != ' ' && c != '_' && c != '(' && c != ')')
      tidy += c;
  return tidy != text && !parts_of(tidy).empty() ? tidy : std::string{};
}

Alloy from_parts(std::string_view text, const std::vector<Part>& parts, const Place& place) {
  Alloy alloy;
  alloy.text = text;
  double sum[3] = {0, 0, 0};
  int members[3] = {0, 0, 0};
  for (const Part& part : parts) ++members[sublattice_of(part.element)];
  for (const Part& part : parts) {
    const int s = sublattice_of(part.element);
    double& fraction = alloy.fraction[static_cast<std::size_t>(part.element)];
    const auto same = std::count_if(parts.begin(), parts.end(),
                                    [&](const Part& other) { return other.element == part.element; });
    if (same > 1)
      throw InputError(
          fmt::format("{} names {} twice", text, element_names[static_cast<std::size_t>(part.element)]),
          place);
    if (members[s] > 1 && !part.has_fraction)
      throw InputError(
          fmt::format("{} lacks fractions", text), place,
          fmt::format("write them behind the elements, such as {}", with_example_fractions(parts)));
    if (!(part.fraction >= 0 && part.fraction <= 1))
      throw InputError(
          fmt::format("in {} the fraction {:g} lies outside 0 to 1", text, part.fraction), place,
          fmt::format("write parts of one, not per cent, such as {}", with_example_fractions(parts)));
    fraction = part.fraction;
    sum[s] += part.fraction;
    if (alloy.first < 0 && members[s] > 1) alloy.first = part.element;
  }
  for (int s = 0; s < 3; ++s)
    if (members[s] > 0 && std::abs(sum[s] - 1) > sum_tolerance)
      throw InputError(
          fmt::format("in {} the {} fractions sum to {:.6g}, not to 1", text, sublattice_names[s], sum[s]),
          place, "the fractions of each sublattice sum to one");
  const bool four = members[2] > 0, three_five = members[0] > 0 && members[1] > 0;
  if (four == three_five || (four && (members[0] > 0 || members[1] > 0)))
    throw InputError(
        fmt::format("{} is no compound: it needs elements of group III and group V, or Si and Ge alone",
                    text),
        place);
  return alloy;
}

}  // namespace

double Alloy::composition() const {
  return first < 0 ? std::numeric_limits<double>::quiet_NaN() : fraction[static_cast<std::size_t>(first)];
}

Alloy Alloy::with_composition(double x) const {
  Alloy other = *this;
  if (first < 0) return other;
  const int s = sublattice_of(first);
  const double rest = 1 - composition();
  for (int e = first_of_sublattice[s]; e < first_of_sublattice[s + 1]; ++e) {
    double& fraction_of = other.fraction[static_cast<std::size_t>(e)];
    if (e != first && fraction_of != 0) fraction_of *= (1 - x) / rest;
  }
  other.fraction[static_cast<std::size_t>(first)] = x;
  return other;
}

Alloy MaterialTable::alloy(std::string_view text, const Place& place) const {
  if (knows_medium(text)) {
    Alloy alloy;
    alloy.text = text;
    alloy.medium = text;
    return alloy;
  }
  const auto parts = parts_of(text);
  if (parts.empty()) {
    const std::string tidy = tidied(text);
    const auto near = tidy.empty() ? nearest(text, names()) : std::vector<std::string>{tidy};
    throw InputError(fmt::format("`{}` is no material of the table", text), place,
                     near.empty()
                         ? "write an alloy such as Al0.3Ga0.7As, or define the medium under materials:"
                         : did_you_mean(near));
  }
  Alloy alloy = from_parts(text, parts, place);
  std::optional<Structure> structure;
  for (int c = 0; c < 3; ++c)
    for (int a = 3; a < 7; ++a) {
      if (alloy.fraction[static_cast<std::size_t>(c)] == 0 ||
          alloy.fraction[static_cast<std::size_t>(a)] == 0)
        continue;
      const Binary* found = nullptr;
      for (const Binary& b : data_->binaries)
        if (b.cation == c && b.anion == a) found = &b;
      if (!found)
        throw InputError(fmt::format("the material table does not hold {}{}, a part of {}",
                                     element_names[static_cast<std::size_t>(c)],
                                     element_names[static_cast<std::size_t>(a)], text),
                         place);
      if (structure && *structure != found->structure)
        throw InputError(
            fmt::format("{} mixes zinc blende and wurtzite, for which no values are tabled", text), place);
      structure = found->structure;
    }
  return alloy;
}

Alloy MaterialTable::lattice_matched(std::string_view ternary, const Alloy& substrate,
                                     const Place& place) const {
  const AlloyRecord* record = data_->alloy_record(ternary);
  if (!record) {
    std::string bare;  // without its fractions
    for (const char c : ternary)
      if (!(c >= '0' && c <= '9') && c != '.') bare += c;
    std::vector<std::string> ternaries;
    for (const AlloyRecord& known : data_->alloys) ternaries.emplace_back(known.name);
    const auto near = nearest(ternary, ternaries);
    const bool binary = std::any_of(data_->binaries.begin(), data_->binaries.end(),
                                    [&](const Binary& b) { return b.name == ternary; });
    throw InputError(fmt::format("`{}` is no ternary of the table", ternary), place,
                     binary ? "a binary has one lattice constant; name a ternary, such as InGaAs"
                     : data_->alloy_record(bare) ? fmt::format("write it without fractions: {}", bare)
                     : near.empty()              ? "one of: " + listed(ternaries)
                                                 : did_you_mean(near));
  }
  constexpr double room = 300;  // a substrate is matched at room temperature [K]
  const double wanted = at(values_of(*data_, substrate, room), P::lattice_constant);
  const Binary &from = data_->binaries[static_cast<std::size_t>(record->from)],
               &to = data_->binaries[static_cast<std::size_t>(record->to)];
  const auto elements = elements_of(ternary);
  const auto alloy_at = [&](double x) {
    Alloy alloy;
    alloy.fraction[static_cast<std::size_t>(from.cation)] += 1 - x;
    alloy.fraction[static_cast<std::size_t>(to.cation)] += x;
    if (from.structure != Structure::diamond) {
      alloy.fraction[static_cast<std::size_t>(from.anion)] += 1 - x;
      alloy.fraction[static_cast<std::size_t>(to.anion)] += x;
    }
    return alloy;
  };
  const auto miss = [&](double x) {
    return at(values_of(*data_, alloy_at(x), room), P::lattice_constant) - wanted;
  };
  double low = 0, high = 1;
  if (!std::isfinite(miss(0)) || miss(0) * miss(1) > 0)
    throw InputError(fmt::format("no composition of {} has the lattice constant of {}, {:.5f} nm", ternary,
                                 substrate.text, wanted),
                     place,
                     std::isfinite(miss(0)) ? fmt::format("{} has {:.5f} nm and {} has {:.5f} nm", from.name,
                                                          miss(0) + wanted, to.name, miss(1) + wanted)
                                            : std::string{});
  const bool rising = miss(1) > 0;
  for (int i = 0; i < 60; ++i) {
    const double middle = 0.5 * (low + high);
    ((miss(middle) > 0) == rising ? high : low) = middle;
  }
  const double x = 0.5 * (low + high);
  constexpr double at_an_end = 5e-5;  // what four digits of a fraction would round away
  if (x < at_an_end || x > 1 - at_an_end) return alloy(x < at_an_end ? from.name : to.name, place);
  Alloy alloy = alloy_at(x);
  for (const int element : elements) {
    const double part = alloy.fraction[static_cast<std::size_t>(element)];
    alloy.text += element_names[static_cast<std::size_t>(element)];
    if (part < 1 - 1e-12) {
      alloy.text += fmt::format("{:.4f}", part);
      if (alloy.first < 0) alloy.first = element;
    }
  }
  return alloy;
}

}  // namespace wellwright
