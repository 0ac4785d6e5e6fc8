#!/usr/bin/env bash
# Measures the program against the same work by hand and prints one table (Markdown, standard output): installs what is
# missing, builds the release preset, runs all. About 4 minutes on two cores, the build apart.
set -euo pipefail
cd "$(dirname "$0")/../.."
.ci/install.sh test >&2
cmake --preset release -DTAPSPAN_ONLY_BOARD_TESTS=OFF >/dev/null
cmake --build --preset release --target tapspan tapspan-worker reading_bench sweep_bench >&2
exec python3 -B tests/bench/bench.py build/release
