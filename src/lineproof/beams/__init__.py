"""Beams: the engineering flow from inputs to checked reinforcement."""

from lineproof.beams.continuous.beam import ContinuousBeam, continuous_beam
from lineproof.beams.floor_beam import FloorBeam, floor_beam
from lineproof.beams.study import SectionStudy, section_study
from lineproof.beams.validation.study import ValidationStudy, validation_study

__all__ = [
    "ContinuousBeam",
    "FloorBeam",
    "SectionStudy",
    "ValidationStudy",
    "continuous_beam",
    "floor_beam",
    "section_study",
    "validation_study",
]
