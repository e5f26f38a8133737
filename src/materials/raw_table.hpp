// SPDX-License-Identifier: Apache-2.0
// The table as plain rows: what the generator writes as code and what a YAML file is read into; private to
// the room.
#pragma once

#include <deque>
#include <memory>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "materials/parameters.hpp"
#include "wellwright/materials.hpp"

namespace wellwright {

struct RawBinary {
  std::string_view name;
  Structure structure;
};

/// An alloy from one binary to another: value = (1 - x) from + x to - x (1 - x) bowing(x).
struct RawAlloy {
  std::string_view name;
  int from, to;  ///< binaries
  std::string_view range;
};

/// One value of a binary, or the bowing (or the difference to `from`) of an alloy.
struct RawValue {
  bool of_alloy;
  int owner;                 ///< index of the binary or alloy
  std::string_view variant;  ///< "" for the default
  P parameter;
  bool difference;  ///< of an alloy: a polynomial added to `from`, instead of a bowing
  int terms;        ///< coefficients used: constant (bowing: x^0), next power, next
  double c[3];
  std::string_view source, range, note, trust;
  bool recalled;
};

struct RawSource {
  std::string_view key, text;
};

struct RawError {
  std::string_view quantity_class;
  double value;
  std::string_view unit, source;
};

struct RawTable {
  std::span<const RawBinary> binaries;
  std::span<const RawAlloy> alloys;
  std::span<const RawValue> values;
  std::span<const RawSource> sources;
  std::span<const RawError> errors;
  std::string_view hash;
};

/// The table compiled into the program, written by the generator from materials/*.yaml.
extern const RawTable shipped_table;

/// Rows read from YAML, with the texts they point at.
struct OwnedTable {
  std::deque<std::string> texts;
  std::vector<RawBinary> binaries;
  std::vector<RawAlloy> alloys;
  std::vector<RawValue> values;
  std::vector<RawSource> sources;
  std::vector<RawError> errors;
  std::string_view keep(const std::string& text) { return texts.emplace_back(text); }
  RawTable view(std::string_view hash) const { return {binaries, alloys, values, sources, errors, hash}; }
};

/// Reads the parsed files of one table together. Throws InputError.
void read_tables(const std::vector<Node>& roots, OwnedTable& table);

}  // namespace wellwright
