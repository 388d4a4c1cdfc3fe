// A dropped file: which column is what, its answer in pieces that can be stopped, and what came of it.

import { chooser, el, save } from "./dom.js";
import { ask, askJson } from "./net.js";
import { unit, words } from "./numbers.js";
import { state } from "./state.js";
import { named, readTable, splitLine } from "./table.js";
import { outcome } from "./series.js";

const PIECE = 4000; // lines sent at a time
const ALONE = "ignore";

export function view(root, description) {
  const view_ = new FileView(root, description);
  return { show: (question) => view_.show(question) };
}

class FileView {
  constructor(root, description) {
    this.description = description;
    this.table = null;
    this.columns = new Map(); // header to what it is used as
    this.units = new Map();
    this.left = new Set(); // names of the question that are not sent beside the table
    const field = el("input", { type: "file", id: "file-field", accept: ".csv,.tsv,.txt,text/csv" });
    field.addEventListener("change", () => field.files[0] && this.take(field.files[0]));
    this.drop = el("div", { class: "drop" }, el("label", { for: "file-field" }, "Drop a CSV file here, or choose one "), field,
      el("p", { class: "help" }, "One line per sample under a header. It goes to this service and nowhere else."));
    for (const type of ["dragover", "dragleave", "drop"]) {
      this.drop.addEventListener(type, (event) => {
        event.preventDefault();
        this.drop.classList.toggle("over", type === "dragover");
        if (type === "drop" && event.dataTransfer.files[0]) this.take(event.dataTransfer.files[0]);
      });
    }
    this.setup = el("div");
    this.doing = el("div");
    this.result = el("div");
    root.replaceChildren(this.drop, this.setup, this.doing, this.result);
  }

  async take(file) {
    this.stop?.();
    this.result.replaceChildren();
    this.doing.replaceChildren(el("p", { role: "status" }, `Reading ${file.name}…`));
    try {
      this.table = await readTable(file);
    } catch (error) {
      this.table = null;
      this.setup.replaceChildren();
      this.doing.replaceChildren(el("p", { class: "error", role: "alert" }, error.message));
      return;
    }
    this.columns.clear();
    this.units.clear();
    this.doing.replaceChildren();
    this.lay();
  }

  show(question) {
    this.question = question;
    if (this.table) this.lay();
  }

  // What each column is: by its own name, as an input it was said to be, or passed through.
  lay() {
    const inputs = this.question.inputs.filter((name) => !["request", "course"].includes(this.question.about(name).holds));
    const taken = new Set(inputs);
    const sample = splitLine(this.table.lines[0], this.table.delimiter);
    const rows = this.table.header.map((header, at) => {
      const [name, unit] = named(header);
      const own = taken.has(name);
      const field = chooser({ "aria-label": `what the column ${header} is`, disabled: own }, own ? [["", words(name)]]
        : [["", "passed through"], [ALONE, "left alone, though its name is nearly an input's"], { label: "used as", choices: inputs.map((each) => [each, words(each)]) }], this.columns.get(header) || "");
      field.addEventListener("change", () => {
        this.columns.set(header, field.value);
        this.lay();
        this.setup.querySelector(`[aria-label="what the column ${CSS.escape(header)} is"]`)?.focus();
      });
      return el("tr", {}, el("th", { scope: "row" }, header), el("td", {}, sample[at] ?? ""), el("td", {}, field, " ", this.unitField(header, unit)));
    });
    const go = el("button", { type: "button", class: "go", onclick: () => this.compute() }, `Answer ${this.table.lines.length.toLocaleString("en")} lines`);
    this.setup.replaceChildren(
      el("h3", {}, `${this.table.name}: columns`),
      el("div", { class: "scroll", tabindex: "0", role: "group", "aria-label": "Columns of the file" }, el("table", {},
        el("thead", {}, el("tr", {}, ["header", "first line", "used as"].map((text) => el("th", { scope: "col" }, text)))), el("tbody", {}, rows))),
      el("h3", {}, "Sent beside the table, from the question"), this.besides(), el("p", {}, go));
  }

  unitField(header, own) {
    const used = this.columns.get(header);
    if (!used || used === ALONE || own || used === "time") return "";
    const about = this.question.about(used);
    const field = chooser({ "aria-label": `unit of the column ${header}` }, (this.description.unit_lists[about.units] || [about.unit]).map((each) => [each, unit(each)]), this.units.get(header) || about.unit);
    field.addEventListener("change", () => this.units.set(header, field.value));
    return field;
  }

  used() {
    const taken = new Set(this.question.inputs);
    const pairs = this.table.header.map((header) => [this.columns.get(header) || named(header)[0], header]);
    return new Map(pairs.filter(([name]) => taken.has(name)));
  }

