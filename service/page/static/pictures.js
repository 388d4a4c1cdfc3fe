// Transfer velocity against wind by every method that fits, and solubility and Schmidt number against temperature.

import { el, svg } from "./dom.js";
import { scrolled, source } from "./answer.js";
import { askJson } from "./net.js";
import { number, unit, withUnit, words } from "./numbers.js";
import { extent, Picture, plate } from "./picture.js";
import { state } from "./state.js";

const VELOCITY = "transfer-velocity";
const COURSES = [["solubility", "solubility"], ["schmidt-number", "schmidt_number"]];
const WIND_STEP = 0.25, WIND_TO = 25, TEMPERATURES = 101;

export function view(root, description) {
  const winds = el("section"), temperatures = el("section", { class: "plates" });
  root.replaceChildren(winds, temperatures);
  let running = null;
  return {
    async show(question) {
      running?.abort();
      running = new AbortController();
      const { signal } = running;
      if (!question.gas) {
        winds.replaceChildren(el("p", { class: "help" }, "There is nothing to draw for a quantity without a gas: choose another."));
        temperatures.replaceChildren();
        return;
      }
      await Promise.all([
        shown(winds, () => windPlate(description, question, signal)),
        shown(temperatures, async () => Promise.all(COURSES.map((each) => coursePlate(description, question, each, signal)))),
      ]);
    },
  };
}

async function shown(root, make) {
  try {
    root.replaceChildren(...[await make()].flat());
  } catch (problem) {
    if (problem.name === "AbortError") return;
    const reasons = (problem.errors || []).map((each) => el("li", {}, `${words(each.name)} ${each.reason}`));
    root.replaceChildren(el("p", { class: "refusal" }, "No picture yet:"), el("ul", { class: "reasons" }, reasons.length ? reasons : el("li", {}, problem.message)));
  }
}

// What the question tells that another quantity takes, one sample of it: names in `without` are the axis, and of
// inputs that only some methods need those are left out that none of `methods` needs.
function body(description, quantityName, question, without, methods = []) {
  const quantity = description.quantities[quantityName];
  const isUsed = (name) => Object.entries(quantity.needs[name].methods || description.needed_by[name]).some(([option, needing]) =>
    (option === "parameterisation" ? methods : question.method(option).split(";")).some((each) => needing.includes(each)));
  const taken = {};
  const needs = new Map(Object.entries(quantity.needs).map(([name, each]) => [name, each.needed]));
  for (const [name, value] of question.pairs()) {
    if (!quantity.takes.includes(name) || without.includes(name)) continue;
    if (question.about(name).unit !== undefined && !needs.has(name)) continue; // not needed by any method
    if (needs.get(name) === "by_method" && !isUsed(name)) continue;
    if (["one_of_side", "with_input"].includes(needs.get(name))) continue; // what is known of the gas changes neither k nor Sc
    const about = question.about(name);
    const parts = value.split(";");
    const unitText = parts.at(-1).trim().match(/[A-Za-zµ°%].*$/)?.[0];
    const first = parts[0].trim();
    if (about.unit === undefined) taken[name] = value;
    else if (/[A-Za-zµ°%]/.test(first)) taken[name] = first;
    else if (unitText && parts.length > 1) taken[name] = `${first} ${unitText}`;
    else if (Number.isFinite(Number(first))) taken[name] = Number(first);
  }
  return taken;
}

// Inputs that a quantity's methods do not use are refused: they are left out, one refusal at a time.
async function askedOf(quantity, taken, axis, signal) {
  const sent = { ...taken };
  for (;;) {
    try {
      return await askJson(`/v1/${quantity}`, { method: "POST", body: JSON.stringify(sent), type: "application/json", signal });
    } catch (problem) {
      const unused = (problem.errors || []).filter((each) => each.code === "unused" && each.name in sent && !axis.includes(each.name));
      if (!unused.length || unused.length < problem.errors.length) throw problem;
      for (const each of unused) delete sent[each.name];
    }
  }
}

