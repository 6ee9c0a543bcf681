#!/bin/sh
# add_subdirectory: the consumer configures with the whole project inside; nothing but the library is
# asked for, and no test, command or install rule comes along.
# usage: added.sh SOURCE
set -eu
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
cmake -S "$1/tests/package/consumer" -B "$work/build" -G Ninja -DSTEELYARD_SOURCE="$1" > "$work/log" 2>&1 ||
  { cat "$work/log"; exit 1; }
targets=$(ninja -C "$work/build" -t targets all)
echo "$targets" | grep -q '^consumer:'
if echo "$targets" | grep -Eq '^(steelyard_command|test_base):'; then
  echo "the command or the tests came along"
  exit 1
fi
echo "added"