  // The question's own values that are neither in the table nor another way of telling what is there.
  beside() {
    const used = this.used();
    const told = this.question.quantity.sides.filter((side) => side.members.some((name) => used.has(name)));
    const clashing = new Set(told.flatMap((side) => side.members));
    const inputs = new Set(this.question.inputs);
    return this.question.pairs().filter(([name, value]) => !used.has(name) && !clashing.has(name)
      && !(name.startsWith("u_") && clashing.has(name.slice(2)) && !used.has(name.slice(2)))
      && !(inputs.has(name) && value.includes(";")));
  }

  besides() {
    const inputs = new Set(this.question.inputs);
    const rows = this.beside().map(([name, value]) => {
      if (state.isExample && inputs.has(name)) this.left.add(name); // an example's value is nobody's
      const field = el("input", { type: "checkbox", checked: !this.left.has(name) });
      field.addEventListener("change", () => (field.checked ? this.left.delete(name) : this.left.add(name)));
      return el("label", {}, field, ` ${words(name)}: ${value}`);
    });
    return rows.length ? el("p", { class: "switches" }, rows) : el("p", { class: "help" }, "Nothing.");
  }

  pairs() {
    const mapped = [...this.columns].filter(([, used]) => used && used !== ALONE)
      .map(([header, used]) => [used, `@${header}${this.units.get(header) ? ` [${this.units.get(header)}]` : ""}`]);
    const alone = [...this.columns].filter(([, used]) => used === ALONE).map(([header]) => header);
    return [...this.beside().filter(([name]) => !this.left.has(name)), ...mapped, ...(alone.length ? [["ignore", alone.join(";")]] : [])];
  }

  async compute() {
    const { question, table } = this;
    const pairs = this.pairs();
    const address = question.quantity.address + query(pairs);
    const controller = new AbortController();
    this.stop = () => controller.abort();
    const bar = el("progress", { max: table.lines.length, value: 0, "aria-label": "lines answered" });
    const status = el("span", { role: "status" }, "0 lines answered");
    const stop = el("button", { type: "button", onclick: this.stop }, "Stop");
    this.doing.replaceChildren(el("p", { class: "doing" }, bar, status, stop));
    this.result.replaceChildren();
    const answered = [];
    let header = "";
    const whole = question.inputs.some((name) => question.about(name).holds === "series" && question.isNeeded(name)); // lines hang together
    const step = whole ? table.lines.length : PIECE;
    try {
      for (let at = 0; at < table.lines.length; at += step) {
        const piece = table.lines.slice(at, at + step);
        const response = await ask(address, { method: "POST", body: `${table.first}\n${piece.join("\n")}\n`, type: "text/csv", accept: "text/csv", signal: controller.signal });
        const lines = (await response.text()).split("\n");
        header = lines[0];
        for (const line of lines.slice(1)) if (line) answered.push(line);
        bar.value = Math.min(at + step, table.lines.length);
        status.textContent = `${answered.length.toLocaleString("en")} of ${table.lines.length.toLocaleString("en")} lines answered`;
      }
    } catch (problem) {
      if (problem.name !== "AbortError") {
        this.refused(problem);
        return;
      }
      status.textContent = `Stopped: ${answered.length.toLocaleString("en")} of ${table.lines.length.toLocaleString("en")} lines answered`;
    }
    bar.remove();
    stop.remove();
    if (!answered.length) return;
    const keep = el("button", { type: "button", onclick: () => save([`${header}\n`, answered.map((line) => `${line}\n`).join("")], table.name.replace(/(\.\w+)?$/, "_answered.csv"), "text/csv") }, "Save the answered CSV");
    this.doing.firstChild.append(keep);
    const isWhole = answered.length === table.lines.length;
    outcome(this.result, { header, lines: answered, delimiter: table.delimiter, question, timeHeader: this.used().get("time"), summary: isWhole ? await this.summary(pairs, controller.signal) : null });
  }

  // Mean and integral over time, by the service, from the whole file at once.
  async summary(pairs, signal) {
    const { question, table } = this;
    const main = question.quantity.results[0].name;
    if (!question.quantity.takes.includes("summary") || !this.used().has("time") || table.lines.length > this.description.limits.samples) return null;
    const asked = [...pairs.filter(([name]) => !["pick", "summary"].includes(name)), ["pick", main], ["summary", "1"], ["form", "json"], ["detail", "brief"]];
    try {
      const body = `${table.first}\n${table.lines.join("\n")}\n`;
      return (await askJson(question.quantity.address + query(asked), { method: "POST", body, type: "text/csv", signal })).summary;
    } catch (problem) {
      return { problem: problem.message };
    }
  }

  refused(problem) {
    const listed = problem.errors.map((each) => el("li", {}, el("code", {}, each.name), each.line ? ` (line ${each.line})` : "", ` ${each.reason}`));
    this.doing.replaceChildren(el("p", { class: "error", role: "alert" }, problem.errors.length ? "The file was refused:" : problem.message), el("ul", { class: "reasons" }, listed),
      el("p", { class: "help" }, "Say above what each column is, or complete the question."));
  }
}

function query(pairs) {
  const text = new URLSearchParams(pairs).toString().replaceAll("+", "%20");
  return text ? `?${text}` : "";
}