async function windPlate(description, question, signal) {
  const water = question.value("water") || "ocean";
  const xs = Array.from({ length: WIND_TO / WIND_STEP + 1 }, (_, at) => at * WIND_STEP);
  const leaveOut = ["parameterisation", "wind_speed", "wind_height", "wind_profile", "pick", "unit", "detail", "wind_speed_variance", "weibull_shape", "u_methods", "u_unpublished", "uncertainty_method"];
  const fitting = Object.entries(description.waters).filter(([, waters]) => waters.includes(water)).map(([name]) => name);
  const taken = body(description, VELOCITY, question, leaveOut, fitting);
  const common = { ...taken, water, wind_speed: xs, detail: "brief", u_methods: "1", u_unpublished: 0, pick: ["transfer_velocity", "wind_speed_10m", "friction_velocity_air"] };
  const listed = askJson(`/v1/parameterisations?water=${water}&gas=${question.gas}`, { signal });
  const every = await askedOf(VELOCITY, { ...common, parameterisation: "all" }, ["wind_speed", "water", "parameterisation"], signal);
  const records = new Map((await listed).parameterisations.map((each) => [each.name, each]));
  const outcomes = new Map(Object.entries(every.by_parameterisation || {}));
  if (!every.by_parameterisation) outcomes.set(every.methods?.transfer_velocity?.[0]?.name || "the method", every);
  const told_ = question.value("parameterisation").split(";").filter((name) => name && name !== "all");
  const usual = question.method("parameterisation");
  const chosen = new Set(told_.length ? told_ : fitting.filter((name) => name === usual));
  const own = await userWind(description, question, signal);
  for (const name of chosen) await addChosen(name, { ...common, ...body(description, VELOCITY, question, leaveOut, [name]) }, outcomes, records, signal);
  const methods = [...outcomes].map(([name, outcome]) => method(name, outcome, records.get(name), xs, chosen.has(name), own));
  return [windFigure(methods, water, question, own), windTable(methods, own)];
}

// A method that the person chose is drawn also where it was made for other water.
async function addChosen(name, common, outcomes, records, signal) {
  if (outcomes.has(name)) return;
  try {
    outcomes.set(name, await askedOf(VELOCITY, { ...common, parameterisation: name }, ["wind_speed", "parameterisation"], signal));
    records.set(name, await askJson(`/v1/parameterisations/${name}`, { signal }));
  } catch (problem) {
    if (problem.name === "AbortError") throw problem; // else it lacks an input, which the answer tells
  }
}

async function userWind(description, question, signal) {
  if (!question.value("wind_speed")) return null;
  try {
    const usual = description.names.parameterisation["default-by-gas"].mostly; // any will do: the wind is the same for all
    const taken = body(description, VELOCITY, question, ["water", "parameterisation", "pick", "unit", "detail"], [usual]);
    const answer = await askedOf(VELOCITY, { ...taken, pick: "wind_speed_10m", detail: "brief" }, ["wind_speed"], signal);
    return answer.results.wind_speed_10m.values[0];
  } catch (problem) {
    if (problem.name === "AbortError") throw problem;
    return null;
  }
}

function method(name, outcome, record, xs, isChosen, own) {
  const results = outcome.results;
  const ranges = Object.entries(record?.range || {}).filter(([term]) => term in results);
  const isInside = xs.map((_, at) => ranges.every(([term, range]) => {
    const value = results[term].values[at];
    return value === null || ((range.from ?? -Infinity) <= value && value <= (range.to ?? Infinity));
  }));
  const values = results.transfer_velocity.values;
  const u = record?.uncertainty ? results.transfer_velocity.u || [] : []; // of those that publish none there is none to draw
  return { name, record, xs, values, u, isInside, isChosen, of: results.transfer_velocity.unit, atOwn: own === null ? null : between(xs, values, own) };
}

// For the table beside the picture; the picture itself draws what was computed.
function between(xs, values, x) {
  const at = Math.min(Math.max(Math.floor(x / WIND_STEP), 0), xs.length - 2);
  const share = (x - xs[at]) / WIND_STEP;
  return values[at] === null || values[at + 1] === null || share > 1 ? null : values[at] * (1 - share) + values[at + 1] * share;
}

