// What came of a file: the result in time with flags, uncertainty and running mean, and a summary.

import { chooser, el, svg } from "./dom.js";
import { flag, scrolled } from "./answer.js";
import { moment as momentText, number, unit, withUnit, words } from "./numbers.js";
import { extent, Picture, plate } from "./picture.js";
import { setPage, state } from "./state.js";
import { DAY, isIso, moment, named, runningMean, splitLine } from "./table.js";

const HOUR = DAY / 24;
const WINDOWS = [[HOUR, "1 h"], [6 * HOUR, "6 h"], [DAY, "1 d"], [7 * DAY, "7 d"], [30 * DAY, "30 d"]];
const FLAGS = [3, 4, 9];
const PARTS = 50; // of the span that the running mean takes where no window is chosen

export function outcome(root, { header, lines, delimiter, question, timeHeader, summary }) {
  const names = splitLine(header, delimiter);
  const results = question.quantity.results.map((each) => each.name);
  const at = names.findLastIndex((each) => results.includes(named(each)[0]) && named(each)[0] === firstOf(names, results));
  const doubtAt = names.lastIndexOf(names.findLast((each) => named(each)[0] === `u_${named(names[at])[0]}`));
  const flagAt = names.lastIndexOf("quality_flag");
  const [xAt, kind] = timeColumn(names, lines, delimiter, timeHeader);
  const samples = lines.map((line, row) => {
    const cells = splitLine(line, delimiter);
    const read = (place) => (place >= 0 && cells[place] ? Number(cells[place]) : NaN);
    return { x: xAt < 0 ? row + 1 : moment(cells[xAt] ?? ""), y: read(at), u: read(doubtAt), flag: Number(cells[flagAt]) };
  });
  const [name, of] = named(names[at]);
  root.replaceChildren(picture(samples, name, of, kind), table(samples, name, of, kind, summary, question));
}

function firstOf(names, results) {
  const added = new Set(names.map((each) => named(each)[0]));
  const picked = (state.values.get("pick") || "").split(";")[0];
  return added.has(picked) ? picked : results.find((each) => added.has(each));
}

function timeColumn(names, lines, delimiter, timeHeader) {
  const first = splitLine(lines[0], delimiter);
  const named_ = names.indexOf(timeHeader);
  const at = named_ >= 0 ? named_ : names.findIndex((each, place) => /time|date/i.test(each) && isIso(first[place] ?? ""));
  if (at < 0) return [-1, "row"];
  return [at, isIso(first[at]) ? "time" : "days"];
}

function picture(samples, name, of, kind) {
  const points = samples.filter((each) => each.x !== null && Number.isFinite(each.y)).sort((a, b) => a.x - b.x);
  if (!points.length) return el("p", { class: "refusal" }, "No line has a result to draw; the last column of the answered CSV says why.");
  const span = points.at(-1).x - points[0].x || 1;
  const holder = el("div");
  const draw = () => {
    const window = Number(state.page.get("window")) || span / PARTS;
    const label = { time: "time, UTC", days: "time, d", row: "line of the file" }[kind];
    const caption = [el("strong", {}, `${words(name)} against ${kind === "row" ? "line" : "time"}`),
      el("span", { class: "help" }, "Grey: every sample. Line: the running mean. Band: the mean standard uncertainty of a sample around it, where one was asked for. Below: where samples are flagged.")];
    const smooth = runningMean(points.map((each) => [each.x, each.y]), window);
    const doubted = points.filter((each) => Number.isFinite(each.u));
    const doubt = doubted.length === points.length ? runningMean(points.map((each) => [each.x, each.u]), window) : [];
    holder.replaceChildren(plate(caption, `${name}-in-time`, (width) => plot(width, { samples, points, smooth, doubt, name, of, kind, label })));
  };
  const choices = kind === "row" ? [[11, "11 lines"], [101, "101 lines"], [1001, "1001 lines"]]
    : WINDOWS.map(([length, text]) => [kind === "time" ? length : length / DAY, text]);
  const field = chooser({ id: "window" }, [["", "a fiftieth of the whole"], ...choices.filter(([length]) => length < span).map(([length, text]) => [String(length), text])], state.page.get("window") || "");
  field.addEventListener("change", () => {
    setPage("window", field.value);
    draw();
  });
  draw();
  return el("section", {}, el("p", { class: "filters" }, el("label", { for: "window" }, "Running mean over"), field), holder);
}

