"""An audit printed as a package: findings, judged lines, what was compared and how.

The report is a record of its own, made of notes and tables, so that it looks like any package,
travels inside its own print and can be verified.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Iterator, Mapping, Sequence
from itertools import groupby
from typing import Any

from lineproof.audit.data import (
    Audit,
    Claim,
    Effect,
    Finding,
    Interval,
    Judged,
    Severity,
    Slip,
    Verdict,
)
from lineproof.audit.findings import named_clause
from lineproof.audit.graph import NO_VALUE, Graph, Node
from lineproof.audit.search.drawing import SOURCE as DRAWING
from lineproof.audit.shared import shared_slips
from lineproof.package import Package, build_package, to_html, to_pdf
from lineproof.package.files import table_csv
from lineproof.package.words import AUDIT_REPORT
from lineproof.record import Record
from lineproof.sentences import begun, listed
from lineproof.sheet import Sheet
from lineproof.typeset.values import number_text, unit_text

MOST_EFFECTS = 12
MOST_SLIPS = 3
_LONGEST_ID = 40
_THEN = {
    (True, True): "still holds",
    (True, False): "no longer holds",
    (False, True): "holds",
    (False, False): "still does not hold",
}
_KEPT = ("project", "codes", "building", "paper")
"""Facts of the project that hold for its audit too; the issue of the calc is another one."""
_JUDGED = ["Line", "Quantity", "Claimed", "Follows from the claims", "Right", "Verdict"]
_JUDGED_WIDTHS = (12, 50, 20, 31, 20, 21)
_EFFECTS = ["Line", "Check", "Where", "As claimed", "Right", "When put right"]
_EFFECTS_DRAWN = ["Line", "Check", "Where", "As drawn", "In the calc", "When put right"]
_EFFECT_WIDTHS = (12, 46, 42, 18, 16, 20)
_NO_CLAIMS = (
    "The record was searched by itself: its lines worked again, its formulas compared with the "
    "catalogue, checks that are missing, and rules for usual slips. Nothing was claimed against it."
)
_CLAIMS = (
    "Values claimed by another engineer were compared with this record line by line, inputs first. "
    "A claimed number stands for all that round to it: 388 for 387.5 to 388.5. Each claim is "
    "compared with what follows from the values that the claims themselves use, carried as such "
    "intervals, so honest rounding is no error and a wrong line is told once, at its origin; lines "
    "that only carry it are told apart. No tolerance is used."
)


def audit_report(audit: Audit, record: Record, *, checker: str = "", date: str = "") -> Package:
    """Return an audit as a package to print; ``date`` is written like '2026-11-20'.

    ``record`` is the one that was audited. Raises :class:`UserError` for a wrong date.
    """
    return build_package([report_record(audit, record, checker=checker, date=date)])


def report_files(
    audit: Audit, record: Record, name: str, *, checker: str = "", date: str = ""
) -> dict[str, bytes]:
    """Return the files of a report by name: PDF, HTML, judged lines and findings as CSV."""
    package = audit_report(audit, record, checker=checker, date=date)
    graph = Graph(record)
    files = {f"{name}.pdf": to_pdf(package), f"{name}.html": to_html(package).encode()}
    if audit.judged:
        rows = list(_judged_rows(audit.judged, graph))
        files[f"{name}-judged.csv"] = table_csv({"columns": ["id", *_JUDGED], "rows": rows})
    columns = ["number", "severity", "line", "clause", "finding", "what to do", "effects"]
    rows = [_finding_row(n, found, graph) for n, found in enumerate(audit.findings, 1)]
    files[f"{name}-findings.csv"] = table_csv({"columns": columns, "rows": rows})
    return files


def report_record(audit: Audit, record: Record, *, checker: str = "", date: str = "") -> Record:
    """Return the record of a report: notes and tables only, no value of its own."""
    calc = record.data["calc"]
    sheet = Sheet(
        f"{str(calc['id'])[:_LONGEST_ID]} audit",
        str(calc["title"]),
        project=_project(record.data, checker, date),
    )
    report = Report(sheet, audit, Graph(record))
    report.compared()
    report.findings()
    report.judged()
    return sheet.close()


def _project(data: Mapping[str, Any], checker: str, date: str) -> dict[str, Any]:
    facts = {name: data["project"][name] for name in _KEPT if name in data["project"]}
    calc = data["calc"]["id"]
    rows = data["project"].get("locations", [])
    place = next((row for row in rows if row.get("calc") == calc), None)
    place = place or data["project"].get("location")
    if place:
        facts["location"] = {key: place[key] for key in ("grid", "level") if key in place}
    issue = {"prepared_by": checker, "date": date}
    return facts | {"issue": {name: text for name, text in issue.items() if text}}


class Report:
    """Writes an audit onto a sheet, a part at a time."""

    def __init__(self, sheet: Sheet, audit: Audit, graph: Graph) -> None:
        self.sheet, self.audit, self.graph = sheet, audit, graph
        sheet.codes, sheet.member = dict(graph.record.data["codes"]), AUDIT_REPORT
        self.slips = {judged.id: judged.slips for judged in audit.judged}
        self.titles = {part["key"]: part["title"] for part in graph.record.parts}

    def findings(self) -> None:
        """Record the findings by severity, numbered, each with its effects."""
        number = 0
        for severity in Severity:
            group = [f for f in self.audit.findings if f.severity is severity]
            if group:
                title = f"{str(severity).capitalize()} findings"
                with self.sheet.part(f"findings-{severity}", title):
                    for finding in group:
                        number += 1
                        self._finding(number, finding)
        if not number:
            with self.sheet.part("findings", "Findings"):
                self.sheet.note("none", "Nothing was found.")

    # -- what was compared ---------------------------------------------------------------------

    def compared(self) -> None:
        """Record what was compared, how, and the counts of findings and verdicts."""
        sheet, audit, graph = self.sheet, self.audit, self.graph
        with sheet.part("compared", "What was compared"):
            title = graph.record.data["calc"]["title"]
            sheet.note(
                "record",
                f"{audit.calc} {title}, record {audit.digest}, {len(graph.record.entries)} lines.",
                title="Calculation audited",
            )
            sheet.note("how", _CLAIMS if audit.judged else _NO_CLAIMS, title="How")
            for number, note in enumerate(audit.notes, 1):
                sheet.note(f"read-{number}", note, title="How claims were read")
            rows = [[str(s), str(n)] for s, n in self._severities()]
            if rows:
                sheet.table(
                    "severities", ["Findings", "Number"], rows, title="Findings by severity"
                )
            for number, slip in enumerate(shared_slips(audit), 1):
                sheet.note(f"shared-{number}", slip, title="Findings with one slip in common")
            if audit.judged:
                counts = Counter(judged.verdict for judged in audit.judged)
                said = [
                    [str(verdict), str(counts[verdict])] for verdict in Verdict if counts[verdict]
                ]
                sheet.table("verdicts", ["Verdict", "Lines"], said, title="Lines by verdict")

    def _severities(self) -> Iterator[tuple[Severity, int]]:
        counts = Counter(finding.severity for finding in self.audit.findings)
        return ((severity, counts[severity]) for severity in Severity if counts[severity])

    # -- findings --------------------------------------------------------------------------------

    def _finding(self, number: int, finding: Finding) -> None:
        sheet, lines = self.sheet, self._lines(finding.ids)
        head = f"Finding {number}" + (f", {lines}" if lines else "")
        sheet.note(f"finding-{number}", _text(finding.what), title=head, clause="")
        said = [f"{named_clause(finding.clause)}."] if finding.clause else []
        said += [_text(finding.advice)] if finding.advice else []
        said += self._other_slips(finding)
        if said:
            sheet.note(f"advice-{number}", " ".join(said))
        if finding.effects:
            rows = [self._effect(effect) for effect in finding.effects[:MOST_EFFECTS]]
            more = len(finding.effects) - MOST_EFFECTS
            title = f"What finding {number} does to the checks that rest on it"
            title += f", the first {MOST_EFFECTS} of {len(finding.effects)}" if more > 0 else ""
            columns = _EFFECTS_DRAWN if finding.source == DRAWING else _EFFECTS
            sheet.table(f"effects-{number}", columns, rows, title=title, widths=_EFFECT_WIDTHS)

    def _lines(self, ids: Sequence[str]) -> str:
        labels = [label for each in ids if (label := self._label(each))]
        if not labels:
            return ""
        told = listed(labels)
        return f"line {told}" if len(labels) == 1 else f"lines {told}"

    def _label(self, entry_id: str) -> str:
        return str(self.graph.record.entries.get(entry_id, {}).get("label", ""))

    def _other_slips(self, finding: Finding) -> list[str]:
        """Name the slips that give a claimed value beside the one that the advice names."""
        slips = self.slips.get(finding.ids[0], ()) if finding.ids else ()
        others = [
            f"{s.sentence[:1].lower()}{s.sentence[1:]}".rstrip(".")
            for s in slips[:MOST_SLIPS]
            if not _is_told(s, f"{finding.what} {finding.advice}")
        ]
        return [f"Next in likelihood: {'; '.join(others)}."] if others else []

    def _effect(self, effect: Effect) -> list[str]:
        entry = self.graph.record.entries.get(effect.check, {})
        title = str(entry.get("title", "")) or effect.check
        return [
            self._label(effect.check), begun(title),
            self.titles.get(effect.check.partition("/")[0], ""),
            _ratio(effect.claimed, holds=effect.holds_as_claimed),
            _ratio(effect.right, holds=effect.holds), _THEN[effect.holds_as_claimed, effect.holds],
        ]  # fmt: skip

    # -- judged lines ------------------------------------------------------------------------------

    def judged(self) -> None:
        """Record every claim beside what follows and what is right, and what was not claimed."""
        claimed = [judged for judged in self.audit.judged if judged.claim is not None]
        if claimed:
            with self.sheet.part("judged", "Lines judged"):
                rows = [row[1:] for row in _judged_rows(claimed, self.graph)]
                self.sheet.table(
                    "lines", _JUDGED, rows, title="Every claim, in the order of the record",
                    widths=_JUDGED_WIDTHS,
                )  # fmt: skip
                self._remarks(claimed)
        left = [judged.id for judged in self.audit.judged if judged.claim is None]
        if left:
            with self.sheet.part("not-claimed", "Lines not claimed"):
                rows = list(self._not_claimed(left))
                self.sheet.table(
                    "lines", ["Part", "Lines", "Numbers"], rows,
                    title="Nothing was claimed for these lines", widths=(60, 14, 80),
                )  # fmt: skip

    def _remarks(self, claimed: Iterable[Judged]) -> None:
        """Say of claims that are no errors, yet no plain agreement, why they are none."""
        told = (Verdict.OTHER_METHOD, Verdict.SAFE_ROUNDING)
        for number, judged in enumerate((j for j in claimed if j.verdict in told and j.note), 1):
            label = self._label(judged.id)
            self.sheet.note(f"remark-{number}", _text(judged.note), title=f"Line {label}, no error")

    def _not_claimed(self, ids: Sequence[str]) -> Iterator[list[str]]:
        for key, group in groupby(ids, lambda each: each.partition("/")[0]):
            labels = [self._label(each) for each in group]
            yield [self.titles.get(key, key), str(len(labels)), _stretches(labels)]


def _stretches(labels: Iterable[str]) -> str:
    """Return numbers of lines, those that follow one another as a stretch.

    >>> _stretches(["3.1", "3.2", "3.3", "3.7"])
    '3.1 to 3.3, 3.7'
    """
    told: list[list[str]] = []
    for label in filter(None, labels):
        head, _, last = label.rpartition(".")
        before = told[-1][-1] if told else ""
        if before == f"{head}.{int(last) - 1}":
            told[-1].append(label)
        else:
            told.append([label])
    return ", ".join(run[0] if len(run) == 1 else f"{run[0]} to {run[-1]}" for run in told)


def _judged_rows(judged: Iterable[Judged], graph: Graph) -> Iterator[list[str]]:
    """Give a row a line: its id, then the cells of the table."""
    for each in judged:
        node = graph[each.id]
        claim = each.claim
        name = begun(node.title) or node.symbol
        yield [
            each.id, node.label, name,
            "" if claim is None else _claimed(claim),
            _interval(each.follows, node), _number(each.right, node), str(each.verdict),
        ]  # fmt: skip


def _interval(interval: Interval, node: Node) -> str:
    ends = dict.fromkeys(node.number_text(value) for value in (interval.low, interval.high))
    if NO_VALUE in ends:
        return NO_VALUE
    return f"{' to '.join(map(number_text, ends))} {unit_text(node.unit)}".rstrip()


def _number(value: float, node: Node) -> str:
    return _with_unit(node.number_text(value), node.unit)


def _claimed(claim: Claim) -> str:
    return f"{_with_unit(claim.typed, claim.unit)}{claim.beside}"


def _with_unit(number: str, unit: str) -> str:
    return f"{number_text(number)} {unit_text(unit)}".rstrip()


def _finding_row(number: int, finding: Finding, graph: Graph) -> list[str]:
    labels = [str(graph.record.entries.get(each, {}).get("label", each)) for each in finding.ids]
    effects = "; ".join(effect.sentence for effect in finding.effects)
    return [
        str(number), str(finding.severity), ", ".join(labels), finding.clause, finding.what,
        finding.advice, effects,
    ]  # fmt: skip


def _ratio(ratio: float | None, *, holds: bool) -> str:
    number = "" if ratio is None else f"{ratio:.2f}"
    return number if holds else f"{number} FAILS".strip()


def _text(sentence: str) -> str:
    """Return a sentence with a capital and a full stop."""
    text = sentence.strip()
    return begun(text) + ("" if text.endswith((".", "?", "!", ":")) else ".")


def _is_told(slip: Slip, said: str) -> bool:
    """Tell whether what a finding says names a slip already, by any of its causes."""
    words = [cause.words for cause in slip.causes] or [slip.sentence.rstrip(".")]
    return any(each.lower() in said.lower() for each in words)
