// Marks and findings of one calc: the same file, rules and order as `lineproof review`.

const SCHEMA = "lineproof review 1";
const SEVERITIES = ["critical", "major", "minor", "observation"];
const STATES = ["seen", "queried", "accepted"];
const KINDS = ["arithmetic", "assumption"];
const LISTS = ["reviewers", "records", "findings", "marks", "signed"];
const LONGEST = 4000;
const TIME = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\dZ$/;
const DIGEST = /^[0-9a-f]{16}$/;

function emptyReview(calc) {
  return { calc: calc.id, reviewers: [], records: [], findings: [], marks: [], signed: [] };
}

function wordsOf(mark) {
  if (mark.state !== "accepted") return `${mark.kind} ${mark.state}`;
  return mark.kind === "arithmetic" ? "arithmetic checked" : "assumption accepted";
}

function now() {
  return `${new Date().toISOString().slice(0, 19)}Z`;
}

function placeOf(mark) {
  return JSON.stringify([mark.line, mark.kind, mark.by]);
}

// The last mark of each reviewer and kind, by line; two of one time both stand.
function currentMarks(marks) {
  const last = new Map();
  for (const mark of marks) {
    const place = placeOf(mark);
    if (!last.has(place) || last.get(place) < mark.at) last.set(place, mark.at);
  }
  return marks.filter((mark) => mark.at === last.get(placeOf(mark)));
}

function marksByLine(review) {
  const found = new Map();
  for (const mark of currentMarks(review.marks)) {
    if (!found.has(mark.line)) found.set(mark.line, []);
    found.get(mark.line).push(mark);
  }
  return found;
}

// What is to be said of a line: queried, accepted, seen, stale, or "" where nobody marked it.
function stateOf(line, marks) {
  if (marks.some((mark) => mark.state === "queried")) return "queried";
  for (const state of ["accepted", "seen"]) {
    if (marks.some((mark) => mark.state === state && mark.digest === line.digest
      && (mark.kind === line.about || !line.needed))) return state;
  }
  return marks.some((mark) => mark.digest !== line.digest) ? "stale" : "";
}

function isDisputed(marks) {
  return KINDS.some((kind) => {
    const own = marks.filter((mark) => mark.kind === kind);
    const states = new Set(own.map((mark) => mark.state));
    return (states.has("accepted") && states.has("queried"))
      || new Set(own.map(placeOf)).size !== own.length;
  });
}

// Why marks are stale: by record and line the changed lines above behind which nothing changed.
function causesOf(calc, review) {
  const known = new Map(review.records.map((each) => [each.digest, new Map(Object.entries(each.inputs))]));
  for (const mark of currentMarks(review.marks)) {
    if (!known.has(mark.record)) known.set(mark.record, new Map());
    known.get(mark.record).set(mark.line, mark.digest);
  }
  const values = new Map(review.records.map((each) => [each.digest, new Map(Object.entries(each.values))]));
  const roots = new Map();
  for (const [digest, then] of known) {
    const changed = new Set([...then].filter(([id, old]) => calc.lines.has(id)
      && calc.lines.get(id).digest !== old).map(([id]) => id));
    roots.set(digest, changed.size ? rootsOf(calc, changed) : new Map());
  }
  return (mark) => {
    if (!calc.lines.has(mark.line)) return "the line is no longer in the calc";
    const found = [...(roots.get(mark.record)?.get(mark.line) ?? [])];
    const itself = found.length === 1 && found[0] === mark.line;
    if (!found.length || (itself && !INPUTS.has(calc.lines.get(mark.line).kind))) {
      return "the line itself, or one above it that nobody had marked, was written anew";
    }
    const named = found.slice(0, 12)
      .map((id) => causeTold(calc.lines.get(id), values.get(mark.record)?.get(id) ?? "")).join("; ");
    const more = found.length > 12 ? `; and ${found.length - 12} more` : "";
    return `${named}${more}`;
  };
}

// What has changed: an input with its value when marked, where the review holds it, and now.
function causeTold(line, was) {
  const name = nameOf(line);
  if (!was || !INPUTS.has(line.kind)) return `${name} has changed`;
  if (was === line.value) return `${name} is ${line.value} as it was, but from another source`;
  return `${name} was ${valueTold(was)}, is ${valueTold(line.value)}`;
}

const NUMBER = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/;

// The value of an input as a sentence tells it: 12 kN·m for "12 kN.m".
function valueTold(text) {
  const [number, ...rest] = text.split(" ");
  if (!NUMBER.test(number)) return text;
  const unit = rest.join(" ");
  return number.replace(/^-/, "−") + (unit && unit !== "deg" ? " " : "") + unitText(unit);
}

