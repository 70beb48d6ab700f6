// What clicks and keys do. Nothing is read or built before the tools are first opened.

class Desk {
  constructor() {
    this.work = new Work(readCalcs());
    this.trace = new Trace();
    this.panel = new Panel(this.work, this.trace);
    this.panel.margins(this.work.byPlace.values());
    this.panel.line();
    this.panel.summary();
    this.listen();
  }

  listen() {
    const { root, opener, part } = this.panel;
    opener.addEventListener("click", () => this.open());
    root.addEventListener("click", (event) => this.clicked(event.target.closest("button")));
    document.addEventListener("keydown", (event) => this.key(event));
    addEventListener("hashchange", () => this.follow(location.hash));
    document.addEventListener("click", (event) => {
      const link = event.target.closest("a[href^='#']");
      if (link) setTimeout(() => this.follow(link.getAttribute("href"))); // after the page has moved
    });
    for (const name of ["name", "initials"]) {
      part.get(name).addEventListener("change", () => this.signIn());
    }
    part.get("file").addEventListener("change", (event) => this.bring(event.target));
    part.get("raise").addEventListener("toggle", () => this.prefill());
    addEventListener("beforeunload", (event) => {
      const unsaved = this.work.calcs.some((calc) => !this.work.isSaved(calc));
      if (unsaved && !this.work.keeps) event.preventDefault();
    });
  }

  open() {
    this.panel.open(true);
    if (this.work.line) this.leave();
    else if (this.work.name) this.panel.buttons.get("next").focus();
    else this.askName();
  }

  close() {
    this.trace.clear();
    this.show("all");
    this.panel.open(false);
    this.panel.opener.focus();
  }

  signIn() {
    this.work.name = this.panel.part.get("name").value.trim();
    this.work.initials = this.panel.part.get("initials").value.trim();
    this.work.store("lineproof reviewer", `${this.work.name}\n${this.work.initials}`);
    this.panel.person();
    this.panel.line();
    const { name } = this.work;
    this.panel.say(this.work.refusal() || `Marks and findings are now written down as ${name}'s.`);
  }

  askName() {
    this.panel.part.get("person").open = true;
    this.panel.part.get("name").focus();
  }

  // Lines ------------------------------------------------------------------------------------

  go(line, { focus = true } = {}) {
    const { work, panel } = this;
    if (work.line && work.line !== line) work.before = work.line;
    const otherCalc = work.line?.calc !== line.calc;
    work.line?.element?.classList.remove("rv-here");
    work.line = line;
    line.element.classList.add("rv-here");
    panel.about = line.about;
    panel.line();
    if (otherCalc) panel.summary();
    if (focus) {
      line.element.tabIndex = -1;
      line.element.focus({ preventScroll: true });
      this.bringIn(line);
    }
    this.tell(line);
  }

  // Brings a line onto the screen; again when those around it have been laid out, if the page moved.
  bringIn(line) {
    const before = scrollY;
    line.element.scrollIntoView({ block: "nearest" });
    if (scrollY === before) return;
    requestAnimationFrame(() => requestAnimationFrame(() => {
      if (this.work.line === line) line.element.scrollIntoView({ block: "nearest" });
    }));
  }

  tell(line) {
    const state = line.calc.states.get(line.id);
    const rests = `rests on ${line.args.length}, goes into ${line.users.length}`;
    this.panel.say(`${nameOf(line)}: ${state || "not marked"}; ${rests}.`);
  }

  step(direction, test = () => true) {
    const shown = this.work.shown();
    const fits = (line) => (!shown || shown.has(line)) && test(line);
    // From a line that the filter hides all those shown are new: they are begun from their end.
    const anew = shown && this.work.line && !shown.has(this.work.line)
      ? this.work.steps.filter(fits).at(direction > 0 ? 0 : -1) : null;
    const next = this.work.towards(direction, fits) ?? anew;
    if (next) this.go(next);
    else this.panel.say(direction > 0 ? "No further line of those shown." : "No line before it.");
  }

  unmarked() {
    this.step(1, (line) => isShown("unmarked", line, line.calc.states.get(line.id), false));
  }

  // A link of the page takes the line in hand along.
  follow(href) {
    const line = this.work.byPlace.get(decoded(href.slice(1)));
    if (this.panel.isOpen && line?.element) this.jump(line, { focus: false });
  }

  // A line asked for by name is shown, whatever the filter hides.
  jump(line, how) {
    const shown = this.work.shown();
    if (shown && !shown.has(line)) this.show("all");
    this.go(line, how);
  }

