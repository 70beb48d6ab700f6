// The tools at the side: what they show. All texts are set as text, never as markup.

class Panel {
  constructor(work, trace) {
    this.work = work;
    this.trace = trace;
    document.body.prepend(document.getElementById("review-tools").content.cloneNode(true));
    this.opener = document.querySelector(".rv-open");
    this.root = document.getElementById("rv");
    this.part = new Map([...this.root.querySelectorAll("[data-rv]")].map((e) => [e.dataset.rv, e]));
    this.buttons = new Map([...this.root.querySelectorAll("[data-do]")].map((e) => [e.dataset.do, e]));
    this.about = "arithmetic";
    this.part.get("name").value = work.name;
    this.part.get("initials").value = work.initials;
    this.part.get("person").open = !work.name;
    this.person();
    FILTERS.forEach(([key, words], place) => {
      const button = made("button", "", { type: "button" });
      button.dataset.do = `show-${key}`;
      button.append(words, " ", made("small"));
      button.title = `Key ${place + 1}`;
      this.part.get("filters").append(button);
      this.buttons.set(button.dataset.do, button);
    });
  }

  get isOpen() {
    return !this.root.hidden;
  }

  open(opened) {
    this.root.hidden = !opened;
    this.opener.hidden = opened;
    this.opener.setAttribute("aria-expanded", String(opened));
    document.documentElement.classList.toggle("rv-on", opened);
  }

  say(sentence) {
    this.part.get("status").textContent = sentence;
  }

  person() {
    const { name, initials } = this.work;
    this.part.get("person-name").textContent =
      name ? `Reviewed by ${name}${initials ? ` (${initials})` : ""}` : "Who reviews";
  }

  // What stands beside every line in the margin.
  margins(lines) {
    for (const line of lines) this.margin(line);
  }

  margin(line) {
    if (!line.element) return;
    const { calc } = line;
    const words = { accepted: "✓ accepted", seen: "seen", queried: "? query", stale: "stale" };
    const numbers = calc.found.get(line.id) ?? [];
    const told = [
      calc.disputed.has(line.id) ? "≠ conflict" : words[calc.states.get(line.id)] ?? "",
      numbers.length ? `finding${numbers.length > 1 ? "s" : ""} ${numbers.join(", ")}` : "",
    ].filter(Boolean).join(", ");
    if (told) line.element.dataset.mark = told;
    else delete line.element.dataset.mark;
  }

  // Everything that depends on the line in hand.
  line() {
    const { line } = this.work;
    this.part.get("own").hidden = !line;
    const found = line ? this.trace.around(line) : { args: new Map(), users: new Map() };
    this.part.get("line").textContent = line ? nameOf(line) : "No line chosen";
    this.lit = { args: found.args.size, users: found.users.size };
    for (const way of ["args", "users"]) this.list(way, line, found[way]);
    if (line) this.marks(line);
  }

  list(way, line, found) {
    const none = way === "args" ? "nothing: it is where numbers begin" : "no other line";
    const near = line ? line[way].map((id) => line.calc.lines.get(id)) : [];
    const items = near.map((each) => {
      const item = made("li");
      const button = made("button", nameOf(each), { type: "button" });
      button.dataset.go = each.calc.prefix + each.id;
      item.append(button);
      return item;
    });
    if (line && !items.length) items.push(made("li", none));
    const further = found.size - near.length;
    if (further > 0) items.push(made("li", `and ${further} further lines, lit on the page`));
    this.part.get(way).replaceChildren(...items);
    [0, 1, 2].forEach((n) => this.pressed(`${way}-${n}`, this.trace.depth[way] === n));
  }

  marks(line) {
    const { calc } = line;
    const marks = calc.marks.get(line.id) ?? [];
    this.part.get("marks").replaceChildren(...marks.map((mark) => {
      const stale = mark.digest === line.digest ? "" : `; stale: ${calc.why(mark)}`;
      const note = mark.note ? `: ${mark.note}` : "";
      return made("li", `${mark.by}, ${mark.at.slice(0, 10)}: ${wordsOf(mark)}${note}${stale}`);
    }));
    const own = this.work.ownMark(line, this.about);
    const fresh = this.work.ownMark(line, this.about, true);
    for (const kind of KINDS) this.pressed(kind, this.about === kind);
    for (const state of STATES) this.pressed(state, fresh?.state === state);
    this.buttons.get("accepted").textContent =
      this.about === "arithmetic" ? "Arithmetic checked" : "Assumption accepted";
    this.part.get("note").value = own?.note ?? "";
  }

