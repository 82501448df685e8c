#!/bin/bash
# The desktop window on a virtual screen, drawn by software: it opens, shows a picture, takes a script and closes with 0.
# usage: window_test.sh PROGRAM
set -eu
program=$1
here=$(mktemp -d)
trap 'rm -rf "$here"' EXIT
export LIBGL_ALWAYS_SOFTWARE=1 XDG_DATA_HOME=$here/data HOME=$here
on_screen() { timeout 120 xvfb-run -a -s "-screen 0 1600x1200x24" "$program" "$@"; }
fail() { echo "FAILED: $*" >&2; exit 1; }

# Number of different colours in a PPM, and its size: a blank window has one.
colours() { tail -c +16 "$1" | od -An -v -tx1 -w3 | LC_ALL=C sort -u | wc -l; }
size() { head -c 15 "$1" | sed -n 2p; }

on_screen --shot "$here/first.ppm" --size 1280x800 || fail "the window did not close with 0"
[ "$(size "$here/first.ppm")" = "1280 800" ] || fail "the picture is $(size "$here/first.ppm"), not 1280 800"
[ "$(colours "$here/first.ppm")" -gt 20 ] || fail "the window is blank"

on_screen --shot "$here/again.ppm" --size 1280x800
cmp -s "$here/first.ppm" "$here/again.ppm" || fail "two runs of the same window differ"

on_screen --shot "$here/phone.ppm" --size 360x640 --scale 2 || fail "the window did not open at phone size"
[ "$(size "$here/phone.ppm")" = "720 1280" ] || fail "a scale of 2 gave $(size "$here/phone.ppm")"

on_screen --shot "$here/dark.ppm" --size 1280x800 --dark
cmp -s "$here/first.ppm" "$here/dark.ppm" && fail "the dark theme looks like the light one"

# Processor time, in hundredths of a second, over three seconds in which nothing happens.
idle=$(timeout 120 xvfb-run -a -s "-screen 0 1600x1200x24" bash -c '
  "$0" & window=$!
  sleep 10; before=$(cut -d" " -f14,15 /proc/$window/stat)
  sleep 3; after=$(cut -d" " -f14,15 /proc/$window/stat)
  kill $window; wait $window 2> /dev/null
  set -- $before $after; echo $(($3 + $4 - $1 - $2))' "$program")
[ "$idle" -le 15 ] || fail "the idle window used ${idle}0 ms of processor in 3 s"

printf 'wait\nkey 4\nwait\n' > "$here/script"
on_screen --shot "$here/lanes.ppm" --size 1280x800 --script "$here/script" || fail "the script did not play"
cmp -s "$here/first.ppm" "$here/lanes.ppm" && fail "key 4 did not change the view"

"$program" demo deck -o "$here/deck.json"
on_screen "$here/deck.json" --shot "$here/deck.ppm" --size 1280x800 || fail "a plan file did not open"
cmp -s "$here/first.ppm" "$here/deck.ppm" && fail "a plan file looks like the first demo"
on_screen --shot "$here/kept.ppm" --size 1280x800
grep -q "Ramp deck" "$here/data/groundgrain/plan.json" || fail "the plan was not kept on this device"

on_screen "$here/none.json" --shot "$here/none.ppm" 2> "$here/said" && fail "a missing plan was taken"
grep -q "Cannot read" "$here/said" || fail "a missing plan was not complained about"
echo 'jump 3' > "$here/script"
on_screen --shot "$here/none.ppm" --script "$here/script" 2> "$here/said" && fail "a script with a wrong line was taken"
grep -q "line 1 of the script" "$here/said" || fail "the wrong line was not named"
echo "the desktop window draws, takes a script, keeps its plan and closes"
