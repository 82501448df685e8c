#!/bin/bash
# Installs what is missing on a bare Debian 12, builds everything and runs every test; the last line counts them.
usage="usage: bash tests/run.sh [--fast]
  --fast   only the native tests and those of the rooms as WebAssembly"
set -uo pipefail
fast=no
case ${1-} in
  "") ;;
  --fast) fast=yes ;;
  -h | --help) echo "$usage"; exit 0 ;;
  *) echo "$usage" >&2; exit 2 ;;
esac
cd "$(dirname "${BASH_SOURCE[0]}")/.." || exit 1
export LIBGL_ALWAYS_SOFTWARE=1
logs=build/logs
mkdir -p $logs
passed=0
failed=0
started=$SECONDS

section() { printf '\n== %s (%d s)\n' "$1" $((SECONDS - started)); }
count() { # count LABEL PASSED FAILED
  printf '%-34s %5d passed %4d failed\n' "$1" "$2" "$3"
  passed=$((passed + $2))
  failed=$((failed + $3))
}
# step LABEL COMMAND...: something that has to work before there is anything to count; failing counts as one.
step() {
  local label=$1 log
  log=$logs/$(tr -c 'a-z0-9\n' - <<<"${label,,}").log
  shift
  "$@" >"$log" 2>&1 && return 0
  tail -n 40 "$log"
  count "$label" 0 1
  return 1
}
# suite LABEL COMMAND...: a doctest program, counted by its test cases. One that ends without its summary has failed.
suite() {
  local label=$1 log status line p f
  log=$logs/$(tr -c 'a-z0-9\n' - <<<"${label,,}").log
  shift
  "$@" --no-colors=true >"$log" 2>&1
  status=$?
  line=$(grep -a '^\[doctest\] test cases:' "$log" | tail -n 1)
  p=$(sed -n 's/.*| *\([0-9]*\) passed.*/\1/p' <<<"$line")
  f=$(sed -n 's/.*| *\([0-9]*\) failed.*/\1/p' <<<"$line")
  p=${p:-0}
  f=${f:-0}
  [ $status != 0 ] && [ "$f" = 0 ] && f=1
  [ "$f" != 0 ] && tail -n 60 "$log"
  count "$label" "$p" "$f"
}
# node_tests LABEL COMMAND...: node's own runner, in TAP.
node_tests() {
  local label=$1 log status p f
  log=$logs/$(tr -c 'a-z0-9\n' - <<<"${label,,}").log
  shift
  "$@" >"$log" 2>&1
  status=$?
  grep -aE '^ *(not )?ok [0-9]+ - ' "$log" | sed -E 's/^ *(not )?ok [0-9]+ - /  \1/; s/^  not /  FAILED /'
  p=$(sed -n 's/^# pass \([0-9]*\)/\1/p' "$log" | tail -n 1)
  f=$(sed -n 's/^# fail \([0-9]*\)/\1/p' "$log" | tail -n 1)
  p=${p:-0}
  f=${f:-0}
  [ $status != 0 ] && [ "$f" = 0 ] && f=1
  [ "$f" != 0 ] && grep -aE -A 25 '^ *not ok' "$log" | head -n 150
  count "$label" "$p" "$f"
}
# others LABEL FOLDER: what ctest knows besides the doctest programs.
others() {
  local log=$logs/others.log total f
  ctest --test-dir "$2" --output-on-failure --exclude-regex '^(wave|echo|survey|draw|paper|ui|app)$' >"$log" 2>&1
  total=$(sed -n 's/.*tests failed out of \([0-9]*\).*/\1/p' "$log")
  [ -n "$total" ] || return 0 # ctest knows no other
  f=$(sed -n 's/.*, \([0-9]*\) tests\{0,1\} failed out of.*/\1/p' "$log")
  [ "$f" != 0 ] && tail -n 60 "$log"
  count "$1" $((total - f)) "$f"
}

section "What is needed"
bash src/cmake/install.sh tests || { count "installing" 0 1; echo "$passed passed, $failed failed"; exit 1; }

section "Form"
formatted() { git ls-files 'src/*.cpp' 'src/*.hpp' 'tests/*.cpp' 'tests/*.hpp' | xargs clang-format --dry-run -Werror; }
step "sources are formatted" formatted && count "sources are formatted" 1 0

section "Native"
if step "native configure" cmake -S . -B build/native -G Ninja -DCMAKE_BUILD_TYPE=Release \
  && step "native build" ninja -C build/native; then
  for test in build/native/test_*; do
    [ -x "$test" ] && [ -f "$test" ] && suite "native ${test##*/test_}" "$test"
  done
  others "window, package and others" build/native
fi

section "WebAssembly"
page=no
if step "web configure" emcmake cmake -S . -B build/web -G Ninja -DCMAKE_BUILD_TYPE=Release \
  && step "web build" ninja -C build/web; then
  page=yes
  for test in build/web/test_*.js; do
    suite "wasm $(basename "$test" .js | sed s/test_//)" node "$test"
  done
fi

if [ $fast = no ]; then
  section "Sanitizers"
  if step "sanitizer configure" cmake -S . -B build/sanitize -G Ninja -DCMAKE_BUILD_TYPE=Debug -DCMAKE_CXX_FLAGS_DEBUG=-O1 \
    -DGG_SANITIZE=ON -DGG_UI=OFF && step "sanitizer build" ninja -C build/sanitize; then
    for test in build/sanitize/test_*; do
      [ -x "$test" ] && [ -f "$test" ] && suite "sanitized ${test##*/test_}" "$test"
    done
  fi

  section "Browsers"
  if [ $page = no ]; then
    count "no page to open" 0 1
  elif step "browser drivers" npm --prefix tests/browser install --no-package-lock --no-audit --no-fund; then
    node_tests "browsers" timeout 1800 xvfb-run -a -s "-screen 0 1600x1200x24" \
      node --test --test-reporter=tap tests/browser/*_test.mjs
  fi
fi

section "All"
echo "$passed passed, $failed failed"
[ $failed = 0 ]