  pressed(name, truth) {
    this.buttons.get(name).setAttribute("aria-pressed", String(truth));
  }

  // Everything that depends on the marks and findings of all lines.
  summary() {
    const { work } = this;
    const { calc } = work;
    const needed = work.steps.filter((line) => line.needed && line.calc === calc);
    const states = needed.map((line) => calc.states.get(line.id));
    const done = states.filter((state) => state && state !== "stale").length;
    this.part.get("calc").textContent = calc.id;
    this.part.get("progress").max = Math.max(needed.length, 1);
    this.part.get("progress").value = done;
    this.part.get("count").textContent = `${done} of ${needed.length} lines marked`;
    for (const [key] of FILTERS) {
      const count = work.steps.filter((line) => isShown(
        key, line, line.calc.states.get(line.id), line.calc.found.has(line.id),
      )).length;
      this.buttons.get(`show-${key}`).querySelector("small").textContent = String(count);
      this.pressed(`show-${key}`, work.filter === key);
    }
    this.findings();
    this.kept();
  }

  kept() {
    const { work } = this;
    const open = work.calcs.filter((calc) => !work.isSaved(calc)).map((calc) => calc.id);
    const where = work.keeps ? "This browser keeps them meanwhile."
      : "This browser keeps nothing: save before you close the page.";
    const signed = work.review().signed.map((each) => `Signed off by ${each.by} on ${each.on}`
      + (each.record === work.calc.digest ? "." : ", for an earlier record."));
    this.part.get("kept").textContent = [
      open.length ? `Marks of ${open.join(", ")} are not in a file yet. ${where}` : "", ...signed,
    ].filter(Boolean).join(" ");
    this.buttons.get("save").textContent =
      work.calcs.length > 1 ? `Save ${work.calc.id} to file` : "Save to file";
  }

  // Written anew after every mark: what somebody is writing about a finding stays, and so does the focus.
  findings() {
    const { calc } = this.work;
    const list = this.part.get("findings");
    const drafts = new Map([...list.querySelectorAll("details")].map((form) => [form.dataset.about, {
      calc: form.dataset.calc, open: form.open, text: form.querySelector("textarea").value,
    }]));
    const active = list.contains(document.activeElement) ? document.activeElement : null;
    const number = active?.closest("details")?.dataset.about;
    const what = active?.dataset.say ? `[data-say="${active.dataset.say}"]` : active?.tagName;
    this.part.get("findings").replaceChildren(...this.work.review().findings.map((found) => {
      const item = made("li", "", { value: found.number });
      item.append(made("strong", `${found.severity}, ${standingOf(found)}. `), found.text, " ");
      item.append(made("small", `${found.by}, ${found.at.slice(0, 10)} `));
      for (const id of found.lines) {
        const line = calc.lines.get(id);
        const button = made("button", line ? line.label || line.title : `${id} (gone)`, { type: "button" });
        if (line) button.dataset.go = calc.prefix + id;
        button.disabled = !line;
        item.append(button, " ");
      }
      for (const [list, word] of [["responses", "Answer"], ["back_checks", "Back-check"], ["closed", "Closed"]]) {
        for (const said of found[list]) {
          item.append(made("p", `${word}, ${said.by}, ${said.at.slice(0, 10)}${said.text ? `: ${said.text}` : ""}`));
        }
      }
      const draft = drafts.get(String(found.number));
      item.append(this.reply(found, draft?.calc === calc.id ? draft : undefined));
      return item;
    }));
    if (number) list.querySelector(`[data-about="${number}"]`)?.querySelector(what)?.focus();
  }

  // What can be said of a finding: by its designer an answer, by its checker all else.
  reply(found, draft = { open: false, text: "" }) {
    const form = made("details", "", { open: draft.open });
    form.dataset.about = String(found.number);
    form.dataset.calc = this.work.calc.id;
    const text = made("textarea", "", { rows: 2, maxLength: LONGEST, value: draft.text });
    text.setAttribute("aria-label", `About finding ${found.number}`);
    form.append(made("summary", "Answer, back-check, close"), text);
    const row = made("div", "", { className: "rv-row" });
    for (const [list, word] of [["responses", "Answer"], ["back_checks", "Back-check"], ["closed", "Close"]]) {
      const button = made("button", word, { type: "button" });
      button.dataset.say = list;
      button.dataset.finding = String(found.number);
      row.append(button);
    }
    form.append(row);
    return form;
  }
}

function made(tag, text = "", values = {}) {
  return Object.assign(document.createElement(tag), text ? { textContent: text } : {}, values);
}
