#!/bin/sh
# Sets everything up, then runs every check and sums them up. Usage: sh tests/run.sh
cd "$(dirname "$0")/.." || exit 1
. ./.ci/setup.sh

prepare test fonts-dejavu-core || exit 1

# The browser: the machine's Chromium, Debian's package, else the build that Playwright fetches for itself.
find_browser() {
    for name in "${POLYWALK_BROWSER:-}" chromium chromium-browser google-chrome; do
        [ -n "$name" ] && found=$(command -v "$name") && [ -x "$found" ] && POLYWALK_BROWSER=$found && return 0
    done
    POLYWALK_BROWSER=$("$python" -c '
import os
from playwright.sync_api import sync_playwright
with sync_playwright() as p:
    path = p.chromium.executable_path
    print(path if os.path.exists(path) else "")') && [ -n "$POLYWALK_BROWSER" ]
}
if ! find_browser; then
    add_packages chromium
    deps=
    [ "$(id -u)" = 0 ] && deps=--with-deps
    find_browser || "$python" -m playwright install $deps chromium
    find_browser || say "no Chromium was found or could be installed; name one with POLYWALK_BROWSER=/path/to/chromium"
fi
export POLYWALK_BROWSER

summary=
failures=0
stage() {
    title=$1
    shift
    printf '\n== %s\n' "$title"
    began=$(date +%s)
    if "$@"; then verdict=passed; else verdict="FAILED ($?)" failures=$((failures + 1)); fi
    summary="$summary$(printf '%-36s %s, %s s' "$title" "$verdict" $(($(date +%s) - began)))
"
}

in_browser() {
    if [ -z "$POLYWALK_BROWSER" ]; then
        say "the browser tests cannot run: no Chromium (Debian: sudo apt-get install chromium)"
        return 1
    fi
    "$python" -m pytest -q -m browser tests/browser
}

stage "style (ruff check)" "$python" -m ruff check .
stage "layout (ruff format)" "$python" -m ruff format --check .
stage "types (mypy --strict)" "$python" -m mypy
stage "unit, property and doctests" "$python" -m pytest -q -m "not browser"
stage "notebooks (nbval)" "$python" -m pytest -q --nbval notebooks --nbval-cell-timeout=300
stage "browser (JupyterLab, Notebook 7)" in_browser

printf '\n== summary\n%s' "$summary"
if [ "$failures" -gt 0 ]; then
    say "$failures of the checks failed"
    exit 1
fi
say "every check passed"
