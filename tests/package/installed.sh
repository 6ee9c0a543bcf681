#!/bin/sh
# Installs the build into a folder of its own and uses it as a stranger would: the command, the manual,
# find_package and pkg-config, with the headers of Boost, Eigen and nlohmann out of reach.
# usage: installed.sh BUILD SOURCE
set -eu
build=$1
source=$2
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT

cmake --install "$build" --prefix "$work/usr" > /dev/null
"$work/usr/bin/steelyard" pool "$work/usr/share/doc/steelyard/examples/demo.csv" > /dev/null
for page in steelyard steelyard-pool steelyard-check; do
  gzip -dc "$work/usr/share/man/man1/$page.1.gz" | grep -q '^\.TH'
done

# An include path without the header-only dependencies: only the compiler's own folders and ours.
mkdir "$work/blocked"
for header in boost Eigen eigen3 nlohmann; do
  mkdir "$work/blocked/$header"
done
for header in boost/version.hpp boost/math/quadrature/gauss.hpp eigen3/Eigen/Core nlohmann/json.hpp; do
  mkdir -p "$work/blocked/$(dirname "$header")"
  echo '#error "a public header must not need this"' > "$work/blocked/$header"
done
cmake -S "$source/tests/package/consumer" -B "$work/found" -DCMAKE_PREFIX_PATH="$work/usr" \
  -DCMAKE_CXX_FLAGS="-I$work/blocked -Wall -Wextra -Werror" > "$work/log" 2>&1 || { cat "$work/log"; exit 1; }
cmake --build "$work/found" > "$work/log" 2>&1 || { cat "$work/log"; exit 1; }
"$work/found/consumer" | grep -q '"command": "pool"'

if command -v pkg-config > /dev/null; then
  pc=$(dirname "$(find "$work/usr" -name steelyard.pc)")
  flags=$(PKG_CONFIG_PATH=$pc pkg-config --cflags --libs steelyard)
  # shellcheck disable=SC2086
  g++ -std=c++20 "$source"/tests/package/consumer/*.cpp -o "$work/by-pkg-config" $flags
  "$work/by-pkg-config" | grep -q '"command": "pool"'
fi
echo "installed and used"
