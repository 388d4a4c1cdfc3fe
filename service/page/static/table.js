// Reads a CSV file of samples: its delimiter, its header, its lines, and the times in a column.

const DELIMITERS = ["\t", ";", ","];
const DAY = 86400000; // ms

export async function readTable(file) {
  const text = (await file.text()).replace(/^\uFEFF/, "");
  const lines = joinedLines(text).filter((line) => line.trim() !== "");
  if (lines.length < 2) throw new Error("There is no line of samples under a header in this file.");
  const delimiter = DELIMITERS.reduce((best, each) => (many(lines[0], each) > many(lines[0], best) ? each : best), ",");
  return { name: file.name, delimiter, header: splitLine(lines[0], delimiter), first: lines[0], lines: lines.slice(1) };
}

function many(line, delimiter) {
  return splitLine(line, delimiter).length;
}

// A quoted cell may hold line ends; such lines are put together again.
function joinedLines(text) {
  const lines = text.split(/\r\n|\n|\r/);
  if (!text.includes('"')) return lines;
  const whole = [];
  let open = "";
  for (const line of lines) {
    const held = open ? `${open}\n${line}` : line;
    if ((held.split('"').length - 1) % 2) open = held;
    else {
      whole.push(held);
      open = "";
    }
  }
  return open ? [...whole, open] : whole;
}

export function splitLine(line, delimiter) {
  if (!line.includes('"')) return line.split(delimiter);
  const cells = [];
  let held = "", isQuoted = false;
  for (let at = 0; at < line.length; at += 1) {
    const sign = line[at];
    if (isQuoted && sign === '"' && line[at + 1] === '"') {
      held += '"';
      at += 1;
    } else if (sign === '"') isQuoted = !isQuoted;
    else if (sign === delimiter && !isQuoted) {
      cells.push(held);
      held = "";
    } else held += sign;
  }
  return [...cells, held];
}

// The name of a column and the unit in its brackets.
export function named(header) {
  const found = header.trim().match(/^(.*?)\s*\[(.*)\]$/);
  return found ? [found[1], found[2]] : [header.trim(), ""];
}

// Milliseconds for ISO 8601, days as they are; null for what is neither.
export function moment(text) {
  const trimmed = text.trim();
  if (/^[+-]?[\d.]+(?:[eE][+-]?\d+)?$/.test(trimmed)) return Number(trimmed);
  if (!/^\d{4}-\d\d/.test(trimmed)) return null;
  const iso = trimmed.replace(" ", "T");
  const hasZone = /(?:Z|[+-]\d\d:?\d\d)$/i.test(iso.slice(10));
  const found = Date.parse(iso.length > 10 && !hasZone ? `${iso}Z` : iso);
  return Number.isNaN(found) ? null : found;
}

export function isIso(text) {
  return /^\s*\d{4}-\d\d/.test(text);
}

// The mean of what stands within half a window to either side; points are [x, y] in order, without gaps in y.
export function runningMean(points, window) {
  const means = [];
  let from = 0, to = 0, sum = 0, rest = 0;
  const add = (value) => { // keeps what rounding loses, over a hundred thousand sums
    const wanted = value - rest, next = sum + wanted;
    rest = next - sum - wanted;
    sum = next;
  };
  for (const [x] of points) {
    while (to < points.length && points[to][0] <= x + window / 2) add(points[to++][1]);
    while (points[from][0] < x - window / 2) add(-points[from++][1]);
    means.push([x, sum / (to - from)]);
  }
  return means;
}

export { DAY };