function unitText(unit) {
  if (unit === "deg") return "°";
  return unit.split("/").map((side) => side.split(/[.*](?=[A-Za-z])/).map(factorText).join("·")).join("/");
}

function factorText(factor) {
  const [, name, power = ""] = /^([A-Za-z%]+)\^?(-?\d+)?$/.exec(factor) ?? [null, factor];
  return name + power.replace(/[\d-]/g, (sign) => "⁰¹²³⁴⁵⁶⁷⁸⁹⁻"["0123456789-".indexOf(sign)]);
}

function rootsOf(calc, changed) {
  const found = new Map();
  for (const start of calc.lines.keys()) {
    const waiting = [start];
    while (waiting.length) {
      const line = calc.lines.get(waiting.at(-1));
      const missing = line.args.filter((id) => !found.has(id));
      if (missing.length) {
        waiting.push(...missing);
        continue;
      }
      const above = new Set(line.args.flatMap((id) => [...found.get(id)]));
      found.set(line.id, above.size || !changed.has(line.id) ? above : new Set([line.id]));
      waiting.pop();
    }
  }
  return found;
}

function snapshotOf(calc) {
  const kept = [...calc.lines.values()].filter((line) => INPUTS.has(line.kind));
  const of = (name) => Object.fromEntries(kept.map((line) => [line.id, line[name]]));
  return { digest: calc.digest, inputs: of("digest"), values: of("value") };
}

// Findings -----------------------------------------------------------------------------------

function lastOf(said) {
  return said.reduce((last, each) => (each.at > last ? each.at : last), "");
}

function standingOf(found) {
  const said = lastOf([...found.responses, ...found.back_checks]);
  if (found.closed.length) return lastOf(found.closed) >= said ? "closed" : "opened again";
  if (found.back_checks.length && lastOf(found.back_checks) >= lastOf(found.responses)) {
    return "back-checked";
  }
  return found.responses.length ? "answered" : "open";
}

function nextNumber(review) {
  return review.findings.reduce((most, each) => Math.max(most, each.number), 0) + 1;
}

// Merging: nothing is lost --------------------------------------------------------------------

function merged(first, second) {
  const same = new Map();
  for (const found of [...first.findings, ...second.findings]) {
    const origin = JSON.stringify([found.by, found.at, found.text]);
    same.set(origin, joined(same.get(origin) ?? found, found));
  }
  const records = new Map();
  for (const each of [...first.records, ...second.records]) {
    const kept = records.get(each.digest) ?? { inputs: {}, values: {} };
    for (const [name, texts] of Object.entries(kept)) {
      for (const [id, text] of Object.entries(each[name])) {
        texts[id] = texts[id] === undefined || text < texts[id] ? text : texts[id];
      }
    }
    records.set(each.digest, kept);
  }
  const names = new Map();
  for (const who of [...first.reviewers, ...second.reviewers]) {
    if (!names.has(who.name) || who.initials < names.get(who.name).initials) names.set(who.name, who);
  }
  return {
    calc: first.calc, reviewers: [...names.values()],
    records: [...records].map(([digest, kept]) => ({ digest, ...kept })),
    findings: numbered([...same.values()]),
    marks: currentMarks(once([...first.marks, ...second.marks])),
    signed: once([...first.signed, ...second.signed]),
  };
}

function once(items) {
  return [...new Map(items.map((item) => [JSON.stringify(item), item])).values()];
}

function joined(one, other) {
  const graver = Math.min(SEVERITIES.indexOf(one.severity), SEVERITIES.indexOf(other.severity));
  const said = (name) => once([...one[name], ...other[name]]).sort(by((s) => [s.at, s.by, s.text]));
  return {
    ...one, number: Math.max(one.number, other.number), severity: SEVERITIES[graver],
    lines: [...new Set([...one.lines, ...other.lines])].sort(),
    responses: said("responses"), back_checks: said("back_checks"), closed: said("closed"),
  };
}

function numbered(findings) {
  const taken = new Set();
  let free = findings.reduce((most, each) => Math.max(most, each.number), 0);
  return findings.sort(by((f) => [f.number, f.at, f.by, f.text])).map((found) => {
    const number = taken.has(found.number) ? (free += 1) : found.number;
    taken.add(number);
    return { ...found, number };
  }).sort(by((found) => [found.number]));
}

function by(key) {
  return (one, other) => {
    const pairs = key(other);
    const place = key(one).findIndex((value, n) => value !== pairs[n]);
    if (place === -1) return 0;
    return key(one)[place] < pairs[place] ? -1 : 1;
  };
}

// The file -----------------------------------------------------------------------------------

