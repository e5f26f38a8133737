#!/usr/bin/env bash
# SPDX-License-Identifier: Apache-2.0
# Builds wellwright (Release, in build/), runs the first example and says where its result is.
set -eu
top=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
. "$top/.setup/install.sh"

install_packages build
if [ ! -f "$top/build/build.ninja" ]; then  # a folder made by tests/run.sh is used as it is
  configure build -DCMAKE_BUILD_TYPE=Release -DWELLWRIGHT_TESTS=OFF
fi
cmake --build "$top/build" -j "$(job_count)" --target wellwright
study=$(cd "$top" && echo examples/010-*/study.yaml)
cd "$top"
echo
echo "build/bin/wellwright run $study"
echo
build/bin/wellwright run "$study"
