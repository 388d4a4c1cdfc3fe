// Lays the question out: what is asked, the conditions it needs as it stands, and all else behind a fold.

import { chooser, el } from "./dom.js";
import { withUnit, words } from "./numbers.js";
import { Question } from "./question.js";
import { inputRow, optionRow } from "./rows.js";
import { changed, changeQuantity, forget, set, state } from "./state.js";

const FIRST = ["gas", "water", "parameterisation"]; // told before the conditions, since these depend on them
const OF_DOUBT = ["uncertainty_method", "draws", "seed", "coverage", "common"];
const ofDoubt = (name) => name.startsWith("u_") || OF_DOUBT.includes(name);
let current = null;

export function buildForm(root, description) {
  current = new Form(root, description);
  root.addEventListener("submit", (event) => event.preventDefault());
  current.reset();
  return current;
}

export function showErrors(errors) {
  current?.showErrors(errors);
}

class Form {
  constructor(root, description) {
    this.root = root;
    this.description = description;
    this.rows = new Map();
    this.chosen = new Map(); // by side the member whose field is open, before it has a value
    this.seen = {}; // texts by which rows are made, to make them again only where one changed
  }

  reset() {
    this.rows.clear();
    this.chosen.clear();
    this.seen = {};
    this.note = el("p", { class: "note" });
    this.first = el("div", { class: "rows" });
    this.conditions = el("div", { class: "rows" });
    this.sides = el("div");
    this.further = fold("Further conditions");
    this.options = fold("Methods and options");
    this.doubt = fold("How sure");
    this.root.replaceChildren(el("h2", { class: "unseen" }, "The question"), this.first, this.note, el("h3", {}, "Conditions"), this.conditions, this.sides,
      this.further.fold, this.options.fold, this.doubt.fold);
    this.update();
  }

  update() {
    const question = new Question(this.description);
    if (question.quantity !== this.quantity) {
      this.quantity = question.quantity;
      this.rows.clear();
      this.chosen.clear();
    }
    this.question = question;
    this.showNote();
    const lead = FIRST.filter((name) => question.quantity.takes.includes(name));
    place(this.first, [this.quantityRow(), ...lead.map((name) => this.option(name))]);
    const placed = new Set();
    this.placeSides(placed);
    this.placeConditions(placed);
    place(this.further.body, question.inputs.filter((name) => !placed.has(name)).map((name) => this.input(name)), this.spareSides);
    const others = question.options.filter((name) => !FIRST.includes(name));
    place(this.options.body, others.filter((name) => !ofDoubt(name)).map((name) => this.option(name)));
    this.placeDoubt(others.filter(ofDoubt));
    for (const [, row] of this.rows) row.refresh?.();
  }

  showNote() {
    if (!state.isExample) {
      this.note.replaceChildren();
      return;
    }
    const clear = el("button", { type: "button", onclick: () => {
      state.values = new Map(["gas"].filter((name) => state.values.has(name)).map((name) => [name, state.values.get(name)]));
      state.isExample = false;
      changed();
    } }, "Empty the fields");
    this.note.replaceChildren("These values are an example: put yours in their place. ", clear);
  }

  quantityRow() {
    const row = this.rows.get("quantity") || this.made("quantity", () => {
      const choices = Object.keys(this.description.quantities).map((name) => [name, words(name.replaceAll("-", " "))]);
      const field = chooser({ id: "in-quantity" }, choices, state.quantity);
      field.addEventListener("change", () => changeQuantity(this.description, field.value));
      return el("div", { class: "row option" }, el("label", { for: "in-quantity" }, "What to compute"),
        el("span", { class: "given" }, field), el("p", { class: "help" }));
    });
    row.querySelector("select").value = state.quantity;
    row.querySelector(".help").textContent = this.question.quantity.title;
    return row;
  }

  made(name, make) {
    this.rows.set(name, make());
    return this.rows.get(name);
  }

