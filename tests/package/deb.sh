#!/bin/sh
# Makes the Debian packages and asks lintian. usage: deb.sh BUILD
set -eu
cd "$1"
rm -f ./*.deb
cpack -G DEB > package.log 2>&1 || { cat package.log; exit 1; }
ls ./*.deb
lintian --fail-on error,warning --suppress-tags initial-upload-closes-no-bugs ./*.deb