function windFigure(methods, water, question, own) {
  const of = unit(methods[0]?.of || "cm h-1");
  const caption = [el("strong", {}, `Transfer velocity of ${question.gas} against wind, ${water}`),
    el("span", { class: "help" }, "Solid inside the range its authors give, dotted outside it. Point at a line, or at its row below, for its name, its range and its published uncertainty.")];
  return plate(caption, `transfer-velocity-${question.gas}-${water}`, (width) => {
    const inside = methods.flatMap((each) => each.values.filter((_, at) => each.isInside[at]));
    const [, high] = extent(inside, true) || extent(methods.flatMap((each) => each.values), true) || [0, 1];
    const isNarrow = width < 560;
    const picture = new Picture({
      width, height: Math.max(300, Math.min(640, width * 0.62)), right: isNarrow ? 12 : 190,
      x: { from: 0, to: WIND_TO, label: "wind at 10 m, m s⁻¹" }, y: { from: 0, to: high, label: `transfer velocity, ${of}` },
      title: `Transfer velocity of ${question.gas} against wind by ${methods.length} methods`,
      description: "The table below has every method with its value at your wind and its range.",
    });
    const groups = methods.toSorted((a, b) => a.isChosen - b.isChosen).map((each) => drawMethod(picture, each));
    if (!isNarrow) labels(picture, groups);
    if (own !== null) picture.mark(own, `your wind, ${number(own, 3)} m s⁻¹`);
    return picture.svg;
  });
}

function drawMethod(picture, each) {
  const group = svg("g", { class: each.isChosen ? "method chosen" : "method", "data-method": each.name });
  picture.inside.append(group);
  const points = each.xs.map((x, at) => [x, each.values[at]]);
  const isNear = (at) => each.isInside[at] || each.isInside[at - 1] || each.isInside[at + 1];
  picture.line(points.map(([x, y], at) => [x, each.isInside[at] ? y : null]), "line", group);
  picture.line(points.map(([x, y], at) => [x, each.isInside[at] && !(each.isInside[at - 1] === false || each.isInside[at + 1] === false) ? null : isNear(at) || !each.isInside[at] ? y : null]), "faint", group);
  picture.line(points, "reach", group);
  const name = svg("title", {}, told(each));
  group.prepend(name);
  group.addEventListener("pointerenter", () => point(each, picture, group));
  group.addEventListener("pointerleave", () => unpoint(picture));
  group.point = () => point(each, picture, group);
  return { each, group, points };
}

function told(each) {
  const doubt = each.record?.uncertainty;
  const sure = doubt ? `${doubt.relative ? `${number(doubt.value * 100, 2)} %` : number(doubt.value, 2)}, ${doubt.kind}` : "no published uncertainty";
  return `${each.name}: ${rangeText(each.record)}; ${sure}`;
}

function rangeText(record) {
  const told_ = Object.entries(record?.range || {}).map(([term, range]) => `${term === "wind_speed_10m" ? "" : `${words(term)} `}${number(range.from)} to ${withUnit(range.to, range.unit)}`);
  return told_.length ? told_.join(", ") : "no stated range";
}

function point(each, picture, group) {
  unpoint(picture);
  for (const part of picture.svg.querySelectorAll(`[data-method="${CSS.escape(each.name)}"]`)) part.classList.add("pointed");
  const band = each.xs.map((x, at) => [x, each.values[at] - each.u[at], each.u[at] === null || each.u[at] === undefined ? NaN : each.values[at] + each.u[at]]);
  picture.area(band, "band", group);
  picture.inside.append(group);
}

function unpoint(picture) {
  for (const band of picture.svg.querySelectorAll(".band")) band.remove();
  for (const each of picture.svg.querySelectorAll(".pointed")) each.classList.remove("pointed");
}

// Names at the right edge, pushed apart so that none stands on another, each with a leader to its line.
function labels(picture, groups) {
  const placed = groups.map(({ each, group, points }) => {
    const seen = points.filter(([, y]) => y !== null && y <= picture.y.to);
    const [x, y] = seen.at(-1) || [picture.x.to, 0];
    const at = x < picture.x.to ? picture.top : picture.py(y); // those that leave by the top stand first, from the left
    return { each, group, fromX: picture.px(x), fromY: picture.py(y), at };
  }).sort((a, b) => a.at - b.at || a.fromX - b.fromX);
  const gap = Math.min(15, (picture.bottom - picture.top) / Math.max(placed.length, 1));
  let last = picture.top - gap;
  for (const label of placed) last = label.at = Math.max(label.at, last + gap);
  let next = picture.bottom + gap;
  for (const label of placed.toReversed()) next = label.at = Math.min(label.at, next - gap);
  for (const { each, group, fromX, fromY, at } of placed) {
    const label = svg("g", { class: group.getAttribute("class").replace("method", "name"), "data-method": each.name },
      svg("path", { class: "leader", d: `M${fromX.toFixed(1)} ${fromY.toFixed(1)}L${picture.right + 14} ${at}h6` }),
      svg("text", { class: "label", x: picture.right + 23, y: at + 4 }, each.name));
    label.addEventListener("pointerenter", () => group.point());
    label.addEventListener("pointerleave", () => unpoint(picture));
    picture.svg.append(label);
  }
}

