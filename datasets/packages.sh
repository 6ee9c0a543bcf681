# Which Debian packages are needed, and how the missing ones are installed. Sourced by the scripts.

build_packages="g++ cmake ninja-build libboost-dev libeigen3-dev nlohmann-json3-dev libfmt-dev libcli11-dev"
test_packages="$build_packages catch2 python3 python3-jsonschema chromium librsvg2-bin fonts-dejavu-core"

# install_missing PACKAGE...: asks the package system; goes to the network only when something is missing.
install_missing() {
  missing=""
  for package in "$@"; do
    status=$(dpkg-query -W -f '${db:Status-Status}' "$package" 2> /dev/null || true)
    [ "$status" = installed ] || missing="$missing $package"
  done
  [ -n "$missing" ] || return 0
  if ! command -v apt-get > /dev/null; then
    echo "These packages are needed but can't be installed here:$missing" >&2
    exit 1
  fi
  as_root=""
  if [ "$(id -u)" -ne 0 ]; then
    if ! command -v sudo > /dev/null; then
      echo "Packages are missing and only root can install them. As root: apt-get install$missing" >&2
      exit 1
    fi
    as_root="sudo"
  fi
  echo "Installing:$missing" >&2
  $as_root env DEBIAN_FRONTEND=noninteractive apt-get -qq update >&2
  $as_root env DEBIAN_FRONTEND=noninteractive apt-get -qq install -y --no-install-recommends $missing >&2
}
