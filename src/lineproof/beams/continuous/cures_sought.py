"""The cures of one check that fails: what may be changed in it, and the nearest that holds."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass, replace

from lineproof.beams.continuous import cures as find
from lineproof.beams.continuous import cures_checks
from lineproof.beams.continuous.cures import Cure, Utilisation, Variable
from lineproof.beams.continuous.cures_developed import developed, here
from lineproof.beams.continuous.cures_replay import AnotherCaseError, Replay, behind, bound_names
from lineproof.beams.continuous.cures_table import LONGER, MORE_AREA, SOUGHT
from lineproof.record import Entry, Part
from lineproof.record.entry import GIVEN, LOOKUP, VALUES
from lineproof.record.printing import utilisation
from lineproof.standards.a23_3 import bars, cutoff, development, flexure, minimum, shear
from lineproof.standards.a23_3.bars import BARS

_BENDING = (flexure.STRENGTH, flexure.YIELDS, cutoff.SUFFICES)
_FITS = bars.FITS.key
NONE_IN_LAYER = "no number of bars {} in one layer"
_LONGEST_SUPPORT = 1500
_MOST_HANGERS = 20
_STEP = 10.0
_COUNTS = ("n_b", "n_t", "n_1", "n_d")
_SAME = 1e-9
Change = Callable[[float], Mapping[str, float]]


@dataclass(frozen=True, eq=False)
class Sought:
    """A value that may be changed: which entries it stands for, what can be built, how it is told.

    ``spread`` turns a value into the changes of all entries that follow it.
    """

    roots: Mapping[str, tuple[Entry, ...]]
    variable: Variable
    spread: Change
    told: Callable[[float], str] | None = None
    besides: tuple[Entry, ...] = ()
    """Other checks that must hold with the changed value."""


def cures_of(check: Entry) -> list[Cure]:
    """Return the cures of a check that fails, each found by computing the check again.

    Empty where none is sought: then depth, steel, width and concrete strength are not what it is
    about.
    """
    check = _stand_in(check)
    test = check.source
    if test in LONGER or test in MORE_AREA:
        return [_more(check, LONGER.get(test) or MORE_AREA[test])]
    bound = bound_names(check)
    made = []
    for name in SOUGHT.get(test, ()):
        cure = _by(name, check, bound)
        if cure is not None:
            made.append(cure)
    return made


def _by(name: str, check: Entry, bound: Mapping[str, Entry]) -> Cure | None:
    """Return the cure by a name of ``SOUGHT``: of what it may mean, by the first that does."""
    made = None
    for sought in _sought(name, check, bound):
        made = _cure(name, check, bound, sought)
        if made is not None and made.value is not None:
            return made
    return made


def _stand_in(check: Entry) -> Entry:
    """Return the check that is solved: steel that is not enough is strength that is not."""
    if check.source is not flexure.ENOUGH_STEEL:
        return check
    strength = check.part.entries.get(flexure.STRENGTH.key)
    return check if strength is None or strength else strength


def _more(check: Entry, words: str) -> Cure:
    """Return the missing length or area, to ten, of a check ``needed <= provided``."""
    needed, provided = check.value
    more = math.ceil((needed - provided) / _STEP - _SAME) * _STEP
    return Cure("more", more, words.format(more))


def _cure(name: str, check: Entry, bound: Mapping[str, Entry], sought: Sought) -> Cure | None:
    """Return the cure by one value; None where nothing can be said."""
    use = _utilisation(name, check, bound, sought)
    if use is None:
        return None
    name = "A_s" if name == "less A_s" else name
    (cure,) = find.cures(use, {name: sought.variable})
    if cure.value is None:
        return cure if _all_computed(use, name, sought.variable) else None
    return cure if sought.told is None else replace(cure, text=sought.told(cure.value))


def _all_computed(use: Utilisation, name: str, variable: Variable) -> bool:
    """Tell whether a check could be computed with every value, so that none may be told."""
    for value in variable.values:
        try:
            use({name: value})
        except AnotherCaseError:
            return False
        except (ArithmeticError, ValueError):
            continue
    return bool(variable.values)


def _utilisation(
    name: str, check: Entry, bound: Mapping[str, Entry], sought: Sought
) -> Utilisation | None:
    """Return the utilisation as a function of one value, the checks beside it included."""
    if check.source in _BENDING:
        return _beside(name, _bending(check, bound), sought)
    if check.source is minimum.WAIVER:
        return _minimum(name, check, sought)
    replays = [Replay.of(each, sought.roots) for each in (check, *sought.besides)]
    if not replays[0].touches:
        return None

    def use(changes: Mapping[str, float]) -> float:
        spread = sought.spread(changes[name]) if changes else {}
        return max(replay(spread) for replay in replays)

    return use


def _beside(name: str, use: Utilisation | None, sought: Sought) -> Utilisation | None:
    """Return a utilisation together with the other checks that must hold with the value."""
    replays = [Replay.of(each, sought.roots) for each in sought.besides]
    if use is None or not replays:
        return use

    def both(changes: Mapping[str, float]) -> float:
        spread = sought.spread(changes[name]) if changes else {}
        return max(use(changes), *(replay(spread) for replay in replays))

    return both


def _minimum(name: str, check: Entry, sought: Sought) -> Utilisation:
    """Return that of the minimum or of its waiver, whichever holds first."""
    rules = (minimum.BY_AREA, minimum.BY_CRACKING, minimum.BY_CRACKING_TOP)
    ruled = tuple(e for e in check.part.entries.values() if e.source in rules)
    replays = [Replay.of(each, sought.roots, apart=ruled) for each in (*ruled, check)]

    def use(changes: Mapping[str, float]) -> float:
        spread = sought.spread(changes[name]) if changes else {}
        return min(replay(spread) for replay in replays)

    return use


def _bending(check: Entry, bound: Mapping[str, Entry]) -> Utilisation | None:
    """Return moment over resistance, or c/d over its limit, with the block in flange or web."""
    names = ("f_c", "f_y", "phi_c", "phi_s", "b", "d", "A_s")
    if any(name not in bound for name in names):
        return None
    values = {name: bound[name].value for name in names}
    if "M_f" in bound:
        values["M_f"] = bound["M_f"].value
    for name in ("h", "b_w"):
        root = _of_symbol(check, name, bound)
        if root is None:
            return None
        values[name] = root.value
    values["h_f"] = _flange(bound)
    c_d = next((e.value for e in bound["A_s"].part.entries.values() if e.symbol == "c_d"), None)
    yields = check.source is flexure.YIELDS
    use = (cures_checks.yielding if yields else cures_checks.bending)(values, c_d)
    made, recorded = use({}), utilisation(check)
    same = recorded is not None and abs(made - recorded) <= _SAME * recorded
    return use if same or math.isinf(made) else None


def _flange(bound: Mapping[str, Entry]) -> float:
    """Return the thickness of the flange in compression; 0 where the web alone is compressed."""
    if "h_f" in bound:
        return float(bound["h_f"].value)
    for entry in bound["d"].part.entries.values():
        if entry.source is flexure.IN_FLANGE:
            return float(entry.args[entry.source.names.index("h_f")].value)
    return 0.0


# -- what may be changed ---------------------------------------------------------------------


def _sought(name: str, check: Entry, bound: Mapping[str, Entry]) -> list[Sought]:
    """Return what a name of ``SOUGHT`` means in a check; none where it is not in it."""
    if name in ("A_s", "A_sd", "A_sp"):
        return _steel(name, check, bound)
    makers = {"less A_s": _less_steel, "bars": _sizes, "number": _number}
    maker = makers.get(name)
    sought = _value(name, check, bound) if maker is None else maker(check, bound)
    return [] if sought is None else [sought]


def _value(name: str, check: Entry, bound: Mapping[str, Entry]) -> Sought | None:
    """Return a given value of the beam or of the check."""
    root = _root(name, check, bound)
    if root is None:
        return None
    makers: Mapping[str, Callable[[float], Variable]] = {
        "h": find.depth, "b_w": find.width, "f_c": find.concrete, "s": find.spacing,
        "b_sp": _support, "n_o": _overhang, "n_h": _hangers, "s_f": find.slab_spacing,
    }  # fmt: skip
    return _single(name, root, makers[name](root.value))


def _single(name: str, root: Entry, variable: Variable) -> Sought:
    return Sought({name: (root,)}, variable, lambda value: {name: value})


def _root(name: str, check: Entry, bound: Mapping[str, Entry]) -> Entry | None:
    if name == "s":
        spacing = check.part.entries.get("s")
        if check.source is shear.RESTRAINT_STRENGTH:  # that of the part of the section itself
            spacing = next((e for e in behind(bound["V_r"]) if e.symbol == "s"), None)
        return spacing if spacing is not None and spacing.kind == GIVEN else None
    if name in ("b_sp", "n_o", "n_h"):
        return bound.get(name)
    return _of_symbol(check, name, bound)


def _of_symbol(check: Entry, name: str, bound: Mapping[str, Entry]) -> Entry | None:
    """Return the given value that a name stands for in a check, or behind it by its symbol."""
    entry = bound.get(name)
    if entry is not None and entry.kind == GIVEN and entry.symbol != "h_f":
        return entry
    found = [e for e in behind(check) if e.symbol == name and e.kind == GIVEN]
    return found[-1] if found else None


def _overhang(number: float) -> Variable:
    words = "{} bars of this size in each overhang"
    return replace(find.bar_count(int(number)), words=words)


def _hangers(number: float) -> Variable:
    none = f"no number of hanger stirrups up to {_MOST_HANGERS}"
    words = "{} hanger stirrups in the joint"
    return Variable(find.up(number, _MOST_HANGERS, 1), words, "or more", none)


def _support(width: float) -> Variable:
    none = f"no support up to {_LONGEST_SUPPORT} mm along the beam"
    words = "a support {} mm long along the beam"
    return Variable(find.up(width, _LONGEST_SUPPORT, 10), words, "or more", none)


def _less_steel(check: Entry, bound: Mapping[str, Entry]) -> Sought | None:
    del check
    root = bound.get("A_s")
    sizes = () if root is None else _sizes_of(root)
    if root is None or not sizes or root.value <= 0:
        return None
    return _single("A_s", root, find.less_steel(root.value, sizes[-1]))


def _steel(name: str, check: Entry, bound: Mapping[str, Entry]) -> list[Sought]:
    root = bound.get(name)
    sizes = () if root is None else _sizes_of(root)
    if root is None or not sizes or root.value <= 0:
        return []
    variable = find.steel(root.value, sizes[-1], _most(root.value))
    part = developed(root)
    if part is not None:  # what stands already is told first, and no number of bars beside it
        size = sizes[0] if len(sizes) == 1 else ""
        better = Sought(
            {name: (root,)}, part.variable(size), lambda value: {name: part.area(value)}
        )
        return [better, _single(name, root, here(variable))]
    # Elsewhere the depth may be that of other bars: whether more fit is said with the section.
    fits = check.part.entries.get(_FITS)
    if fits is None or "d_2" in check.part.entries:
        return [_single(name, root, variable)]
    return [_in_one_layer(name, root, sizes[-1], fits)]


def _in_one_layer(name: str, root: Entry, size: str, fits: Entry) -> Sought:
    """Return more bars of a size in a layer, as many as fit beside each other."""
    (number,) = _counts(behind(fits))

    def spread(area: float) -> Mapping[str, float]:
        return {name: area, "number": number.value + _more_bars(root.value, area, size)}

    variable = replace(
        find.steel(root.value, size, _most(root.value)), none=NONE_IN_LAYER.format(size)
    )
    roots = {name: (root,), "number": (number,)}
    return Sought(roots, variable, spread, besides=(fits,))


def _most(area: float) -> float:
    return max(4 * area, find.MOST_STEEL)


def _more_bars(before: float, area: float, size: str) -> int:
    return math.ceil((area - before) / BARS.number(size, "A_b") - _SAME)


def beside_each_other(part: Part, use: Utilisation) -> tuple[Utilisation, Variable] | None:
    """Return a utilisation in which more steel must also fit, and the steel of one layer.

    ``part`` is that of a section with its bars; None where they lie in two layers or are of no
    known size. A changed ``A_s`` is the area of the section.
    """
    area = part.entries.get("A_s")
    sizes = () if area is None else _sizes_of(area)
    fits = part.entries.get(_FITS)
    if area is None or not sizes or fits is None or "d_2" in part.entries:
        return None
    sought = _in_one_layer("A_s", area, sizes[-1], fits)
    both = _beside("A_s", use, sought)
    return None if both is None else (both, sought.variable)


def _sizes_of(area: Entry) -> tuple[str, ...]:
    """Return the sizes of the bars that make up an area, the largest last."""
    return _sizes_among(behind(area))


def _sizes_among(entries: Iterable[Entry]) -> tuple[str, ...]:
    areas = {BARS.number(size, "A_b"): size for size in BARS.rows}
    found = {
        e.value for e in entries
        if e.kind == LOOKUP and e.unit == "mm2" and e.value in areas
    }  # fmt: skip
    return tuple(areas[each] for each in sorted(found))


def _number(check: Entry, bound: Mapping[str, Entry]) -> Sought | None:
    """Return more bars of the same size beside each other in the web, as many as fit."""
    del bound
    fits = check.part.entries.get(_FITS)
    if fits is None:
        return None
    (number,) = _counts(behind(fits))
    variable = replace(
        find.bar_count(int(number.value)), words="{} bars of this size in the layer",
        none="no number of bars of this size in the layer",
    )  # fmt: skip
    return replace(_single("number", number, variable), besides=(fits,))


def _sizes(check: Entry, bound: Mapping[str, Entry]) -> Sought | None:
    """Return smaller bars of at least the same area: diameter, area, factor of size, numbers."""
    if "d_b" not in bound or bound["d_b"].kind != LOOKUP:
        return None
    entries = behind(check)
    d_b = bound["d_b"]
    size = next(s for s in BARS.rows if BARS.number(s, "d_b") == d_b.value)
    mixed = len(_sizes_among(entries)) > 1
    if mixed and "A_s" in check.part.entries:
        return None  # the area beside those of other sizes would change with it
    fits = check.part.entries.get(_FITS)
    if mixed:  # the area stays: it has a part of its own
        beside = () if fits is None else behind(fits)
        entries = [e for e in (*entries, *beside) if e.part is check.part]
    of_size = {e.id: e for e in (*entries, *d_b.part.entries.values()) if e.kind in VALUES}
    areas = tuple(
        e for e in of_size.values()
        if e.kind == LOOKUP and e.unit == "mm2" and e.value == BARS.number(size, "A_b")
    )  # fmt: skip
    same = tuple(e for e in entries if e.kind == LOOKUP and e.symbol == d_b.symbol
                 and e.value == d_b.value)  # fmt: skip
    counts = {f"n{i}": e for i, e in enumerate(_counts(entries))}
    factors = tuple(e for e in entries if e.symbol == "k_4" and e.kind == LOOKUP)
    roots = {"d_b": same, "A_b": areas, "k_4": factors} | {k: (e,) for k, e in counts.items()}

    def spread(diameter: float) -> Mapping[str, float]:
        other = _named(diameter)
        share = BARS.number(size, "A_b") / BARS.number(other, "A_b")
        made = {key: float(math.ceil(e.value * share - _SAME)) for key, e in counts.items()}
        k_4 = development.SIZE.number(other, "k_4")
        return made | {"d_b": diameter, "A_b": BARS.number(other, "A_b"), "k_4": k_4}

    return Sought(
        roots, find.bar_size(size), spread,
        lambda value: f"bars {_named(value)} of at least the same area",
        () if fits is None else (fits,),
    )  # fmt: skip


def _counts(entries: Iterable[Entry]) -> list[Entry]:
    return [
        e for e in entries
        if e.kind == GIVEN and e.unit == "" and (e.symbol in _COUNTS or e.symbol == "n_o")
    ]  # fmt: skip


def _named(diameter: float) -> str:
    return next(size for size in BARS.rows if BARS.number(size, "d_b") == diameter)