function plot(width, { samples, points, smooth, doubt, name, of, kind, label }) {
  const low = points[0].x, high = points.at(-1).x;
  const [from, to] = extent(points.map((each) => each.y));
  const drawn = new Picture({
    width, height: Math.max(320, Math.min(620, width * 0.5)), bottom: 100,
    x: { from: low, to: high > low ? high : low + 1, label, isTime: kind === "time" },
    y: { from, to, label: `${words(name)}${of && of !== "1" ? `, ${unit(of)}` : ""}` },
    title: `${words(name)} of ${points.length} samples`, description: "The table below sums it up.",
  });
  if (from < 0 && to > 0) drawn.inside.append(svg("path", { class: "zero", d: `M${drawn.left} ${drawn.py(0)}H${drawn.right}` }));
  drawn.inside.append(svg("path", { class: "every", d: everySample(drawn, points, width) }));
  const thin = thinner(drawn);
  if (doubt.length) drawn.area(thin(smooth.map(([x, y], at) => [x, y - doubt[at][1], y + doubt[at][1]])), "band");
  drawn.line(thin(smooth), "mean");
  strips(drawn, samples);
  return drawn.svg;
}

// A hundred thousand samples become one stroke per column of the screen, from its least to its greatest.
function everySample(drawn, points, width) {
  if (points.length < 2 * width) return points.map((each) => `M${drawn.px(each.x).toFixed(1)} ${(drawn.py(each.y) - 1.2).toFixed(1)}v2.4`).join("");
  const columns = new Map();
  for (const { x, y } of points) {
    const column = Math.round(drawn.px(x));
    const range = columns.get(column);
    if (!range) columns.set(column, [y, y]);
    else {
      if (y < range[0]) range[0] = y;
      if (y > range[1]) range[1] = y;
    }
  }
  return [...columns].map(([column, [least, most]]) => `M${column} ${drawn.py(least).toFixed(1)}V${(drawn.py(most) - 0.5).toFixed(1)}`).join("");
}

// Keeps one point for every half column of the screen.
function thinner(drawn) {
  return (points) => {
    let last = -Infinity;
    return points.filter(([x]) => {
      const column = drawn.px(x);
      if (column - last < 0.5) return false;
      last = column;
      return true;
    });
  };
}

function strips(drawn, samples) {
  FLAGS.forEach((which, place) => {
    const top = drawn.bottom + 46 + place * 16;
    const columns = new Set(samples.filter((each) => each.flag === which && each.x !== null).map((each) => Math.round(drawn.px(each.x))));
    drawn.svg.append(
      svg("text", { class: "tick", x: drawn.left - 8, y: top + 10, "text-anchor": "end" }, `flag ${which}`),
      svg("path", { class: "grid", d: `M${drawn.left} ${top + 6}H${drawn.right}` }),
      svg("path", { class: `strip-${which}`, d: [...columns].map((column) => `M${column - 0.6} ${top}h1.2v12h-1.2z`).join("") }));
  });
}

function table(samples, name, of, kind, summary, question) {
  const values = samples.filter((each) => Number.isFinite(each.y));
  const row = (text, value, more = "") => el("tr", {}, el("th", { scope: "row" }, text), el("td", { class: "number" }, value), el("td", {}, more));
  const flags = [1, ...FLAGS].map((which) => row(el("span", {}, flag(which), ` ${question.description.flags[which]}`), samples.filter((each) => each.flag === which).length.toLocaleString("en"), "lines"));
  let sum = 0, least = Infinity, most = -Infinity;
  for (const { y } of values) {
    sum += y;
    least = Math.min(least, y);
    most = Math.max(most, y);
  }
  const times = samples.map((each) => each.x).filter((x) => x !== null);
  const span = kind === "time" && times.length ? [row("from", momentText(times[0])), row("to", momentText(times.at(-1)))] : [];
  return el("section", {}, el("h3", {}, "Summary"), scrolled("Summary of the file", el("table", { id: "summary" }, el("thead", {}, el("tr", {},
    el("th", { scope: "col" }, "what"), el("th", { scope: "col", class: "number" }, "value"), el("th", { scope: "col" }, "unit"))), el("tbody", {},
    row("lines", samples.length.toLocaleString("en")), flags, span,
    values.length ? [row(`${words(name)}, mean of the lines with a result`, number(sum / values.length), unit(of)), row("least", number(least), unit(of)), row("greatest", number(most), unit(of))] : [],
    overTime(summary, name, row)))));
}

function overTime(summary, name, row) {
  if (!summary) return [];
  if (summary.problem) return [row("mean over time", "none", summary.problem)];
  const told = summary.results[name];
  const doubt = (each) => (each.u !== undefined && each.u !== null ? ` ± ${number(each.u, 2)}` : "");
  return [
    row(`${words(name)}, mean over time`, number(told.mean.value) + doubt(told.mean), unit(told.mean.unit)),
    told.integral && row("integral over time", number(told.integral.value) + doubt(told.integral), unit(told.integral.unit)),
    told.amount && row("amount through the area", number(told.amount.value) + doubt(told.amount), unit(told.amount.unit)),
    told.mass && row(`mass through the area, as ${told.mass.mass_of}`, number(told.mass.value) + doubt(told.mass), unit(told.mass.unit)),
    row("time covered", number(summary.covered.value), unit(summary.covered.unit)),
    row("longest gap", withUnit(summary.longest_gap.value, summary.longest_gap.unit)),
  ].filter(Boolean);
}
