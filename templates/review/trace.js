// Lights the lines that one rests on and those that it goes into; shows some lines only.

const HIDE = 0, NEXT = 1, ALL = 2;

class Trace {
  constructor() {
    this.depth = { args: NEXT, users: NEXT };
    this.lit = [];
  }

  // Lights around a line; returns what was lit, by way.
  around(line) {
    for (const element of this.lit) delete element.dataset.trace;
    this.lit = [];
    const found = {};
    for (const way of ["args", "users"]) {
      const depth = this.depth[way];
      found[way] = depth === HIDE ? new Map() : reach(line, way, depth === ALL);
      for (const [id, distance] of found[way]) this.light(line.calc.lines.get(id), way, distance);
    }
    this.light(line, "here", 0);
    return found;
  }

  light(line, way, distance) {
    if (!line.element) return;
    const words = { here: "here", args: "rests on", users: "goes into" };
    line.element.dataset.trace = distance > 1 ? `${words[way]}, further` : words[way];
    this.lit.push(line.element);
  }

  clear() {
    for (const element of this.lit) delete element.dataset.trace;
    this.lit = [];
  }
}

const FILTERS = [
  ["all", "All"], ["checks", "Checks"], ["failing", "Failing checks"], ["findings", "Findings"],
  ["unmarked", "Not marked"], ["queried", "Queried"], ["stale", "Stale"],
];

// Counts in words: 1 line, 2 lines.
function many(number, one, more) {
  return `${number} ${number === 1 ? one : more}`;
}

// Tells whether a line has changed since somebody marked it.
function isOutdated(line) {
  return (line.calc.marks.get(line.id) ?? []).some((mark) => mark.digest !== line.digest);
}

// Tells which lines a filter shows; a query on a line that has changed since is stale as well.
function isShown(filter, line, state, inFinding) {
  switch (filter) {
    case "checks": return line.kind === "check";
    case "failing": return line.fails;
    case "findings": return inFinding;
    case "unmarked": return line.needed && (state === "" || state === "stale");
    case "queried": return state === "queried";
    case "stale": return state === "stale" || (state === "queried" && isOutdated(line));
    default: return true;
  }
}

// Hides lines, and the frames and headings that then hold none, by classes set once.
function showOnly(lines, shown) {
  const root = document.documentElement;
  root.classList.toggle("rv-some", shown !== null);
  for (const element of document.querySelectorAll(".rv-shown")) element.classList.remove("rv-shown");
  if (shown === null) return;
  for (const line of lines) {
    if (!shown.has(line)) continue;
    line.element.classList.add("rv-shown");
    line.element.closest("section")?.classList.add("rv-shown");
    line.element.closest(".repeated")?.classList.add("rv-shown");
  }
}