function windTable(methods, own) {
  const rows = methods.map((each) => {
    const show = () => document.querySelector(`.method[data-method="${CSS.escape(each.name)}"]`)?.point?.();
    const button = el("button", { type: "button", onclick: show, onfocus: show, "aria-label": `Show ${each.name} in the picture` }, el("code", {}, each.name));
    return el("tr", { onpointerenter: show }, el("th", { scope: "row" }, button, each.isChosen ? " (yours)" : "",
        each.record?.source ? el("span", { class: "help" }, source(each.record.source.source, each.record.source.doi)) : ""),
      el("td", { class: "number" }, each.atOwn === null ? "" : number(each.atOwn, 4)), el("td", {}, rangeText(each.record)),
      el("td", {}, told(each).split("; ").at(-1)));
  });
  return scrolled("Methods in the picture", el("table", { class: "methods-table" }, el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "method"),
    el("th", { scope: "col", class: "number" }, own === null ? "" : `k at ${number(own, 3)} m s⁻¹`), el("th", { scope: "col" }, "range"),
    el("th", { scope: "col" }, "uncertainty"))), el("tbody", {}, rows)));
}

async function coursePlate(description, question, [quantity, result], signal) {
  const about = description.quantities[quantity].results.find((each) => each.name === result);
  const xs = Array.from({ length: TEMPERATURES }, (_, at) => -2 + at * 0.44);
  const taken = body(description, quantity, question, ["water_temperature", "subskin_temperature", "skin_temperature", "skin_correction", "pick", "unit", "detail"]);
  const sent = { ...taken, water_temperature: xs, pick: result, detail: "full", u_methods: "1" };
  const answer = await askedOf(quantity, sent, ["water_temperature"], signal);
  const { values, u = [] } = answer.results[result];
  const isInside = answer.quality.flags.map((flag) => flag === 1);
  const used = Object.values(answer.methods).flat().map((each) => each.name).join(", ");
  const own = Number.parseFloat(state.values.get("water_temperature"));
  const isCelsius = /^[\d.\s;+-]*$/.test(state.values.get("water_temperature") || "");
  const caption = [el("strong", {}, `${words(result)} of ${question.gas} against temperature`),
    el("span", { class: "help" }, `${used || "by definition"}; at salinity ${state.values.get("salinity") || "of the question"}. Solid inside the published range, dotted outside it.`)];
  return plate(caption, `${quantity}-${question.gas}`, (width) => {
    const [, high] = extent(values, true) || [0, 1];
    const picture = new Picture({
      width, height: Math.max(260, width * 0.62), x: { from: xs[0], to: xs.at(-1), label: "water temperature, °C" },
      y: { from: 0, to: high, label: `${words(result)}${about.unit === "1" ? "" : `, ${unit(answer.results[result].unit)}`}` },
      title: `${words(result)} of ${question.gas} against water temperature`, description: `From ${number(values[0])} at −2 to ${number(values.at(-1))} at 42 °C.`,
    });
    picture.area(xs.map((x, at) => [x, values[at] - u[at], u[at] === null || u[at] === undefined ? NaN : values[at] + u[at]]), "band");
    picture.line(xs.map((x, at) => [x, isInside[at] ? values[at] : null]), "line chosen");
    picture.line(xs.map((x, at) => [x, isInside[at] && isInside[at + 1] !== false && isInside[at - 1] !== false ? null : values[at]]), "faint chosen");
    if (Number.isFinite(own) && isCelsius) picture.mark(own, `your water, ${number(own, 4)} °C`);
    return picture.svg;
  });
}
