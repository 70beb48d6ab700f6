"""Where each fact of the catalogue comes from; a formula names one of these as its basis."""

from __future__ import annotations

from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY

MECHANICS = "mechanics"
"""Follows from statics, geometry and strain compatibility alone; no clause is needed for it."""

NBC_LOADS = "NBC 2020, Division B, 4.1.3 to 4.1.5; same values in the NBC 2015 format"
NBC_APPENDIX_D = "NBC 2020, Division B, Appendix D; the same in other editions from memory"
BENTZ_2006 = "Bentz 2006, conference volume (Springer), for A23.3-04; later editions from memory"
F_R_QUOTED = "A23.3-14, 8.6.4, as quoted in public; later editions from memory"
G30_18_TABLE = "CSA G30.18 bar sizes, public tables of bar data"
COVER_QUOTED = "A23.1 Table 17 as quoted in a public discussion (75 mm; 30 mm for beams, N)"
NBC_SERVICE = "NBC 2020, Division B, Table 4.1.3.4; earlier editions: commentary only"
SHEAR_2004 = "A23.3-04, public page excerpts of 11.3; later editions from memory"
SHEAR_DERIVED = "follows from the general method of A23.3-04; rounding, later editions from memory"
DEFLECTION_QUOTED = "A23.3-14, 9.8.2.3, as quoted in public; later editions from memory"
DEVELOPMENT_GUIDE = "public table of ℓd to A23.3-14, reproduced; later editions from memory"
LONG_TERM_PAPER = "paper on deflections of slabs (S, S/(1 + 50ρ′)); other editions from memory"

BASES = frozenset(
    {
        COMMON_PRACTICE,
        FROM_MEMORY,
        MECHANICS,
        NBC_LOADS,
        NBC_APPENDIX_D,
        BENTZ_2006,
        F_R_QUOTED,
        G30_18_TABLE,
        COVER_QUOTED,
        NBC_SERVICE,
        SHEAR_2004,
        SHEAR_DERIVED,
        DEFLECTION_QUOTED,
        DEVELOPMENT_GUIDE,
        LONG_TERM_PAPER,
    }
)
