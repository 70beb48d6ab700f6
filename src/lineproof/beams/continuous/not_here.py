"""The checks of a complete calculation that are made elsewhere, or not at all."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.continuous import interface, numbers
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.stirrup_corners import CORNERS
from lineproof.beams.inputs import SNOWED_ON
from lineproof.standards.a23_3 import hooks
from lineproof.standards.a23_3.bars import BARS

NOT_HERE = (
    {"check": "Concentrated live loads, unless given as loads", "clause": "NBC 4.1.5.9"},
    {"check": "Structural integrity of the building", "clause": "NBC 4.1.1.3"},
    {"check": "Vibration of the floor", "clause": "NBC 4.1.3.6"},
    {"check": "Drift of the building on gravity beams", "clause": "21.11"},
    {"check": "The slab, the girders and the columns", "clause": "their own calculations"},
)


def not_here(inputs: ContinuousInputs) -> list[Mapping[str, str]]:
    """Return the checks of a complete calculation that are made elsewhere, or not at all."""
    rows = [dict(row) for row in NOT_HERE]
    if inputs.slab and inputs.slab_bars is None:
        rows.append(dict(interface.NOT_COVERED))
    if inputs.shape == "L" and not inputs.torques and inputs.forces_file is None:
        rows.append({"check": "Torsion from the slab: no torque is given", "clause": "11.3.10"})
    if any(support.carrier == "girder" for support in inputs.supports):
        rows.append({"check": "Torsion of the girders by the end moments", "clause": "11.3.10"})
        if inputs.as_built:
            what = "Hanger stirrups that stand in the girders: only those needed are calculated"
            rows.append({"check": what, "clause": "11.2.12"})
    if inputs.stirrup_legs > CORNERS:
        what = "A bar in each bend of the inner stirrups: only the bars of the schedule stand there"
        rows.append({"check": what, "clause": "12.13.3"})
    if any(support.carrier == "wall" for support in inputs.supports):
        what = "The walls: bearing is checked for the concrete of the beam, not for masonry"
        rows.append({"check": what, "clause": "their own calculations"})
    if _ties_unknown(inputs):
        what = "Ties around the hooks where the beam ends: none are given with bars and stirrups"
        rows.append({"check": what, "clause": "12.5.4"})
    if not inputs.slab:
        rows.append({"check": "Fire resistance of the floor carried", "clause": "NBC D-2.2"})
    return [*rows, *_loads_not_here(inputs)]


def _ties_unknown(inputs: ContinuousInputs) -> bool:
    """Tell whether hooks of a beam as built have so small a cover that they ask for ties."""
    hooked = any(
        run.bent_at(support)
        for support in (1, len(inputs.supports))
        for run in inputs.bar_runs or ()
        if support not in inputs.hook_ties
    )
    d_bs = BARS.number(inputs.stirrup, "d_b")
    c_top = numbers.value(hooks.FACE_COVER, {"c_c": inputs.cover.value, "d_bs": d_bs})
    return inputs.as_built and hooked and not numbers.holds(hooks.FACE_COVERED, {"c_top": c_top})


def _loads_not_here(inputs: ContinuousInputs) -> list[Mapping[str, str]]:
    """Return what certain loads would ask for beyond what is calculated."""
    own = inputs.forces_file is None
    rows: list[Mapping[str, str]] = []
    if own and inputs.construction_load is not None:
        what = "Strength under the construction load: it counts for deflections alone"
        rows.append({"check": what, "clause": "NBC 4.1.3.2"})
    if any(load.form == "point" for load in inputs.loads):
        what = "Hanger stirrups where beams carried from the side bring in point loads"
        rows.append({"check": what, "clause": "11.2.12"})
    if own and inputs.partitions is not None:
        what = "Uplift and stress reversal with the partitions taken away"
        rows.append({"check": what, "clause": "NBC 4.1.4.1"})
    if own and (inputs.snow is not None or any(load.kind == "S" for load in inputs.loads)):
        what = "Snow on parts of the beam only: it lies on all spans here"
        rows.append({"check": what, "clause": "NBC 4.1.6.3"})
    if own and inputs.use in SNOWED_ON:
        rows.append({"check": "Wind that lifts the roof or balcony", "clause": "NBC 4.1.7"})
    return rows
