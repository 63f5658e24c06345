#!/bin/sh
# Sets everything up, runs the demo, and opens JupyterLab on the tour. Usage: sh notebooks/start.sh
cd "$(dirname "$0")/.." || exit 1
. ./.ci/setup.sh

prepare notebook || exit 1
"$python" -m polywalk || exit 1

tour=notebooks/tour.ipynb
has_browser() {
    [ "$(uname)" = Darwin ] || { [ -n "${DISPLAY:-}${WAYLAND_DISPLAY:-}" ] && command -v xdg-open >/dev/null 2>&1; }
}
if [ -t 0 ] && [ -t 1 ] && has_browser; then
    say "opening JupyterLab on $tour; end it with Ctrl-C"
    exec "$python" -m jupyterlab "$tour"
fi
say "ready. No terminal with a browser here, so JupyterLab was not opened; open the tour with:"
say "  $python -m jupyterlab $tour"
