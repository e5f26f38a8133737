// SPDX-License-Identifier: Apache-2.0
// The result file: HDF5 that is also netCDF-4, written whole or not at all; tables as CSV and JSON.
#pragma once

#include <string>

#include "wellwright/answer.hpp"

namespace wellwright {

/// The version written into results, e.g. "0.1.0".
std::string_view version();

/// Writes the answer to `path`, or to the file that a link at `path` points at, under a temporary name beside
/// it and renames it when whole. Refuses (FileTrouble) to replace a file that this program did not write or
/// that cannot be read, a folder, a pipe, a device. Throws FileTrouble.
void write_result(const Answer& answer, const std::string& path);

/// Throws FileTrouble now, before any work is done, if write_result would refuse `path`.
void check_target(const std::string& path);

/// Writes levels.csv, transitions.csv, beats.csv (one set a carrier) into `folder`, made if missing, with all
/// digits; each is written whole or not at all. Throws FileTrouble.
void write_csv(const Answer& answer, const std::string& folder);

/// Throws FileTrouble now, before any work is done, if write_csv would refuse `folder` or a table in it.
void check_csv(const std::string& folder);

/// Levels, transitions, beats, notes and certificate as one JSON object (for `--json`).
std::string to_json(const Answer& answer);

}  // namespace wellwright
