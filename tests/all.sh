#!/usr/bin/env bash
# Installs what the tests need and runs all of them: static checks, unit and server tests, browser tests.
# The last line reads "N passed, N failed".
set -uo pipefail
cd "$(dirname "$0")/.."
results=$(mktemp -d)
trap 'rm -rf "$results"' EXIT

if [ ! -f node_modules/.package-lock.json ] || [ package-lock.json -nt node_modules/.package-lock.json ]; then
  CFLAGS=-O1 CXXFLAGS=-O1 npm ci || exit 1
fi
wanted=''
command -v chromium >/dev/null || wanted='chromium'
python3 -c 'import scipy' 2>/dev/null || wanted="$wanted python3-scipy"
if [ -n "$wanted" ]; then
  as_root=''
  [ "$(id -u)" -eq 0 ] || as_root='sudo'
  if command -v apt-get >/dev/null; then
    $as_root apt-get update && $as_root apt-get install -y --no-install-recommends $wanted
  fi
  if ! command -v chromium >/dev/null; then
    echo 'The browser tests need chromium on the path. Install it and run this again.' >&2
    exit 1
  fi
  python3 -c 'import scipy' 2>/dev/null || echo 'SciPy is not here: the comparison with it is left out.' >&2
fi

run() { # name, command...: one static check, recorded as one test
  local name=$1
  shift
  echo "== $name"
  if "$@"; then echo "$name passed" >>"$results/static"; else echo "$name failed" >>"$results/static"; fi
}
run build npm run --silent build
run types npm run --silent types
run lint npm run --silent lint
run format npm run --silent format:check
echo '== unit, server and reference tests'
npx vitest run --reporter=default --reporter=json --outputFile.json="$results/vitest.json"
echo "$?" >"$results/vitest.code"
echo '== browser tests'
PLAYWRIGHT_JSON_OUTPUT_NAME="$results/playwright.json" npx playwright test --reporter=list,json
echo "$?" >"$results/playwright.code"
node tests/summary.mjs "$results"
