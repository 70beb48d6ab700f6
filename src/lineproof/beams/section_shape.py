"""What a section figure is drawn from: outline and bars [mm]."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal


@dataclass(frozen=True, slots=True)
class SectionShape:
    """Concrete outline, mm: a rectangle, a T, or an L whose flange lies to the right of the web."""

    kind: Literal["rectangle", "T", "L"]
    b_w: float
    h: float
    b_f: float = 0.0
    h_f: float = 0.0

    @property
    def overhangs(self) -> tuple[float, float]:
        """Flange beyond the web, left and right, mm."""
        if self.kind == "rectangle":
            return (0.0, 0.0)
        beyond = self.b_f - self.b_w
        return (beyond / 2, beyond / 2) if self.kind == "T" else (0.0, beyond)


@dataclass(frozen=True, slots=True)
class BarRow:
    """Bars in one horizontal row: ``depth`` of their centres below the top face, mm."""

    count: int
    diameter: float
    depth: float
    label: str


@dataclass(frozen=True, slots=True)
class SkinBars:
    """Skin bars of each side face: ``side`` to their centres, spread over ``height``, mm.

    ``bottom`` is the height of the lower end of the strip above the soffit.
    """

    count: int
    diameter: float
    side: float
    bottom: float
    height: float
    label: str


@dataclass(frozen=True, slots=True)
class SlabBars:
    """Top bars in each overhang, spread over ``width`` from the face of the web, mm."""

    count: int
    diameter: float
    depth: float
    width: float
