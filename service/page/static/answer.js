// Shows the answer: each result with its unit, the quality flag in words, the calculation in its order, the sources.

import { el } from "./dom.js";
import { askJson } from "./net.js";
import { number, unit, withUnit, words } from "./numbers.js";
import { resultUnit } from "./rows.js";
import { changed, forget, set, state } from "./state.js";
import { drawWater } from "./water.js";

const ROWS_SHOWN = 200;
const DOI = "https://doi.org/";
const SIGNS = { 1: "●", 3: "▲", 4: "■", 9: "○" };

export function answerView(root) {
  const announced = el("p", { class: "unseen", role: "status" });
  const body = el("div");
  root.replaceChildren(announced, body);
  let running = null;
  let lastAsked = "";
  let allDigits = false;

  async function ask(question, showErrors) {
    const [url, options] = question.request([["detail", "steps"]]);
    const asked = url + (options.body || "");
    if (asked === lastAsked) {
      root.removeAttribute("aria-busy");
      return;
    }
    lastAsked = asked;
    running?.abort();
    running = new AbortController();
    const { signal } = running;
    root.setAttribute("aria-busy", "true");
    try {
      const answer = await askJson(url, { ...options, signal });
      if (signal.aborted) return;
      const notes = notesOf(answer, question);
      showErrors(notes);
      show(answer, question);
    } catch (problem) {
      if (problem.name === "AbortError") return;
      lastAsked = "";
      showErrors(problem.errors || []);
      refuse(problem);
    }
    root.removeAttribute("aria-busy");
  }

  function show(answer, question) {
    const digits = allDigits ? 0 : undefined;
    const main = Object.keys(answer.results)[0];
    const headline = answer.samples === 1 ? told(answer.results[main], 0, digits) : `${answer.samples} samples`;
    announced.textContent = `${words(main)}: ${headline}, ${flagWords(question, worst(answer.quality.flags)).split(":")[0]}`;
    brief(`${words(main)} ${headline}`, worst(answer.quality.flags), question);
    const wind = answer.results.wind_speed_10m?.values[0] ?? Number.parseFloat(state.values.get("wind_speed"));
    drawWater(Number.isFinite(wind) ? wind : undefined);
    body.replaceChildren(
      answer.samples === 1 ? oneSample(answer, question, digits) : severalSamples(answer, question, digits),
      quality(answer, question),
      choices(answer, question, digits),
      ...parts(answer, question, digits));
  }

  function choices(answer, question) {
    const digits = el("input", { type: "checkbox", id: "all-digits", checked: allDigits });
    digits.addEventListener("change", () => {
      allDigits = digits.checked;
      show(answer, question);
      document.getElementById("all-digits").focus();
    });
    const every = el("input", { type: "checkbox", id: "every-result", checked: state.values.get("pick") === "all" });
    every.addEventListener("change", () => set("pick", every.checked ? "all" : ""));
    const hasMore = question.quantity.results.some((each) => !each.main);
    return el("p", { class: "switches" },
      el("label", {}, digits, " all digits"),
      hasMore && el("label", {}, every, " every result"));
  }

  function refuse(problem) {
    announced.textContent = `No answer: ${problem.message}`;
    brief("no answer yet", 0);
    const listed = problem.errors.map((each) => el("li", {}, link(each.name), ` ${each.reason}`));
    body.replaceChildren(
      el("p", { class: "refusal" }, problem.errors.length ? "No answer yet:" : problem.message),
      el("ul", { class: "reasons" }, listed),
      leaveOut(problem.errors.filter((each) => each.code === "unused").map((each) => each.name)),
      problem.more ? el("p", { class: "help" }, `and ${problem.more} more`) : "",
      problem.document.type ? el("p", { class: "help" }, el("a", { href: problem.document.type }, "What this kind of refusal means")) : "");
  }

  return { ask };
}

// One press leaves out all that the methods chosen now do not use.
function leaveOut(names) {
  if (!names.length) return "";
  const press = () => {
    for (const name of names) forget(name);
    changed();
  };
  return el("p", {}, el("button", { type: "button", onclick: press }, `Leave out ${names.map(words).join(", ")}`));
}

// A reason that begins with the name of an input is told beside that input, too.
function notesOf(answer, question) {
  const notes = [];
  const known = new Set(question.inputs);
  answer.quality.reasons.forEach((reasons, at) => {
    for (const reason of reasons) {
      const [name, ...rest] = reason.split(" ");
      if (!known.has(name) || notes.some((note) => note.name === name)) continue;
      const sample = answer.samples > 1 ? ` (sample ${at + 1})` : "";
      notes.push({ name, reason: rest.join(" ") + sample, isNote: ![4, 9].includes(answer.quality.flags[at]) });
    }
  });
  return notes;
}

