#!/usr/bin/env bash
# Builds tapspan on a fresh Debian machine and audits the sample board.
set -euo pipefail
cd "$(dirname "$0")/.."
.ci/install.sh build
cmake --preset release >/dev/null
cmake --build --preset release --target tapspan tapspan-worker
echo
status=0
build/release/bin/tapspan audit samples/greenhouse/greenhouse.cir "$@" || status=$?
echo
echo "tapspan ended with status $status (1: something at or above the gate, as this board means to show)."
[ "$status" -le 1 ]
