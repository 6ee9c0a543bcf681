#!/bin/sh
# Installs what is missing, builds everything and runs the whole suite. Arguments go to ctest.
# STEELYARD_PRESET chooses another preset of CMakePresets.json than release.
set -eu
cd "$(dirname "$0")/.."

. datasets/packages.sh
install_missing $test_packages

preset=${STEELYARD_PRESET:-release}
cmake --preset "$preset" > /dev/null
cmake --build --preset "$preset"

log=$(mktemp)
trap 'rm -f "$log"' EXIT
status=0
ctest --preset "$preset" "$@" > "$log" 2>&1 || status=$?
cat "$log"

# ctest says "100% tests passed, 0 tests failed out of N"; the same once more, counted.
total=$(sed -n 's/.*tests failed out of \([0-9]*\).*/\1/p' "$log")
failed=$(sed -n 's/.*, \([0-9]*\) tests failed out of.*/\1/p' "$log")
echo "$(( ${total:-0} - ${failed:-0} )) passed, ${failed:-0} failed"
[ "${total:-0}" -gt 0 ] || { echo "No test was run." >&2; exit 1; }
exit "$status"
