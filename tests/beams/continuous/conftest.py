"""Beams run through the whole flow once for all tests that only look at them."""

from __future__ import annotations

import pytest

from lineproof.record import Record

from .beam_with_gaps import Existing, built
from .edge_beam import Edge, edge, make
from .flow import record_of


@pytest.fixture(scope="session")
def floor() -> Record:
    """The record of the three-span gallery beam."""
    return record_of()


@pytest.fixture(scope="session")
def edge_beam() -> Edge:
    """The edge beam of the notebooks, its design and its record."""
    return make(edge())


@pytest.fixture(scope="session")
def existing() -> Existing:
    """The beam with gaps, its sheet and its record."""
    beam, sheet = built(cures=True)
    return beam, sheet, sheet.close()