  show(filter) {
    this.work.filter = filter;
    const shown = this.work.shown();
    showOnly(this.work.steps, shown);
    this.panel.summary();
    const words = FILTERS.find(([key]) => key === filter)[1];
    this.panel.say(shown ? `${words}: ${shown.size} lines shown.` : "All lines shown.");
    const { line } = this.work;
    if (!line?.element) return;
    if (!shown || shown.has(line)) this.bringIn(line);
    else if (line.element.contains(document.activeElement)) this.panel.root.focus(); // it is hidden now
  }

  deepen(way, depth) {
    this.trace.depth[way] = depth;
    this.panel.line();
    const far = ["hidden", "next lines", way === "args" ? "to the givens" : "to the checks"][depth];
    const lit = this.panel.lit[way];
    this.panel.say(`${way === "args" ? "Rests on" : "Goes into"}: ${far}; ${many(lit, "line", "lines")} lit.`);
  }

  // Marks ------------------------------------------------------------------------------------

  // Tells whether the person named may mark, and says why not.
  may(needLine = true) {
    const refusal = this.work.refusal() || (needLine && !this.work.line ? "Choose a line first." : "");
    if (!refusal) return true;
    this.panel.say(refusal);
    if (!this.work.name) this.askName();
    return false;
  }

  mark(state, note = this.work.ownMark(this.work.line, this.panel.about)?.note ?? "", how = "") {
    const { work, panel } = this;
    const also = work.mark(panel.about, state, note);
    const words = wordsOf({ kind: panel.about, state });
    this.refresh();
    panel.say(`${nameOf(work.line)}: ${words}${how}${also ? `, with ${also} that repeat it` : ""}.`);
    if (panel.part.get("onward").checked && state !== "queried") this.step(1);
  }

  comment() {
    if (!this.may()) return;
    const own = this.work.ownMark(this.work.line, this.panel.about, true);
    const note = this.panel.part.get("note").value.trim();
    this.mark(own?.state ?? "seen", note, note ? ", comment kept" : ", no comment");
  }

  takeBack() {
    const done = this.work.takeBack(this.panel.about);
    this.refresh();
    this.panel.say(done ? "Your mark is taken back." : "You have no such mark on this line.");
  }

  refresh() {
    const { work, panel } = this;
    panel.margins(work.calc.lines.values());
    panel.line();
    panel.summary();
  }

  // Findings -----------------------------------------------------------------------------------

  prefill() {
    const { line } = this.work;
    const field = this.panel.part.get("lines");
    if (!this.panel.part.get("raise").open || !line) return;
    if (field.value && field.value !== this.filled) return; // what somebody typed stays
    this.filled = line.label || line.id;
    field.value = this.filled;
  }

  raise() {
    if (!this.may(false)) return;
    const { part } = this.panel;
    const text = part.get("finding").value.trim();
    if (!text) {
      this.panel.say("Write what you found first.");
      part.get("finding").focus();
      return;
    }
    const asked = part.get("lines").value.split(/[\s,;]+/).filter(Boolean);
    const lines = [...this.work.calc.lines.values()];
    const ids = asked.map((name) => lines.find((line) => line.label === name || line.id === name)?.id);
    const unknown = asked.filter((_, place) => !ids[place]);
    if (unknown.length) {
      this.panel.say(`There is no line ${unknown.join(", ")}; write numbers such as ${lines.find((l) => l.label)?.label}.`);
      part.get("lines").focus();
      return;
    }
    const number = this.work.raise(part.get("severity").value, text, [...new Set(ids)]);
    part.get("finding").value = "";
    part.get("lines").value = "";
    part.get("raise").open = false;
    part.get("raise").querySelector("summary").focus(); // its button is hidden now
    this.refresh();
    this.panel.say(`Finding ${number} is written down.`);
  }

  reply(button) {
    const list = button.dataset.say;
    const field = button.closest("details").querySelector("textarea");
    const text = field.value.trim();
    const found = this.work.review().findings.find((each) => each.number === Number(button.dataset.finding));
    if (!this.work.name) this.may(false);
    else if (list !== "responses" && !this.may(false)) return;
    else if (list !== "closed" && !text) this.panel.say("Write it first.");
    else {
      this.work.say(found, list, text);
      field.value = "";
      this.refresh();
      this.panel.say(`Finding ${found.number}: ${standingOf(found)}.`);
    }
  }

  // The file -----------------------------------------------------------------------------------

  save() {
    const { work } = this;
    const { calc } = work;
    const text = toText(work.review());
    const page = decoded(location.pathname.split("/").pop());
    const stem = work.calcs.length === 1 && /\.html?$/i.test(page) ? page.replace(/\.html?$/i, "") : calc.id;
    const link = made("a", "", { download: `${stem.replace(/[^\p{L}\p{N}._ -]/gu, "-")}.review.json` });
    link.href = URL.createObjectURL(new Blob([text], { type: "application/json" }));
    link.click();
    setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
    work.saved.set(calc, text);
    this.panel.kept();
    this.panel.say(`Saved as ${link.download}; put it beside the calc.`);
  }

