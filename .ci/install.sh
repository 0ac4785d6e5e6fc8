#!/usr/bin/env bash
# Installs what is missing of Debian's packages: "build" for the program, "test" for the tests too.
set -euo pipefail
packages=(g++ cmake ninja-build ccache libngspice0-dev tao-pegtl-dev libcli11-dev libtomlplusplus-dev nlohmann-json3-dev
          libfmt-dev libeigen3-dev)
if [ "${1:-build}" = test ]; then
  packages+=(clang-14 libclang-rt-14-dev catch2 libbenchmark-dev ngspice gnucap python3 python3-jsonschema)
fi
missing=()
for package in "${packages[@]}"; do
  state=$(dpkg-query -W -f='${Status}' "$package" 2>/dev/null || true)
  [ "$state" = "install ok installed" ] || missing+=("$package")
done
[ ${#missing[@]} -eq 0 ] && exit 0
as_root=()
[ "$(id -u)" -eq 0 ] || as_root=(sudo)
echo "installing ${missing[*]}"
"${as_root[@]}" apt-get update -qq
DEBIAN_FRONTEND=noninteractive "${as_root[@]}" apt-get install -y -qq --no-install-recommends "${missing[@]}" >/dev/null
