"""Editions that do not belong together, and header data of another job."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import Any

from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.cells import CODE, Cell
from lineproof.audit.junior.scope import VALIDATION, Scope, finding
from lineproof.record.entry import NOTE
from lineproof.sentences import listed
from lineproof.standards.codes import CODE_PAIRS
from lineproof.standards.references import BASES

_CONCRETE = re.compile(r"\bA23\.3\s?[-–:]\s?(M)?(\d{4}|\d{2})\b")
_BUILDING = re.compile(r"\bNBCC?\s?[-–:]?\s?((?:19|20)\d\d)\b")
_ID = re.compile(r"([A-Za-z]{1,3})-?(\d{1,4})[A-Za-z]?\Z")
_LONGEST = 100_000
_CENTURY = 70


def editions(scope: Scope, cells: Sequence[Cell] = ()) -> Iterator[Finding]:
    """Give editions mixed in the head, in own texts and in the cells of the notebook."""
    data = scope.record.data
    yield from _pair(data)
    if data["kind_of_member"] == VALIDATION:
        return
    codes = data["codes"]
    for place, ids, text in (*_own_texts(scope), *_cell_texts(cells)):
        other = _others(text, codes)
        if other:
            yield finding(
                Severity.MINOR,
                f"{place} speaks of {listed(other)}; the calculation is to "
                f"{codes.get('pair') or codes.get('concrete', 'no named edition')}",
                ids,
                advice="find out which edition the value or the rule is from",
            )


def _pair(data: Mapping[str, Any]) -> Iterator[Finding]:
    codes, project = data["codes"], data["project"]
    name = codes.get("pair", "")
    pair = CODE_PAIRS.get(name)
    said = (
        project.get("codes", {}).get("pair", "") if isinstance(project.get("codes"), dict) else ""
    )
    if name and pair is None:
        yield finding(
            Severity.MAJOR,
            f"the code pair {name[:60]!r} mixes editions or is none that is locked together: "
            f"{'; '.join(CODE_PAIRS)}",
            advice="state one pair and work by it throughout",
        )
    if pair is not None:
        for key, wanted in (("building", pair.building), ("concrete", pair.concrete)):
            held = codes.get(key, wanted)
            if held != wanted:
                yield finding(
                    Severity.MAJOR,
                    f"the head names {held[:40]}, which is not of the pair {name}",
                    advice="state one pair and work by it throughout",
                )
    if name and said and str(said) != name:
        yield finding(
            Severity.MAJOR,
            f"the project is to {str(said)[:60]}, the calculation to {name[:60]}",
            advice="issue the calculation again with the project as it is",
        )


def _own_texts(scope: Scope) -> Iterator[tuple[str, tuple[str, ...], str]]:
    """Give texts that a designer wrote: titles, sources, clauses and notes of his parts."""
    for part in scope.record.parts:
        if part["key"] not in scope.own_parts:
            continue
        for entry in part["entries"]:
            texts = [entry["title"], entry["clause"], entry.get("source", "")]
            texts += [entry["text"]] if entry["kind"] == NOTE else []
            # A basis or a table's source of the catalogue names the edition it was read in.
            if entry["basis"] not in BASES and "table" not in entry:
                yield f"{entry['label']} {entry['id']}".strip(), (entry["id"],), "\n".join(texts)


def _cell_texts(cells: Sequence[Cell]) -> Iterator[tuple[str, tuple[str, ...], str]]:
    for cell in cells:
        text = cell.source[:_LONGEST]
        if cell.kind == CODE:
            text = "\n".join(line.partition("#")[2] for line in text.split("\n"))
        yield cell.name, (), text


def _others(text: str, codes: Mapping[str, str]) -> list[str]:
    """Return the editions named in a text that are not those of a calculation."""
    concrete, building = codes.get("concrete", ""), codes.get("building", "")
    own = _CONCRETE.search(concrete), _BUILDING.search(building)
    found: dict[str, None] = {}
    for match in _CONCRETE.finditer(text):
        if own[0] is not None and _year(match[2]) != _year(own[0][2]):
            found[match[0]] = None
    for match in _BUILDING.finditer(text):
        if own[1] is not None and match[1] != own[1][1]:
            found[match[0]] = None
    return list(found)


def _year(text: str) -> int:
    number = int(text)
    if number > 100:  # noqa: PLR2004 - a full year
        return number
    return number + (1900 if number > _CENTURY else 2000)


# -- header data -----------------------------------------------------------------------------


def header(scope: Scope, cells: Sequence[Cell] = ()) -> Iterator[Finding]:
    """Give head data that contradict each other, as a reused calculation keeps them."""
    data = scope.record.data
    calc, project = data["calc"], data["project"]
    headings = [
        (f"the heading of {cell.name}", line.lstrip("# ").strip())
        for cell in cells[:1]
        for line in cell.source.split("\n")[:1]
        if cell.kind != CODE and line.startswith("#")
    ]
    for place, text in [("its title", calc["title"]), *headings]:
        other = _other_id(text, calc["id"])
        if other:
            yield finding(
                Severity.MINOR,
                f"the calculation is {calc['id']}, but {place} speaks of {other}: {text[:80]!r}",
                advice="look for other data of the calculation that it was made from",
            )
    yield from _dates(project)
    yield from _drawings(scope, project, cells)


def _other_id(text: str, own: str) -> str:
    """Return another calculation's id in a text that does not name its own."""
    mine = _ID.match(own)
    words = re.findall(r"[A-Za-z0-9-]+", text[:200])
    if mine is None or own in words:
        return ""
    others = [(word, _ID.match(word)) for word in map(str, words)]
    wrong = [w for w, f in others if f is not None and f[1] == mine[1] and f[2] != mine[2]]
    return wrong[0] if wrong else ""