  input(name) {
    if (this.rows.has(name)) return this.rows.get(name);
    const about = this.question.about(name);
    const units = this.description.unit_lists[about.units] || [about.unit];
    return this.made(name, () => inputRow(name, about, units, this.question.uncertain.includes(name)));
  }

  // An option is made again where its choices changed, with the gas or the water.
  option(name) {
    const [choices, lead] = this.choices(name);
    const seen = JSON.stringify([choices, lead]);
    if (this.rows.has(name) && this.seen[name] === seen) return this.rows.get(name);
    this.seen[name] = seen;
    return this.made(name, () => optionRow(name, this.question.about(name), choices, lead));
  }

  choices(name) {
    const about = this.question.about(name);
    if (name === "gas") {
      const gases = Object.entries(this.description.gases).filter(([gas]) => about.choices.includes(gas));
      return [gases.map(([gas, each]) => [gas, `${each.title}, ${each.formula}`]).sort((a, b) => a[1].localeCompare(b[1])), "choose a gas"];
    }
    if (about.unit || !about.choices) return [[], ""];
    const only = about["gases-by-choice"] || {};
    const fitting = about.choices.filter((each) => !only[each] || only[each].includes(this.question.gas));
    const assumed = this.question.assumedMethod(about);
    if (name !== "parameterisation") return [fitting.map((each) => [each, each || "(nothing)"]), assumed === "" ? "not told" : `as usual: ${assumed}`];
    return this.parameterisations(fitting, assumed);
  }

  parameterisations(fitting, assumed) {
    const { waters } = this.description;
    const water = this.question.value("water");
    const fits = (method) => !water || !waters[method]?.length || waters[method].includes(water);
    const group = (label, methods) => ({ label, choices: methods.map((each) => [each, each]) });
    const groups = [group(water ? `made for ${water}` : "methods", fitting.filter(fits)), group("made for other water", fitting.filter((each) => !fits(each)))];
    const every = water ? [["all", `every method that fits ${water}`]] : [];
    return [[...every, ...groups.filter((each) => each.choices.length)], fits(assumed) ? `as usual: ${assumed}` : "choose a method"];
  }

  placeSides(placed) {
    const shown = [];
    this.spareSides = [];
    for (const side of this.question.quantity.sides) {
      const set = this.sideSet(side, placed);
      (this.question.isSideNeeded(side) ? shown : this.spareSides).push(set);
    }
    place(this.sides, shown);
  }

  sideSet(side, placed) {
    const member = this.question.told(side) || this.chosen.get(side.name) || "";
    const set = this.rows.get(side.name) || this.made(side.name, () => this.newSideSet(side));
    const assumed = this.question.assumedOf(side);
    const lead = assumed.length
      ? `assumed: ${assumed.map(([name, value]) => `${words(name)} ${withUnit(value, this.question.about(name).unit, 0)}`).join(", ")}`
      : this.question.isSideNeeded(side) ? "choose how it is told" : "not told";
    const field = set.querySelector("select");
    const choices = [["", lead], ...this.question.membersOf(side).map((name) => [name, words(name)])];
    if (set.dataset.choices !== JSON.stringify(choices)) {
      set.dataset.choices = JSON.stringify(choices);
      field.replaceChildren(...choices.map(([value, text]) => el("option", { value }, text)));
    }
    field.value = member;
    for (const name of side.members) placed.add(name);
    const names = member ? [member, ...this.along(side, member)] : [];
    for (const name of names) placed.add(name);
    place(set.querySelector(".rows"), names.map((name) => this.input(name)));
    return set;
  }

  newSideSet(side) {
    const id = `side-${side.name}`;
    const field = el("select", { id, "aria-describedby": `error-${side.name}` });
    field.addEventListener("change", () => {
      for (const name of side.members) {
        forget(name);
        forget(`u_${name}`);
      }
      state.isExample = false;
      this.chosen.set(side.name, field.value);
      changed();
      if (field.value) document.getElementById(`in-${field.value}`)?.focus();
    });
    return el("div", { class: "side", role: "group", "aria-labelledby": `title-${side.name}`, "data-name": side.name },
      el("div", { class: "row option" }, el("label", { for: id, id: `title-${side.name}` }, capital(side.meaning)),
        el("span", { class: "given" }, field), el("p", { class: "error", id: `error-${side.name}` })),
      el("div", { class: "rows" }));
  }

