// What is being reviewed now: calcs, their reviews, the line in hand. Kept in the browser meanwhile.

class Work {
  constructor(calcs) {
    this.calcs = calcs;
    Object.assign(this, placeLines(calcs));
    this.reviews = new Map(calcs.map((calc) => [calc, emptyReview(calc)]));
    this.saved = new Map(calcs.map((calc) => [calc, toText(emptyReview(calc))]));
    this.line = null;
    this.before = null;
    this.filter = "all";
    this.name = "";
    this.initials = "";
    this.keeps = true;
    this.load();
    for (const calc of calcs) this.index(calc);
  }

  // The review printed with the package, and what this browser has kept of it.
  load() {
    for (const script of scripts(REVIEW_TYPE)) {
      const review = this.tryRead(script.textContent);
      const calc = review && this.calcs.find((each) => each.id === review.calc);
      if (!calc) continue;
      this.reviews.set(calc, review);
      this.saved.set(calc, toText(review));
    }
    for (const calc of this.calcs) {
      const [base, text] = (this.stored(this.key(calc)) ?? "").split("\0");
      const kept = this.tryRead(text);
      if (!kept || kept.calc !== calc.id) continue;
      // What was taken back here stays so; a review printed anew comes in beside.
      const printed = this.reviews.get(calc);
      this.reviews.set(calc, base === this.base(calc) ? kept : merged(printed, kept));
    }
    for (const calc of this.calcs) this.base(calc); // before a file is saved
    const [name, initials] = (this.stored("lineproof reviewer") ?? "").split("\n");
    this.name = name ?? "";
    this.initials = initials ?? "";
  }

  tryRead(text) {
    try {
      return text ? fromText(text) : null;
    } catch {
      return null;
    }
  }

  key(calc) {
    return `lineproof review ${calc.digest}`;
  }

  // Names the review that was printed with the package, as this browser first saw it.
  base(calc) {
    this.bases ??= new Map();
    if (!this.bases.has(calc)) this.bases.set(calc, fingerprint(this.saved.get(calc)));
    return this.bases.get(calc);
  }

  stored(key) {
    try {
      return localStorage.getItem(key);
    } catch {
      this.keeps = false; // a browser may forbid it for files
      return null;
    }
  }

  store(key, text) {
    try {
      localStorage.setItem(key, text);
      this.keeps = true;
    } catch {
      this.keeps = false;
    }
  }

  // Derived once a change: marks by line, states, causes, lines in findings.
  index(calc) {
    const review = this.reviews.get(calc);
    calc.marks = marksByLine(review);
    calc.why = causesOf(calc, review);
    calc.states = new Map();
    calc.disputed = new Set();
    for (const line of calc.lines.values()) {
      const marks = calc.marks.get(line.id) ?? [];
      calc.states.set(line.id, stateOf(line, marks));
      if (marks.length > 1 && isDisputed(marks)) calc.disputed.add(line.id);
    }
    const open = review.findings.filter((found) => standingOf(found) !== "closed");
    calc.found = new Map();
    for (const found of open) {
      for (const id of found.lines) calc.found.set(id, [...(calc.found.get(id) ?? []), found.number]);
    }
  }

  review(calc = this.calc) {
    return this.reviews.get(calc);
  }

  get calc() {
    return this.line?.calc ?? this.calcs[0];
  }

  isSaved(calc) {
    return toText(this.reviews.get(calc)) === this.saved.get(calc);
  }

  changed(calc) {
    this.index(calc);
    this.store(this.key(calc), `${this.base(calc)}\0${toText(this.reviews.get(calc))}`);
  }

  // What keeps the person named from marking, as a sentence; "" for nothing.
  refusal() {
    const name = this.name.trim();
    if (!name) return "Write your name first, so that the marks are yours.";
    const originator = originatorNamed(this.calc, name, this.initials);
    return originator
      ? `${originator} prepared this calc and cannot check it; you may answer findings.` : "";
  }

  enrol(review) {
    const name = this.name.trim();
    const known = review.reviewers.find((who) => who.name === name);
    if (known) known.initials = this.initials.trim() || known.initials;
    else review.reviewers.push({ name, initials: this.initials.trim() });
    return name;
  }

