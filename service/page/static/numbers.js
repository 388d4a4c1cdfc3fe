// Writes numbers and units as a printed table would.

const RAISED = { "-": "⁻", 0: "⁰", 1: "¹", 2: "²", 3: "³", 4: "⁴", 5: "⁵", 6: "⁶", 7: "⁷", 8: "⁸", 9: "⁹" };
const MICRO = /\bu(?=(?:mol|atm|bar|g|M|L)\b)/g;
const DIGITS = 5;
const MANY_DIGITS = /(?<=^−?)\d{5,}/; // before the point
const SMALL = 1e-3; // below which a number is written with a power of ten

const raised = (text) => [...text].map((sign) => RAISED[sign] || sign).join("");

export function number(value, digits = DIGITS) {
  if (value === null || value === undefined || !Number.isFinite(value)) return "none";
  const [mantissa, exponent] = shortened(value, digits).split("e");
  const text = mantissa.replace("-", "−").replace(MANY_DIGITS, (whole) => whole.replace(/\B(?=(\d{3})+$)/g, "\u202f"));
  return exponent ? `${text} × 10${raised(String(Number(exponent)))}` : text;
}

// Digits that are cut are cut at the same place in every row, zeros too; a number that is short stays as it is.
function shortened(value, digits) {
  const rounded = digits ? Number(value.toPrecision(digits)) : value;
  if (value !== 0 && Math.abs(value) < SMALL) return rounded.toExponential();
  const text = String(rounded);
  if (rounded === value || text.includes("e")) return text;
  const fixed = value.toPrecision(digits);
  return fixed.includes("e") ? text : fixed;
}

export function unit(text) {
  if (text === "1") return "1";
  return text
    .replace(MICRO, "µ")
    .replace(/\bdegC\b/g, "°C")
    .replace(/\bdegF\b/g, "°F")
    .replace(/\bdegree\b/g, "°")
    .replace(/([A-Za-z])(-?\d+)(?=\s|$)/g, (_, letter, power) => letter + raised(power))
    .replaceAll(" ", "\u00a0"); // a unit is not parted at the end of a line
}

export function words(name) {
  return name.replaceAll("_", " ").replace(/\bu (?=\w)/, "u of ");
}

export function withUnit(value, of, digits = DIGITS) {
  return of === "1" ? number(value, digits) : `${number(value, digits)} ${unit(of)}`;
}

// A text that brings its own unit, as "15 kn"; words for a missing value do not count.
export function bringsUnit(text) {
  const bare = text.replace(/\b(?:na|nan|null)\b/gi, "").replace(/\d[eE][+-]?\d/g, "");
  return /[A-Za-zµ°%@]/.test(bare);
}

export function moment(milliseconds) {
  return `${new Date(milliseconds).toISOString().slice(0, 19).replace("T", " ")} UTC`;
}
