// The calcs of the page and their lines, read from the records that travel inside it.
// Nothing of a record is ever run or written as markup: its texts are set as text.

const RECORD_TYPE = "application/vnd.lineproof.record+json";
const REVIEW_TYPE = "application/vnd.lineproof.review+json";
const INPUTS = new Set(["given", "lookup", "found"]);
const TO_CHECK = new Set(["given", "lookup", "found", "line", "decision", "check"]);
const TAKEN = new Set(["given", "lookup", "note"]); // what is taken for granted, not worked out

function scripts(type) {
  return [...document.querySelectorAll("script")].filter((each) => each.type === type);
}

function readCalcs() {
  return scripts(RECORD_TYPE).map((script) => {
    const record = JSON.parse(script.textContent);
    const calc = {
      id: record.calc.id, digest: record.digest, prefix: script.dataset.anchor ?? "",
      originators: originatorsOf(record), lines: new Map(),
    };
    for (const part of record.parts) {
      for (const entry of part.entries) calc.lines.set(entry.id, lineOf(calc, entry));
    }
    for (const line of calc.lines.values()) {
      line.args = line.args.filter((id) => calc.lines.has(id));
      for (const id of line.args) calc.lines.get(id).users.push(line.id);
    }
    return calc;
  });
}

function lineOf(calc, entry) {
  return {
    calc, id: entry.id, kind: entry.kind, digest: entry.digest, label: entry.label || "",
    title: begun(entry.title || entry.symbol), needed: TO_CHECK.has(entry.kind),
    about: TAKEN.has(entry.kind) ? "assumption" : "arithmetic",
    fails: entry.kind === "check" && !entry.holds, value: INPUTS.has(entry.kind) ? valueOf(entry) : "",
    args: [...new Set(Object.values(entry.args ?? {}))], users: [], repeats: [], element: null,
  };
}

// The value of an input as typed, else as printed, its unit in ASCII.
function valueOf(entry) {
  return entry.typed || `${entry.printed.result} ${entry.printed.unit}`.trimEnd();
}

// As on the page: a title begins with a capital, unless it begins with a symbol.
const WORD = /^[a-zà-öø-ÿœ]{2,}(?:[-'’][a-zà-öø-ÿœ]+)*[,:;.]?(?=\s|$)/;
const ARTICLE = /^a (?!is\b|has\b|stands\b)[a-zà-öø-ÿœ]{2,}/;
const SYMBOL = /^(?:alpha|beta|gamma|delta|eps|theta|lambda|phi|rho|sigma|mu|kd)\b/;

function begun(title) {
  const isWord = WORD.test(title) && !SYMBOL.test(title);
  return isWord || ARTICLE.test(title) ? title[0].toUpperCase() + title.slice(1) : title;
}

// Ties lines to their places on the page; gives those that are read one by one, in their order.
function placeLines(calcs) {
  const byPlace = new Map();
  for (const calc of calcs) {
    for (const line of calc.lines.values()) byPlace.set(calc.prefix + line.id, line);
  }
  const steps = [];
  for (const element of document.querySelectorAll("main .entry[id]")) {
    const line = byPlace.get(element.id);
    if (!line) continue;
    line.element = element;
    if (line.needed || line.kind === "note") steps.push(line);
    const worked = element.parentElement.classList.contains("repeated")
      ? byPlace.get(targetOf(element.querySelector(".clause a"))) : null;
    if (worked) worked.repeats.push(line);
  }
  return { byPlace, steps };
}

function targetOf(link) {
  return link ? decoded(link.getAttribute("href").slice(1)) : "";
}

function decoded(text) {
  try {
    return decodeURIComponent(text);
  } catch {
    return text;
  }
}

// All lines within reach of one: id to distance, near ones first.
function reach(line, way, deep) {
  const found = new Map();
  let now = line[way];
  for (let distance = 1; now.length; distance += 1) {
    const next = [];
    for (const id of now) {
      if (id === line.id || found.has(id)) continue;
      found.set(id, distance);
      next.push(...line.calc.lines.get(id)[way]);
    }
    now = deep ? next : [];
  }
  return found;
}

function nameOf(line) {
  return line.label ? `${line.label} ${line.title}` : line.title;
}

// Who prepared a calc ------------------------------------------------------------------------

function originatorsOf(record) {
  const given = record.project?.issue?.prepared_by ?? "";
  const names = Array.isArray(given) ? given : [given, record.calc.originator ?? ""];
  return names.flatMap((name) => String(name).split(/[,;/&]|\band\b/))
    .map((name) => name.trim()).filter(Boolean);
}

function letters(name) {
  return (name.normalize("NFKC").toLowerCase().match(/[\p{L}\p{N}]/gu) ?? []).join("");
}

// The originator whom a name or initials stand for, or undefined.
function originatorNamed(calc, name, initials) {
  return calc.originators.find((each) => {
    const own = letters(each);
    return own !== "" && (own === letters(name) || (own.length < 5 && own === letters(initials)));
  });
}
