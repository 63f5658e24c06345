"""Shared by all tests: the tests folder is importable (the zoo, the certificate checker); examples repeat in CI.

In CI a skip is a failure, unless the test is marked ``needs_shared_data``: a check that did not run proves nothing.
"""

from __future__ import annotations

import os
import sys
from pathlib import Path
from typing import Any

import pytest
from hypothesis import settings

sys.path.insert(0, str(Path(__file__).parent))

settings.register_profile("ci", derandomize=True, deadline=None, print_blob=True)
settings.register_profile("dev", deadline=None)
settings.load_profile("ci" if os.environ.get("CI") else "dev")


def pytest_sessionfinish(session: pytest.Session) -> None:
    if os.environ.get("CI") and forbidden_skips(session.config) and session.exitstatus == pytest.ExitCode.OK:
        session.exitstatus = pytest.ExitCode.TESTS_FAILED


def pytest_terminal_summary(terminalreporter: Any, config: pytest.Config) -> None:
    if os.environ.get("CI"):
        for report in forbidden_skips(config):
            terminalreporter.write_line(f"FAILED: skipped in CI without the marker needs_shared_data: {report.nodeid}")


def forbidden_skips(config: pytest.Config) -> list[Any]:
    """The reports of tests and modules that were skipped without the one marker that allows it."""
    reporter = config.pluginmanager.get_plugin("terminalreporter")
    skipped = reporter.stats.get("skipped", []) if reporter else []
    return [report for report in skipped if "needs_shared_data" not in getattr(report, "keywords", {})]
