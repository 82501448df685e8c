#!/bin/bash
# Builds the page and serves it with a demo plan open. On a bare Debian 12 it installs what is missing first.
usage="usage: bash web/serve.sh [--port N] [--build-only]
  --port N       the port to serve on (8080)
  --build-only   build the page into build/web/page and stop"
set -euo pipefail
port=8080
only_build=no
while [ $# -gt 0 ]; do
  case $1 in
    --port) port=${2:?$usage}; shift ;;
    --build-only) only_build=yes ;;
    -h | --help) echo "$usage"; exit 0 ;;
    *) echo "$usage" >&2; exit 2 ;;
  esac
  shift
done
[[ $port =~ ^[0-9]+$ ]] || { echo "$usage" >&2; exit 2; }
cd "$(dirname "${BASH_SOURCE[0]}")/.."

echo "== 1. What is needed"
bash src/cmake/install.sh page
echo "== 2. The page (the first time takes a few minutes)"
[ -f build/web/build.ninja ] || emcmake cmake -S . -B build/web -G Ninja -DCMAKE_BUILD_TYPE=Release
ninja -C build/web page
page=build/web/page
echo "In $page: the folder to put on any web server; groundgrain.html in it is the whole tool in one file."
[ $only_build = yes ] && exit 0

echo "== 3. Serving"
node web/server.mjs "$page" "$port" &
server=$!
trap 'kill $server 2>/dev/null' EXIT
sleep 1
kill -0 $server 2>/dev/null || exit 1
echo
echo "Open   http://localhost:$port/   in a browser on this machine: a demo plan is open in it."
for address in $(hostname -I 2>/dev/null || true); do
  [[ $address = *:* ]] || echo "From a phone on the same network: http://$address:$port/"
done
cat <<'NOTE'
A page by plain http from another machine works as long as the network does. For use without a network a phone needs the
page from an https address, or groundgrain.html copied to it.
Stop with Ctrl+C.
NOTE
wait $server