function link(name) {
  const target = document.getElementById(`in-${name}`) || document.getElementById(`side-${name}`);
  if (!target) return el("code", {}, words(name));
  const go = (event) => {
    event.preventDefault();
    document.getElementById("question").open = true;
    const folded = target.closest("details.fold");
    if (folded) folded.open = true;
    target.focus();
  };
  return el("a", { href: `#in-${name}`, onclick: go }, words(name));
}

function brief(text, flag, question) {
  const line = document.getElementById("brief");
  line.hidden = false;
  line.textContent = flag ? `${text}, ${flagWords(question, flag).split(":")[0]}` : text;
}

export function worst(flags) {
  return flags.reduce((most, flag) => Math.max(most, flag), 1);
}

function flagWords(question, flag) {
  return question.description.flags[flag] || "";
}

function told(result, at, digits) {
  return `${withUnit(result.values[at], result.unit, digits)}${result.mass_of ? ` as ${result.mass_of}` : ""}`;
}

function value(result, at, digits) {
  if (result.values[at] === null) return "none";
  if (Array.isArray(result.values[at])) return result.values[at].map((each) => number(each, digits)).join("; ");
  return number(result.values[at], digits);
}

function oneSample(answer, question, digits) {
  const hasDoubt = Object.values(answer.results).some((each) => "u" in each);
  const hasSpread = Object.values(answer.results).some((each) => "spread" in each);
  const rows = Object.entries(answer.results).map(([name, result], at) => {
    const about = question.quantity.results.find((each) => each.name === name);
    const doubt = result.u?.[0] ?? result.u_inputs?.[0];
    return el("tr", { class: at === 0 ? "main" : null },
      el("th", { scope: "row" }, words(name), el("span", { class: "help" }, question.result(name).meaning.replaceAll("`", ""))),
      el("td", { class: "number", "data-result": name, "data-value": String(result.values[0]) }, value(result, 0, digits)),
      hasDoubt && el("td", { class: "number" }, doubt === undefined || doubt === null ? "" : `± ${number(doubt, digits ?? 2)}`,
        result.u?.[0] === null && doubt !== undefined && doubt !== null ? el("span", { class: "help" }, "from the inputs alone") : ""),
      hasSpread && el("td", { class: "number" }, result.spread?.[0] === null || result.spread === undefined ? "" : number(result.spread[0], digits ?? 2)),
      el("td", {}, resultUnit(about, question.description.unit_lists[question.result(name).units]), result.mass_of ? ` as ${result.mass_of}` : ""));
  });
  return scrolled("Results", el("table", { class: "results" },
    el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "result"), el("th", { scope: "col", class: "number" }, "value"),
      hasDoubt && el("th", { scope: "col", class: "number" }, "uncertainty"),
      hasSpread && el("th", { scope: "col", class: "number" }, "spread"), el("th", { scope: "col" }, "unit"))),
    el("tbody", {}, rows)));
}

function severalSamples(answer, question, digits) {
  const results = Object.entries(answer.results);
  const shown = Math.min(answer.samples, ROWS_SHOWN);
  const rows = Array.from({ length: shown }, (_, at) => el("tr", {},
    el("th", { scope: "row", class: "number" }, String(at + 1)),
    el("td", {}, flag(answer.quality.flags[at])),
    results.map(([, result]) => el("td", { class: "number" }, value(result, at, digits), doubtOf(result, at, digits)))));
  return el("div", {}, scrolled("Results by sample", el("table", { class: "results samples" },
    el("thead", {}, el("tr", {}, el("th", { scope: "col", class: "number" }, "sample"), el("th", { scope: "col" }, "flag"),
      results.map(([name, result]) => el("th", { scope: "col", class: "number" }, words(name), el("span", { class: "help" }, unit(result.unit)))))),
    el("tbody", {}, rows))),
  shown < answer.samples ? el("p", { class: "help" }, `${answer.samples - shown} more samples; as CSV they are all there, under Take away.`) : "");
}

function doubtOf(result, at, digits) {
  const doubt = result.u?.[at] ?? result.u_inputs?.[at];
  return doubt === undefined || doubt === null ? "" : el("span", { class: "help" }, ` ± ${number(doubt, digits ?? 2)}`);
}

