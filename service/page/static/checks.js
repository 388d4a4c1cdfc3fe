// Every published figure beside what this installation computes now: how far apart, and where it is printed.

import { chooser, el, svg } from "./dom.js";
import { source, scrolled } from "./answer.js";
import { askJson } from "./net.js";
import { number, unit, words } from "./numbers.js";
import { setPage, state } from "./state.js";

const DIGITS = 8;
const REACH = 1.5; // tolerances to either side that the measure shows

export function view(root) {
  let isAsked = false;
  return {
    async show() {
      if (isAsked) return;
      isAsked = true;
      root.replaceChildren(el("p", { class: "help", role: "status" }, "Computing every published figure…"));
      try {
        root.replaceChildren(...report(await askJson("/v1/checks")));
      } catch (problem) {
        isAsked = false;
        root.replaceChildren(el("p", { class: "refusal" }, problem.message));
      }
    },
  };
}

function report({ summary, checks, service }) {
  const status = el("p", { class: "help", role: "status" });
  const body = el("tbody");
  const rows = checks.map((each) => ({ each, row: checkRow(each), text: JSON.stringify(each).toLowerCase() }));
  const gases = [...new Set(checks.map((each) => each.gas).filter(Boolean))].sort();
  const gas = chooser({ id: "check-gas" }, [["", "every gas"], ...gases.map((each) => [each, each])], state.page.get("check_gas") || "");
  const search = el("input", { type: "text", id: "check-text", value: state.page.get("check_text") || "", spellcheck: "false" });
  const off = el("input", { type: "checkbox", id: "check-off" });
  const filter = () => {
    const wanted = search.value.trim().toLowerCase();
    const kept = rows.filter(({ each, text }) => (!gas.value || each.gas === gas.value) && text.includes(wanted) && !(off.checked && each.holds));
    body.replaceChildren(...kept.map(({ row }) => row));
    status.textContent = `${kept.length} of ${rows.length} shown, ${kept.filter(({ each }) => each.holds).length} of them hold`;
    setPage("check_gas", gas.value);
    setPage("check_text", search.value.trim());
  };
  for (const field of [gas, off]) field.addEventListener("change", filter);
  search.addEventListener("input", filter);
  filter();
  return [
    el("p", {}, `${summary.rows} figures, ${summary.holding} hold. Each was computed just now, by Catspaw ${service.version} on this installation, on the path that your own questions take.`),
    kinds(summary.by_kind),
    el("div", { class: "filters" }, el("label", { for: "check-gas" }, "Gas"), gas,
      el("label", { for: "check-text" }, "Words, such as a method or an author"), search,
      el("label", {}, off, " only those that do not hold")),
    status,
    scrolled("Checks", el("table", { class: "checks-table" }, el("thead", {}, el("tr", {},
      ["what", "published", "computed", "unit", "apart, within what is allowed", "where it is printed"].map((title, at) =>
        el("th", { scope: "col", class: at === 1 || at === 2 ? "number" : null }, title)))), body)),
  ];
}

function kinds(byKind) {
  return scrolled("Checks by kind", el("table", {}, el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "kind of evidence"),
    el("th", { scope: "col", class: "number" }, "figures"), el("th", { scope: "col", class: "number" }, "hold"))),
  el("tbody", {}, Object.values(byKind).map((each) => el("tr", {}, el("th", { scope: "row" }, each.meaning),
    el("td", { class: "number" }, String(each.rows)), el("td", { class: "number" }, String(each.holding)))))));
}

function checkRow(each) {
  const methods = [...new Set(Object.values(each.methods))].join(", ");
  return el("tr", {},
    el("th", { scope: "row" }, words(each.result), el("span", { class: "help" }, [each.gas, methods].filter(Boolean).join(", "))),
    el("td", { class: "number" }, number(each.published, DIGITS)),
    el("td", { class: "number" }, each.computed === null ? each.problem || "none" : number(each.computed, DIGITS)),
    el("td", {}, unit(each.unit)),
    el("td", {}, measure(each), el("span", { class: "help" },
      `${each.holds ? "" : "does not hold: "}${number(each.difference, 2)} of ${number(each.tolerance, 2)} allowed`)),
    el("td", {}, each.where, el("span", { class: "help" }, source(each.citation, each.doi)),
      each.note ? el("span", { class: "help" }, each.note) : ""));
}

// A line as long as what is allowed to either side, and a dot where the difference is.
function measure(each) {
  const share = each.tolerance > 0 ? each.difference / each.tolerance : 0;
  const at = 50 + (50 / REACH) * Math.max(-REACH, Math.min(REACH, Number.isFinite(share) ? share : REACH));
  const end = 50 / REACH;
  return svg("svg", { class: "measure", viewBox: "0 0 100 12", "aria-hidden": "true" },
    svg("path", { class: "axis", fill: "none", d: `M${50 - end} 2v8M${50 + end} 2v8M${50 - end} 6H${50 + end}` }),
    svg("circle", { class: each.holds ? "dot" : "dot off", cx: at, cy: 6, r: 3 }));
}
