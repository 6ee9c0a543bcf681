#!/bin/sh
# Installs what is missing, builds Steelyard and pools the demo studies: prints the forest and
# writes forest.svg. Made for Debian 12; asks the package system first, so that a second run needs
# neither the network nor more than a few seconds.
set -eu
cd "$(dirname "$0")/.."

. datasets/packages.sh
install_missing $build_packages

build=build
# The tests need one package more; a tree that is set up for them stays so.
[ -f "$build/CMakeCache.txt" ] && tests="" || tests=-DSTEELYARD_TESTS=OFF
cmake -S . -B "$build" -G Ninja -DCMAKE_BUILD_TYPE=Release $tests > "$build.log" 2>&1 ||
  { cat "$build.log"; exit 1; }
rm -f "$build.log"
ninja -C "$build" --quiet steelyard_command

"$build/steelyard" pool datasets/demo.csv --svg "$build/forest.svg"
echo
echo "The figure is in $build/forest.svg."