  // Marks the line in hand, and lines that repeat it; returns how many of these.
  mark(kind, state, note) {
    const { calc } = this;
    const review = this.review();
    const by = this.enrol(review);
    const known = review.records.find((each) => each.digest === calc.digest);
    if (!known) review.records.push(snapshotOf(calc));
    else if (!Object.keys(known.values).length) Object.assign(known, snapshotOf(calc)); // an older file
    const alike = kind === "arithmetic" && state !== "queried" ? this.line.repeats : [];
    const also = alike.filter((line) => !this.ownMark(line, kind, true));
    const at = now();
    const made = [this.line, ...also].map((line) => ({
      line: line.id, kind, state, by, at, digest: line.digest, record: calc.digest,
      note: line === this.line ? note : "",
    }));
    const places = new Set(made.map(placeOf));
    review.marks = [...review.marks.filter((mark) => !places.has(placeOf(mark))), ...made];
    this.changed(calc);
    return also.length;
  }

  // The own mark of a line, if it is not stale where that is asked.
  ownMark(line, kind, fresh = false) {
    const by = this.name.trim();
    return (line.calc.marks.get(line.id) ?? []).find((mark) => mark.by === by && mark.kind === kind
      && (!fresh || mark.digest === line.digest));
  }

  takeBack(kind) {
    const review = this.review();
    const own = this.ownMark(this.line, kind);
    if (own) review.marks = review.marks.filter((mark) => placeOf(mark) !== placeOf(own));
    this.changed(this.calc);
    return Boolean(own);
  }

  raise(severity, text, lines) {
    const review = this.review();
    const found = {
      number: nextNumber(review), severity, text, by: this.enrol(review), at: now(), lines,
      responses: [], back_checks: [], closed: [],
    };
    review.findings.push(found);
    this.changed(this.calc);
    return found.number;
  }

  say(found, list, text) {
    const review = this.review();
    const by = list === "responses" ? this.name.trim() : this.enrol(review);
    found[list].push(text ? { by, at: now(), text } : { by, at: now() });
    this.changed(this.calc);
  }

  // Takes a file in; what is here already stays. Returns the calc it is of.
  takeIn(text) {
    const review = fromText(text);
    const calc = this.calcs.find((each) => each.id === review.calc);
    if (!calc) throw new Error(`This review is of ${review.calc}, which is not in this package.`);
    const was = this.isSaved(calc) && !this.review(calc).marks.length;
    this.reviews.set(calc, merged(this.review(calc), review));
    if (was) this.saved.set(calc, toText(this.review(calc)));
    this.changed(calc);
    return calc;
  }

  // Lines that the filter shows, or null for all.
  shown() {
    if (this.filter === "all") return null;
    return new Set(this.steps.filter((line) => isShown(
      this.filter, line, line.calc.states.get(line.id), line.calc.found.has(line.id),
    )));
  }

  // The next line in a direction that holds for a test; null where there is none.
  towards(direction, test) {
    let place = this.steps.indexOf(this.line);
    if (place === -1) place = this.nearest(direction);
    for (place += direction; place >= 0 && place < this.steps.length; place += direction) {
      if (test(this.steps[place])) return this.steps[place];
    }
    return null;
  }

  // From which step to set out where the line in hand is none, or a figure.
  nearest(direction) {
    if (!this.line?.element) {
      if (direction < 0) return this.steps.length;
      const seen = this.steps.findIndex((line) => line.element.getBoundingClientRect().top > 0);
      return Math.max(seen, 0) - 1;
    }
    const after = this.steps.findIndex((line) => isBefore(this.line, line));
    const place = after === -1 ? this.steps.length : after;
    return direction > 0 ? place - 1 : place;
  }
}

function fingerprint(text) {
  let hash = 0;
  for (let place = 0; place < text.length; place += 1) {
    hash = (Math.imul(hash, 31) + text.charCodeAt(place)) >>> 0;
  }
  return `${text.length}-${hash}`;
}

function isBefore(one, other) {
  return Boolean(one.element.compareDocumentPosition(other.element)
    & Node.DOCUMENT_POSITION_FOLLOWING);
}
