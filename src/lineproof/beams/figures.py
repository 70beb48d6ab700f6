"""Figures of a beam calculation: pure functions from plain numbers to drawings."""

from __future__ import annotations

from lineproof.beams.figure_capacity import MomentLevel, capacity_figure, stress_strain_figure
from lineproof.beams.figure_loading import UniformLoad, loading_figure
from lineproof.beams.figure_section import section_figure
from lineproof.beams.figure_strain import Force, StressState, strain_stress_figure
from lineproof.beams.section_shape import BarRow, SectionShape, SkinBars, SlabBars

__all__ = [
    "BarRow",
    "Force",
    "MomentLevel",
    "SectionShape",
    "SkinBars",
    "SlabBars",
    "StressState",
    "UniformLoad",
    "capacity_figure",
    "loading_figure",
    "section_figure",
    "strain_stress_figure",
    "stress_strain_figure",
]
