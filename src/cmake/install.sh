#!/bin/bash
# Debian packages for what is to be done, where they are missing: install.sh page|desktop|tests ...
# Says what it installs, asks nothing, changes nothing else; needs root or sudo only when something is missing.
set -euo pipefail

base=(ca-certificates cmake doctest-dev fonts-dejavu-core fonttools g++ libeigen3-dev ninja-build nlohmann-json3-dev xz-utils)
page=("${base[@]}" emscripten esbuild librsvg2-bin nodejs)
desktop=("${base[@]}" libgl1-mesa-dev libglfw3-dev)
tests=("${page[@]}" "${desktop[@]}" chromium clang-format dpkg-dev firefox-esr libgl1-mesa-dri npm webkit2gtk-driver xauth xvfb)

has() {
  case $1 in  # a machine may have these from elsewhere than Debian
    nodejs) command -v node >/dev/null ;;
    npm) command -v npm >/dev/null ;;
    *) [ "$(dpkg-query -W -f '${db:Status-Status}' "$1" 2>/dev/null)" = installed ] ;;
  esac
}

missing=()
for group in "$@"; do
  case $group in
    page) list=("${page[@]}") ;;
    desktop) list=("${desktop[@]}") ;;
    tests) list=("${tests[@]}") ;;
    *) echo "install.sh: no group called $group (page, desktop, tests)" >&2; exit 2 ;;
  esac
  for package in "${list[@]}"; do
    has "$package" || [[ " ${missing[*]-} " = *" $package "* ]] || missing+=("$package")
  done
done
if [ ${#missing[@]} = 0 ]; then
  echo "Everything that is needed is installed."
  exit 0
fi

as_root=()
if [ "$(id -u)" != 0 ]; then
  command -v sudo >/dev/null || { echo "Missing: ${missing[*]}. Install them as root (there is no sudo here), then run this again." >&2; exit 1; }
  as_root=(sudo)
fi
echo "Installing from Debian: ${missing[*]}"
"${as_root[@]}" apt-get -qq update
"${as_root[@]}" env DEBIAN_FRONTEND=noninteractive apt-get -qq install -y --no-install-recommends "${missing[@]}" >/dev/null
