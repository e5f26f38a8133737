#!/usr/bin/env bash
# SPDX-License-Identifier: Apache-2.0
# Runs the fuzz target for SECONDS (60), beginning from the examples, the recorded mistakes and tests/fuzz/seeds.
#   bash tests/fuzz/run.sh [SECONDS]
set -eu
top=$(cd "$(dirname "${BASH_SOURCE[0]}")/../.." && pwd)
. "$top/.setup/install.sh"

install_packages build test fuzz
configure build-fuzz -DCMAKE_BUILD_TYPE=Fuzz -DCMAKE_CXX_FLAGS="-O1 -g1" -DCMAKE_CXX_COMPILER=clang++ -DCMAKE_C_COMPILER=clang \
  -DWELLWRIGHT_FUZZ=ON -DWELLWRIGHT_TESTS=ON -DWELLWRIGHT_STRICT=OFF
cmake --build "$top/build-fuzz" -j "$(job_count)" --target fuzz_study
corpus=$top/build-fuzz/corpus seeds=$top/build-fuzz/seeds
mkdir -p "$corpus" "$seeds"
for study in "$top"/examples/*/study.yaml; do cp "$study" "$seeds/$(basename "$(dirname "$study")").yaml"; done
for case in "$top"/tests/words/*/*.txt; do  # the study of a recorded mistake
  awk '/^== /{inside = ($0 == "== file study.yaml"); next} inside' "$case" > "$seeds/$(basename "$case")"
done
cp "$top"/tests/fuzz/seeds/*.yaml "$seeds"  # settings and tables of a user, which no example has
cd "$top/build-fuzz"
log=$top/build-fuzz/fuzz.log
if ! tests/fuzz/fuzz_study -max_total_time="${1:-60}" -max_len=4096 -timeout=10 -rss_limit_mb=2048 \
  -print_final_stats=1 -dict="$top/tests/fuzz/study.dict" -verbosity=0 "$corpus" "$seeds" >"$log" 2>&1; then
  grep -v '# Uses' "$log"
  echo "the input that broke the reader is in $top/build-fuzz"
  exit 1
fi
grep -E 'number_of_executed_units|new_units_added' "$log"
echo "the study reader stood ${1:-60} s of fuzzing"