  async bring(field) {
    const [file] = field.files;
    if (!file) return;
    try {
      const calc = this.work.takeIn(await file.text());
      this.panel.margins(calc.lines.values());
      this.show(this.work.filter);
      this.panel.line();
      const stale = [...calc.states.values()].filter((state) => state === "stale").length;
      const told = [
        stale ? `${many(stale, "line has", "lines have")} changed since marked` : "",
        calc.disputed.size ? `${many(calc.disputed.size, "line", "lines")} in conflict` : "",
      ].filter(Boolean).join(", ");
      this.panel.say(`${file.name} is brought in${told ? `: ${told}` : ""}. Nothing that was here is lost.`);
    } catch (error) {
      this.panel.say(`${file.name}: ${error.message} Nothing was changed.`);
    }
    field.value = "";
  }

  // Clicks and keys ------------------------------------------------------------------------------

  clicked(button) {
    if (!button) return;
    const { go, say } = button.dataset;
    const name = button.dataset.do;
    if (go !== undefined) this.jump(this.work.byPlace.get(go));
    else if (say) this.reply(button);
    else if (/^(args|users)-\d$/.test(name)) this.deepen(name.slice(0, -2), Number(name.at(-1)));
    else if (name?.startsWith("show-")) this.show(name.slice(5));
    else this.act(name);
  }

  act(name) {
    const { panel } = this;
    if (KINDS.includes(name)) {
      panel.about = name;
      if (this.work.line) panel.marks(this.work.line);
    } else if (STATES.includes(name)) {
      if (this.may()) this.mark(name);
    } else if (name === "previous") this.step(-1);
    else if (name === "next") this.step(1);
    else if (name === "unmarked") this.unmarked();
    else if (name === "clear") { if (this.may()) this.takeBack(); }
    else if (name === "comment") this.comment();
    else if (name === "raise") this.raise();
    else if (name === "save") this.save();
    else if (name === "close") this.close();
  }

  key(event) {
    if (!this.panel.isOpen || event.defaultPrevented || event.isComposing) return;
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const typing = event.target.closest?.("input:not([type=checkbox]):not([type=file]), textarea, select, [contenteditable]");
    if (event.key === "Escape") this.leave();
    else if (typing || !this.panel.part.get("keys").checked || !this.does(event.key)) return;
    event.preventDefault();
  }

  // Does what a key stands for; tells whether it stands for anything.
  does(key) {
    const cycle = (way) => this.deepen(way, (this.trace.depth[way] + 1) % 3);
    const other = this.panel.about === "arithmetic" ? "assumption" : "arithmetic";
    const keys = {
      n: "next", p: "previous", m: "unmarked", a: "accepted", s: "seen", q: "queried", x: "clear", i: other,
    };
    if (Object.hasOwn(keys, key)) this.act(keys[key]);
    else if (key === "u") cycle("args");
    else if (key === "d") cycle("users");
    else if (key === "c") this.write("note");
    else if (key === "f") this.write("finding");
    else if (key === "t") this.panel.root.focus();
    else if (key === "o") { if (this.work.before) this.jump(this.work.before); }
    else if (/^[1-7]$/.test(key)) this.show(FILTERS[Number(key) - 1][0]);
    else return false;
    return true;
  }

  write(field) {
    if (field === "note" && !this.work.line) {
      this.panel.say("Choose a line first.");
      return;
    }
    if (field === "finding") {
      this.panel.part.get("raise").open = true;
      this.prefill();
    }
    this.panel.part.get(field).focus();
  }

  leave() {
    const { line } = this.work;
    if (line?.element) line.element.focus({ preventScroll: true });
    else document.activeElement?.blur();
  }
}

// The button stands on every page; records are read when it or a value is first clicked.
const opener = document.getElementById("review-tools").content.querySelector(".rv-open").cloneNode(true);
document.body.prepend(opener); // first for who goes through the page by Tab, past thousands of links
let desk = null;

function begin() {
  if (desk) return desk;
  opener.remove();
  desk = new Desk();
  return desk;
}

opener.addEventListener("click", () => begin().open());
document.querySelector("main").addEventListener("click", (event) => {
  const entry = event.target.closest(".entry[id]");
  const isValue = event.target.closest(".result, .working, .label");
  if (!entry || event.target.closest("a") || !getSelection().isCollapsed) return;
  if (!desk?.panel.isOpen && !isValue) return;
  const line = begin().work.byPlace.get(entry.id);
  if (!line) return;
  desk.panel.open(true);
  desk.go(line);
});
