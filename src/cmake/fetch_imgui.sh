#!/bin/bash
# Dear ImGui from Debian's source package, unpacked into a folder: fetch_imgui.sh FOLDER. Does nothing where it is there already.
#
# The release this builds on has an older ImGui, so the source comes from the next one: a private copy of the machine's own
# Debian sources, turned from binary to source packages, with its own lists and cache. Nothing of the machine's apt is touched,
# and apt checks the archive's signature as always.
set -euo pipefail
version=1.90.1+ds-1
suite=trixie
folder=${1:?usage: fetch_imgui.sh FOLDER}
stamp=$folder/.version
if [ -f "$folder/imgui.h" ] && [ "$(cat "$stamp" 2>/dev/null)" = "$version" ]; then exit 0; fi

work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
chmod 755 "$work"
mkdir -p "$work"/{sources,lists/partial,cache/archives/partial,download}

# The first stanza or line that names a whole Debian release (not its security or backports archive).
if [ -f /etc/apt/sources.list.d/debian.sources ]; then
  awk -v RS= -v ORS='\n\n' '/(^|\n)Types:.*deb/ && !/(^|\n)Suites:[^\n]*-security/ {print; exit}' /etc/apt/sources.list.d/debian.sources \
    | sed -e '/^#/d' -e 's/^Types:.*/Types: deb-src/' -e "s/^Suites:.*/Suites: $suite/" > "$work/sources/source.sources"
fi
if [ ! -s "$work/sources/source.sources" ] && [ -f /etc/apt/sources.list ]; then
  sed -n 's/^deb \(\[[^]]*\] \)\?\([^ ]*\) [a-z]* main.*/deb-src \1\2 '$suite' main/p' /etc/apt/sources.list \
    | grep -v security | head -n 1 > "$work/sources/source.list"
fi
apt=(apt-get -qq -o Dir::Etc::sourcelist=/dev/null -o "Dir::Etc::sourceparts=$work/sources" -o "Dir::State::Lists=$work/lists"
  -o "Dir::Cache=$work/cache" -o APT::Sandbox::User="$(id -un)" -o Acquire::Languages=none)

"${apt[@]}" update
(cd "$work/download" && "${apt[@]}" source --download-only "imgui=$version")
mkdir -p "$folder"
tar -xf "$work"/download/imgui_*.orig.tar.* -C "$folder" --strip-components=1
echo "$version" > "$stamp"
echo "Dear ImGui $version is in $folder"
