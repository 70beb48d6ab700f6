"""The gates of style: lint, format and types, as pyproject.toml sets them."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[1]
GATES = [("ruff", "check", "."), ("ruff", "format", "--check", "."), ("mypy",)]


@pytest.mark.parametrize("gate", GATES, ids=" ".join)
def test_gate(gate: tuple[str, ...]) -> None:
    """Every exception stands in pyproject.toml with its reason."""
    made = subprocess.run(
        [sys.executable, "-m", *gate], cwd=ROOT, check=False, capture_output=True, text=True
    )

    assert made.returncode == 0, made.stdout + made.stderr
