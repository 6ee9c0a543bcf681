#!/bin/sh
# Makes the Debian packages and asks lintian. usage: deb.sh BUILD
set -eu
cd "$1"
# Debian keeps libraries of each architecture in a folder of their own.
cmake -DCMAKE_INSTALL_PREFIX=/usr -DCMAKE_INSTALL_LIBDIR="lib/$(g++ -print-multiarch)" . > package.log
rm -f ./*.deb
cpack -G DEB > package.log 2>&1 || { cat package.log; exit 1; }
ls ./*.deb
lintian --fail-on error,warning --suppress-tags initial-upload-closes-no-bugs ./*.deb