export function flag(which) {
  return el("span", { class: `flag flag-${which}` }, `${SIGNS[which] || ""} ${which}`);
}

function quality(answer, question) {
  const every = [...new Set(answer.quality.flags)].sort();
  const lines = every.map((each) => el("p", { class: "quality" }, flag(each), ` ${flagWords(question, each)}`));
  const reasons = answer.quality.reasons.flatMap((told_, at) => told_.map((reason) => (answer.samples > 1 ? `sample ${at + 1}: ${reason}` : reason)));
  const shown = reasons.slice(0, 20).map((reason) => el("li", {}, reason));
  if (reasons.length > 20) shown.push(el("li", {}, `and ${reasons.length - 20} more`));
  const doubt = answer.uncertainty?.reason ? el("p", { class: "help" }, `${answer.uncertainty.unpublished.join(", ")}: ${answer.uncertainty.reason}`) : "";
  return el("div", { class: "quality-box" }, lines, shown.length ? el("ul", { class: "reasons" }, shown) : "", doubt);
}

function parts(answer, question, digits) {
  const several = answer.by_parameterisation ? [bySeveral(answer, digits)] : [];
  const calculations = answer.steps
    ? [calculation("The calculation, in its order", answer.steps, digits)]
    : Object.entries(answer.by_parameterisation || {}).filter(([, each]) => each.steps)
      .map(([name, each]) => folded(`The calculation by ${name}`, steps(each.steps, digits)));
  return [...several, ...calculations, assumed(answer), sources(answer)];
}

function bySeveral(answer, digits) {
  const main = Object.keys(answer.results)[0];
  const rows = Object.entries(answer.by_parameterisation).map(([name, each]) => el("tr", {},
    el("th", { scope: "row" }, name), el("td", { class: "number" }, value(each.results[main], 0, digits)),
    el("td", {}, flag(each.quality.flags[0]))));
  return el("section", {}, el("h3", {}, `By method${answer.samples > 1 ? ", first sample" : ""}`),
    scrolled("By method", el("table", {}, el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "method"),
      el("th", { scope: "col", class: "number" }, `${words(main)}, ${unit(answer.results[main].unit)}`), el("th", { scope: "col" }, "flag"))), el("tbody", {}, rows))));
}

function calculation(title, listed, digits) {
  return el("section", {}, el("h3", {}, title), steps(listed, digits));
}

function folded(title, content) {
  return el("details", { class: "fold" }, el("summary", {}, title), content);
}

function steps(listed, digits) {
  const rows = listed.map((step) => {
    const of = step.evaluated_with ? Object.entries(step.evaluated_with).map(([name, at]) => ` with ${words(name)} ${at}`).join(",") : "";
    return el("tr", {}, el("th", { scope: "row" }, words(step.name), of ? el("span", { class: "help" }, of) : ""),
      el("td", { class: "number" }, value(step, 0, digits)), el("td", {}, unit(step.unit)),
      el("td", {}, step.formula, step.source ? el("span", { class: "help" }, source(step.source, step.doi)) : ""));
  });
  return scrolled("Steps of the calculation", el("table", { class: "steps" },
    el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "quantity"), el("th", { scope: "col", class: "number" }, "value"),
      el("th", { scope: "col" }, "unit"), el("th", { scope: "col" }, "from"))), el("tbody", {}, rows)));
}

export function source(text, doi) {
  return doi ? el("a", { href: DOI + doi, rel: "noreferrer" }, `${text}, doi:${doi}`) : text;
}

function assumed(answer) {
  const told_ = Object.entries(answer.assumed || {});
  return el("section", {}, el("h3", {}, "Assumed"), told_.length
    ? el("dl", { class: "names" }, told_.flatMap(([name, each]) => [el("dt", {}, words(name)),
      el("dd", {}, typeof each.value === "number" ? withUnit(each.value, each.unit || "1", 0) : `${each.value}`)]))
    : el("p", { class: "help" }, "Nothing: all was told."));
}

function sources(answer) {
  const rows = Object.entries(answer.methods || {}).flatMap(([what, used]) => used.map((each) => [
    el("dt", {}, words(what)), el("dd", {}, el("code", {}, each.name), " ", each.source ? source(each.source, each.doi) : "")]));
  return el("section", {}, el("h3", {}, "Methods and sources"), rows.length ? el("dl", { class: "names" }, rows.flat()) : el("p", { class: "help" }, "None but definitions."));
}

export function scrolled(label, table) {
  return el("div", { class: "scroll", tabindex: "0", role: "group", "aria-label": label }, table);
}
