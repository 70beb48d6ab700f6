"""How long a user waits before anything happens."""

from __future__ import annotations

import subprocess
import sys
from collections.abc import Callable
from typing import Any

import pytest


def run(*arguments: str) -> int:
    """Run this Python to its end and return the exit code."""
    return subprocess.run([sys.executable, *arguments], check=False, capture_output=True).returncode


@pytest.mark.benchmark(group="start")
def test_python_alone(benchmark: Callable[..., Any]) -> None:
    """An empty Python program."""
    assert benchmark(run, "-c", "pass") == 0


@pytest.mark.benchmark(group="start")
def test_import_lineproof(benchmark: Callable[..., Any]) -> None:
    """Importing the package."""
    assert benchmark(run, "-c", "import lineproof") == 0


@pytest.mark.benchmark(group="start")
def test_help(benchmark: Callable[..., Any]) -> None:
    """The help of the command."""
    assert benchmark(run, "-m", "lineproof", "--help") == 0


@pytest.mark.benchmark(group="start")
def test_import_for_a_notebook(benchmark: Callable[..., Any]) -> None:
    """What the first cell of a notebook imports."""
    assert benchmark(run, "-c", "from lineproof import Sheet, beams; beams.floor_beam") == 0
