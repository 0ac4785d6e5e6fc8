#!/usr/bin/env bash
# Builds and runs every test: once with clang 14 and the address and undefined-behaviour sanitizers (all tests), once with
# g++ in release (the whole-program tests).
set -euo pipefail
cd "$(dirname "$0")/.."
.ci/install.sh test
cmake --preset sanitize >/dev/null
cmake --build --preset sanitize
ctest --preset sanitize
cmake --preset release -DTAPSPAN_ONLY_BOARD_TESTS=ON >/dev/null
cmake --build --preset release
ctest --preset release