  // What is told beside a member of a side: what it needs, and what is used with it.
  along(side, member) {
    const beside = side.beside?.[member] ? [side.beside[member]] : [];
    const brought = this.question.inputs.filter((name) => this.question.broughtBy(name).includes(member)
      || (this.question.about(name)["used-with"] || []).includes(member));
    return [...new Set([...beside, ...brought])].filter((name) => !side.members.includes(name));
  }

  placeConditions(placed) {
    const needed = this.question.inputs.filter((name) => !placed.has(name) && this.question.isNeeded(name));
    const isAlways = (name) => this.question.needed(name) === "always";
    needed.sort((a, b) => isAlways(b) - isAlways(a));
    const shown = new Set(needed);
    const names = needed.flatMap((name) => [name, ...this.question.inputs.filter((other) =>
      !placed.has(other) && !shown.has(other) && this.question.goesWith(other, new Set([name])))]);
    const unique = [...new Set(names)];
    for (const name of unique) placed.add(name);
    place(this.conditions, unique.map((name) => this.input(name)));
  }

  placeDoubt(options) {
    const isAsked = [...state.values.keys()].some((name) => name.startsWith("u_"));
    this.root.classList.toggle("is-sure", isAsked);
    this.doubt.fold.hidden = !this.question.uncertain.length;
    const toggle = this.rows.get("doubt") || this.made("doubt", () => {
      const field = el("input", { type: "checkbox", id: "in-doubt" });
      field.addEventListener("change", () => {
        if (field.checked) set("u_methods", "1");
        else {
          for (const name of [...state.values.keys()].filter(ofDoubt)) forget(name);
          changed();
        }
      });
      return el("div", { class: "row option" }, el("label", { for: "in-doubt" }, "Tell the uncertainty of the result"),
        el("span", { class: "given" }, field),
        el("p", { class: "help" }, "Behind each input opens a field for its own standard uncertainty."));
    });
    toggle.querySelector("input").checked = isAsked;
    place(this.doubt.body, [toggle, ...(isAsked ? options.map((name) => this.option(name)) : [])]);
  }

  // Puts what is wrong beside the field it is about; returns nothing, since the answer lists all of it, too.
  showErrors(errors) {
    for (const line of this.root.querySelectorAll(".error")) line.textContent = "";
    for (const field of this.root.querySelectorAll("[aria-invalid]")) field.removeAttribute("aria-invalid");
    for (const { name, reason, isNote } of errors) {
      const line = document.getElementById(`error-${name.replace(/^u_/, "")}`);
      if (!line) continue;
      line.textContent += `${line.textContent ? "; " : ""}${name.startsWith("u_") ? `its uncertainty ${reason}` : reason}`;
      line.classList.toggle("mild", Boolean(isNote));
      const row = line.closest(".row");
      if (!isNote) row.querySelector("input, select").setAttribute("aria-invalid", "true");
      const hidden = row.closest("details.fold");
      if (hidden && !isNote) hidden.open = true;
    }
  }
}

function fold(title) {
  const body = el("div", { class: "rows" });
  return { fold: el("details", { class: "fold" }, el("summary", {}, title), body), body };
}

// Puts rows in place without touching those that stand there already, so that a field keeps its focus.
function place(parent, rows, more = []) {
  const wanted = [...rows, ...more];
  if (parent.children.length === wanted.length && wanted.every((row, at) => parent.children[at] === row)) return;
  const focused = document.activeElement;
  parent.replaceChildren(...wanted);
  if (focused && focused !== document.activeElement && parent.contains(focused)) focused.focus({ preventScroll: true });
}

function capital(text) {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
