"""JupyterLab and Notebook 7 on a free loopback port, a Chromium, a notebook in it. Screenshots go to artefacts/.

The browser is POLYWALK_BROWSER, else the machine's Chromium, else Playwright's own build.
"""

from __future__ import annotations

import os
import shutil
import socket
import subprocess
import sys
import time
import urllib.request
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest
from lab import Lab

FLAGS = (
    "--no-sandbox --use-angle=swiftshader --enable-unsafe-swiftshader --ignore-gpu-blocklist --disable-quic "
    "--disable-background-networking --disable-component-update --disable-sync --no-first-run"
)
OPTIONS = (
    "--no-browser --ip=127.0.0.1 --port-retries=0 --expose-app-in-browser --allow-root --IdentityProvider.token= "
    "--ServerApp.password= --ServerApp.disable_check_xsrf=True --LabApp.news_url= --LabApp.extension_manager=readonly"
)
SECONDS_TO_START = 90


def chromium() -> str | None:
    for name in (os.environ.get("POLYWALK_BROWSER"), "chromium", "chromium-browser", "google-chrome"):
        if name and shutil.which(name):
            return shutil.which(name)
    return None


def free_port() -> int:
    with socket.socket() as probe:
        probe.bind(("127.0.0.1", 0))
        return int(probe.getsockname()[1])


@pytest.fixture(scope="session")
def server(tmp_path_factory: pytest.TempPathFactory) -> Iterator[tuple[str, Path]]:
    home, port = tmp_path_factory.mktemp("jupyter"), free_port()
    root = home / "notebooks"
    root.mkdir()
    quiet = home / "settings" / "@jupyterlab" / "apputils-extension"
    quiet.mkdir(parents=True)
    (quiet / "notification.jupyterlab-settings").write_text('{"fetchNews": "false"}')
    exposed = '{"JupyterNotebookApp": {"expose_app_in_browser": true}}'
    (home / "config").mkdir()
    (home / "config" / "jupyter_notebook_config.json").write_text(exposed)
    own = {f"JUPYTER_{part}_DIR": str(home / part.lower()) for part in ("CONFIG", "DATA", "RUNTIME")}
    own["JUPYTERLAB_SETTINGS_DIR"] = str(home / "settings")
    command = [sys.executable, "-m", "jupyterlab", *OPTIONS.split(), f"--port={port}", f"--ServerApp.root_dir={root}"]
    with (home / "log").open("w") as log:
        process = subprocess.Popen(command, env={**os.environ, **own}, stdout=log, stderr=subprocess.STDOUT)
    try:
        wait_for(f"http://127.0.0.1:{port}/api/status", process, home / "log")
        yield f"http://127.0.0.1:{port}", root
    finally:
        process.terminate()
        process.wait(30)


def wait_for(address: str, process: subprocess.Popen[bytes], log: Path) -> None:
    ends = time.monotonic() + SECONDS_TO_START
    while time.monotonic() < ends:
        if process.poll() is not None:
            break
        try:
            with urllib.request.urlopen(address, timeout=2):
                return
        except OSError:
            time.sleep(0.2)
    pytest.fail(f"JupyterLab did not answer; its log ends with:\n{log.read_text()[-2000:]}")


@pytest.fixture(scope="session")
def browser() -> Iterator[Any]:
    from playwright.sync_api import Error, sync_playwright

    with sync_playwright() as play:
        try:
            started = play.chromium.launch(executable_path=chromium(), args=FLAGS.split())
        except Error as error:
            pytest.skip(f"no Chromium to drive (name one with POLYWALK_BROWSER): {error}")
        yield started
        started.close()


@pytest.fixture
def lab(server: tuple[str, Path], browser: Any, request: pytest.FixtureRequest) -> Iterator[Lab]:
    address, root = server
    context = browser.new_context(viewport={"width": 1600, "height": 1200})
    shots = Path(__file__).parents[2] / "artefacts"
    shots.mkdir(exist_ok=True)
    opened = Lab(context.new_page(), address, root, shots, request.node.name)
    try:
        yield opened
    finally:
        opened.shoot("end")
        opened.close()
        context.close()