def _rows(project: Mapping[str, Any], name: str) -> list[Mapping[str, Any]]:
    rows = project.get(name, [])
    return [row for row in rows if isinstance(row, dict)] if isinstance(rows, list) else []


def _dates(project: Mapping[str, Any]) -> Iterator[Finding]:
    issue = project.get("issue", {})
    date = str(issue.get("date", "")) if isinstance(issue, dict) else ""
    later = [r for r in _rows(project, "revisions") if date and str(r.get("date", "")) > date]
    if later:
        row = later[-1]
        yield finding(
            Severity.MINOR,
            f"the issue is dated {date[:20]}, but revision {str(row.get('letter', ''))[:8]} is of "
            f"{str(row.get('date', ''))[:20]}",
            advice="correct the date of the issue",
        )


def _drawings(scope: Scope, project: Mapping[str, Any], cells: Sequence[Cell]) -> Iterator[Finding]:
    """Compare revisions of drawings named in own texts with those of the project."""
    texts: Iterable[tuple[str, tuple[str, ...], str]] = (*_own_texts(scope), *_cell_texts(cells))
    rows = [
        (str(r.get("number", "")), str(r.get("revision", ""))) for r in _rows(project, "drawings")
    ]
    known = [(n, r, _revision(n)) for n, r in rows if n and r]
    for place, ids, text in texts:
        for number, revision, pattern in known:
            for found in pattern.findall(text):
                if found.upper() != revision.upper():
                    yield finding(
                        Severity.MINOR,
                        f"{place} is from {number[:30]} revision {found}; the project lists "
                        f"revision {revision[:10]}",
                        ids,
                        advice="compare with the drawing as it is",
                    )


def _revision(number: str) -> re.Pattern[str]:
    return re.compile(
        rf"\b{re.escape(number)}[\s,;(-]{{1,3}}rev(?:ision|\.)?\s?([A-Z]|\d{{1,2}})\b",
        re.IGNORECASE,
    )