function toText(review) {
  const orders = {
    reviewers: (who) => [who.name, who.initials], records: (each) => [each.digest],
    findings: (found) => [found.number], signed: (each) => [each.on, each.by, each.record],
    marks: (m) => [m.line, m.kind, m.by, m.at, m.state, m.note, m.digest, m.record],
  };
  const lists = LISTS.map((name) => {
    const items = [...review[name]].sort(by(orders[name])).map((item) => JSON.stringify(full(item)));
    return items.length ? `,\n"${name}": [\n${items.join(",\n")}\n]` : `,\n"${name}": []`;
  });
  return `{\n"schema": ${JSON.stringify(SCHEMA)},\n"calc": ${JSON.stringify(review.calc)}${lists.join("")}\n}\n`;
}

const FIELDS = {
  mark: ["line", "kind", "state", "by", "at", "digest", "record", "note"],
  finding: ["number", "severity", "text", "by", "at", "lines", "responses", "back_checks", "closed"],
};

// An item with its fields in the order of the file, empty ones left out.
function full(item) {
  if (item.inputs) {
    const ordered = (texts) => Object.fromEntries(Object.entries(texts).sort(by((pair) => [pair[0]])));
    const made = { digest: item.digest, inputs: ordered(item.inputs) };
    return Object.keys(item.values).length ? { ...made, values: ordered(item.values) } : made;
  }
  const names = item.kind ? FIELDS.mark : item.number ? FIELDS.finding : Object.keys(item);
  const made = {};
  for (const name of names) {
    const value = item[name];
    if (value === "" || value === undefined || (Array.isArray(value) && !value.length)) continue;
    made[name] = Array.isArray(value)
      ? value.map((each) => (typeof each === "object" ? full(each) : each)) : value;
  }
  return made;
}

// Reads a file; throws an Error with a sentence that says what is wrong with it.
function fromText(text) {
  let data;
  try {
    data = JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch {
    throw new Error("This file cannot be read: it is cut off, or was changed by hand.");
  }
  if (data?.schema !== SCHEMA) throw new Error("This is not a review file that lineproof has saved.");
  const faults = [];
  const need = (holds, what) => holds || faults.push(what);
  const text_ = (value, longest = LONGEST) => typeof value === "string" && value.length <= longest;
  const list = (owner, name) => {
    const value = owner?.[name] ?? [];
    return need(Array.isArray(value), `${name} is no list`) === true ? value : [];
  };
  const said = (items) => items.map((each) => {
    need(text_(each?.by, 120) && TIME.test(each?.at) && text_(each?.text ?? ""), "an answer is damaged");
    return { by: each?.by, at: each?.at, text: each?.text ?? "" };
  });
  const review = {
    calc: data.calc,
    reviewers: list(data, "reviewers").map((who) => {
      need(text_(who?.name, 120) && text_(who?.initials ?? "", 8), "a reviewer is damaged");
      return { name: who?.name, initials: who?.initials ?? "" };
    }),
    records: list(data, "records").map((each) => {
      const [inputs, values] = [each?.inputs ?? {}, each?.values ?? {}]; // older files hold no values
      need(DIGEST.test(each?.digest) && typeof inputs === "object" && typeof values === "object"
        && Object.values(inputs).every((digest) => DIGEST.test(digest))
        && Object.values(values).every((value) => text_(value)), "a record is damaged");
      return { digest: each?.digest, inputs, values };
    }),
    findings: list(data, "findings").map((found, n) => {
      need(Number.isInteger(found?.number) && found.number > 0 && SEVERITIES.includes(found.severity)
        && text_(found.text) && text_(found.by, 120) && TIME.test(found.at)
        && list(found, "lines").every((id) => text_(id)), `finding ${n + 1} is damaged`);
      return {
        ...found, lines: list(found, "lines"), responses: said(list(found, "responses")),
        back_checks: said(list(found, "back_checks")), closed: said(list(found, "closed")),
      };
    }),
    marks: list(data, "marks").map((mark, n) => {
      need(text_(mark?.line) && KINDS.includes(mark.kind) && STATES.includes(mark.state)
        && text_(mark.by, 120) && TIME.test(mark.at) && DIGEST.test(mark.digest)
        && DIGEST.test(mark.record) && text_(mark.note ?? ""), `mark ${n + 1} is damaged`);
      return { ...mark, note: mark?.note ?? "" };
    }),
    signed: list(data, "signed").map((each) => {
      need(DIGEST.test(each?.record) && text_(each.by, 120) && text_(each.on, 10), "a sign-off is damaged");
      return { record: each?.record, by: each?.by, on: each?.on };
    }),
  };
  if (faults.length) {
    const more = faults.length > 3 ? `, and ${faults.length - 3} more faults` : "";
    throw new Error(`This review file was changed by hand: ${faults.slice(0, 3).join("; ")}${more}.`);
  }
  return review;
}
