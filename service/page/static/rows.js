// Makes the rows of the question: an input with its unit and its uncertainty, or an option with its choices.

import { chooser, el } from "./dom.js";
import { bringsUnit, number, unit, words } from "./numbers.js";
import { set, state } from "./state.js";

const MANY = 40; // choices beyond which a list is typed into, not scrolled through

export function inputRow(name, about, units, isUncertain) {
  const id = `in-${name}`;
  const field = el("input", {
    id, type: "text", inputmode: "text", spellcheck: "false", "aria-describedby": `help-${name} error-${name}`,
    placeholder: about.default ?? "", class: "number",
  });
  const listed = unitField(name, about, units);
  const doubt = isUncertain
    ? el("input", { type: "text", class: "number doubt", spellcheck: "false", "aria-label": `standard uncertainty of ${words(name)}` })
    : null;
  const row = el("div", { class: "row", "data-name": name },
    el("label", { for: id }, words(name)),
    el("span", { class: "given" }, field, listed,
      doubt && el("span", { class: "sure" }, el("span", { "aria-hidden": "true" }, "±"), doubt)),
    el("p", { class: "help", id: `help-${name}` }, about.description, possible(about)),
    el("p", { class: "error", id: `error-${name}` }));
  const tell = () => set(name, joined(field.value, listed.value, about.unit));
  field.addEventListener("input", tell);
  listed.addEventListener("change", tell);
  doubt?.addEventListener("input", () => set(`u_${name}`, doubt.value.trim()));
  row.refresh = () => {
    if (row.contains(document.activeElement)) return;
    const [text, of] = parted(state.values.get(name) ?? "", units, about.unit);
    field.value = text;
    listed.value = of;
    if (doubt) doubt.value = state.values.get(`u_${name}`) ?? "";
  };
  return row;
}

function unitField(name, about, units) {
  const label = `unit of ${words(name)}`;
  if (units.length === 1) return el("output", { class: "unit", "aria-label": label }, unit(about.unit));
  return chooser({ "aria-label": label, class: "unit" }, units.map((each) => [each, unit(each)]), about.unit);
}

function joined(text, chosen, bare) {
  const trimmed = text.trim();
  return trimmed && chosen && chosen !== bare && !bringsUnit(trimmed) ? `${trimmed} ${chosen}` : trimmed;
}

function parted(value, units, bare) {
  const found = units.filter((each) => value.endsWith(` ${each}`)).sort((a, b) => b.length - a.length)[0];
  return found ? [value.slice(0, -found.length - 1), found] : [value, bare];
}

function possible(about) {
  const [low, high] = about.possible || [null, null];
  if (low === null && high === null) return "";
  const of = about.unit === "1" ? "" : ` ${unit(about.unit)}`;
  if (high === null) return `; from ${number(low)}${of}`;
  return `; ${number(low)} to ${number(high)}${of}`;
}

export function optionRow(name, about, choices, lead) {
  if (about.several && choices.length) return severalRow(name, about, choices, lead);
  const id = `in-${name}`;
  const described = { id, "aria-describedby": `help-${name} error-${name}` };
  const field = choices.length
    ? chooser(described, [["", lead], ...choices])
    : el("input", { ...described, type: "text", spellcheck: "false" });
  field.addEventListener(choices.length ? "change" : "input", () => set(name, field.value.trim()));
  const row = framed(name, about, el("label", { for: id }, words(name)), field);
  row.refresh = () => {
    if (document.activeElement !== field) field.value = state.values.get(name) ?? "";
  };
  return row;
}

// Several of a list, in order: one field for each, and an empty one to add another.
function severalRow(name, about, choices, lead) {
  const fields = el("span", { class: "several" });
  const row = framed(name, about, el("label", { for: `in-${name}` }, words(name)), fields);
  const tell = () => set(name, [...fields.children].map((each) => each.value).filter(Boolean).join(";"));
  row.refresh = () => {
    const chosen = (state.values.get(name) ?? "").split(";").map((each) => each.trim()).filter(Boolean);
    const now = [...fields.children].map((each) => each.value);
    const wanted = chosen.length ? [...chosen, ""] : [""];
    if (now.length === wanted.length && now.every((value, at) => value === wanted[at])) return;
    const hadFocus = fields.contains(document.activeElement)
      ? [...fields.children].indexOf(document.activeElement) : -1;
    fields.replaceChildren(...wanted.map((value, place) => {
      const first = place === 0;
      const field = chooser({
        id: first ? `in-${name}` : null,
        "aria-label": first ? null : `${words(name)}, number ${place + 1}`,
        "aria-describedby": `help-${name} error-${name}`,
      }, [["", first && !value ? lead : place < chosen.length ? "leave out" : "add another"], ...choices], value);
      field.addEventListener("change", tell);
      return field;
    }));
    if (hadFocus >= 0) fields.children[Math.min(hadFocus, fields.children.length - 1)].focus();
  };
  return row;
}

function framed(name, about, label, field) {
  return el("div", { class: "row option", "data-name": name }, label, el("span", { class: "given" }, field),
    el("p", { class: "help", id: `help-${name}` }, about.description),
    el("p", { class: "error", id: `error-${name}` }));
}

// The unit of a result: chosen from a list, or typed where the list is long.
export function resultUnit(result, units) {
  const name = `unit.${result.name}`;
  const now = state.values.get(name) ?? "";
  const label = `unit of the ${words(result.name)}`;
  if (units.length < 2) return el("span", { class: "unit" }, unit(result.unit));
  if (units.length <= MANY) {
    const field = chooser({ "aria-label": label, class: "unit" }, units.map((each) => [each === result.unit ? "" : each, unit(each)]), now);
    field.addEventListener("change", () => set(name, field.value));
    return field;
  }
  const list = el("datalist", { id: `units-${result.name}` }, units.map((each) => el("option", { value: each })));
  const field = el("input", { type: "text", class: "unit", "aria-label": label, list: list.id, value: now || result.unit, spellcheck: "false" });
  field.addEventListener("change", () => set(name, field.value.trim() === result.unit ? "" : field.value.trim()));
  return el("span", { class: "typed-unit" }, field, list);
}
