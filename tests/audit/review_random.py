"""Random reviews of one calc, for whatever merges, prints or reads them."""

from __future__ import annotations

from hypothesis import strategies as st

from lineproof.audit.data import Severity
from lineproof.audit.review.data import (
    Kind,
    Mark,
    Raised,
    Review,
    Reviewed,
    Reviewer,
    Said,
    SignOff,
    State,
)

RECORD, DIGEST = "0123456789abcdef", "fedcba9876543210"
NAMES = ("Kei Mori", "Ines Ott")
TIMES = tuple(f"2026-12-0{day}T08:00:00Z" for day in range(1, 5))

times, names = st.sampled_from(TIMES), st.sampled_from(NAMES)
marks = st.builds(
    Mark,
    line=st.sampled_from(["data/h", "data/b", "flexure/a"]),
    kind=st.sampled_from(Kind),
    state=st.sampled_from(State),
    by=names,
    at=times,
    digest=st.just(DIGEST),
    record=st.just(RECORD),
    note=st.sampled_from(["", "see S-501", "why?"]),
)
said = st.builds(Said, by=names, at=times, text=st.sampled_from(["yes", "no", ""]))
talk = st.lists(said, max_size=2, unique=True).map(tuple)
findings = st.builds(
    Raised,
    number=st.integers(1, 4),
    severity=st.sampled_from(Severity),
    text=st.sampled_from(["Cover", "Span", "Load"]),
    by=names,
    at=times,
    lines=st.lists(st.sampled_from(["data/h", "data/b"]), max_size=2, unique=True).map(tuple),
    responses=talk,
    back_checks=talk,
    closed=talk,
)
reviews = st.builds(
    Review,
    calc=st.just("B1"),
    reviewers=st.just((Reviewer(NAMES[0], "KM"), Reviewer(NAMES[1], "IO"))),
    records=st.sampled_from([{}, {"data/h": "600 mm"}, {"data/h": "650 mm", "data/b": "1 m"}]).map(
        lambda values: (Reviewed(RECORD, {"data/h": DIGEST}, values),)
    ),
    findings=st.lists(
        findings, max_size=4, unique_by=(lambda f: f.number, lambda f: f.origin)
    ).map(tuple),
    marks=st.lists(marks, max_size=8, unique=True).map(tuple),
    signed=st.lists(
        st.builds(SignOff, record=st.just(RECORD), by=names, on=st.just("2026-12-05")),
        max_size=1,
    ).map(tuple),
)  # fmt: skip
