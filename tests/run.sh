#!/usr/bin/env bash
# SPDX-License-Identifier: Apache-2.0
# Builds everything (Release, in build/) and runs the tests; ends with ctest's closing line.
#   bash tests/run.sh [ctest options]      for example: bash tests/run.sh -R words
set -eu
top=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
. "$top/.setup/install.sh"

install_packages build test
configure build -DCMAKE_BUILD_TYPE=Release -DWELLWRIGHT_TESTS=ON -DWELLWRIGHT_STRICT=ON
cmake --build "$top/build" -j "$(job_count)"
exec ctest --test-dir "$top/build" --output-on-failure -j "$(nproc)" "$@"
