// Draws a picture with axes as SVG, and saves it as SVG or PNG with the colours it has on the screen.

import { el, save, svg } from "./dom.js";
import { number } from "./numbers.js";

const MARGIN = { top: 14, right: 16, bottom: 44, left: 62 };
const KEPT = ["fill", "stroke", "stroke-width", "stroke-dasharray", "stroke-linejoin", "opacity", "font-family", "font-size", "font-style", "font-weight"];
const STEPS = [1, 2, 5, 10];
const SECOND = 1000, MINUTE = 60 * SECOND, HOUR = 60 * MINUTE, DAY = 24 * HOUR;
const TIMES = [SECOND, 10 * SECOND, MINUTE, 5 * MINUTE, 15 * MINUTE, HOUR, 3 * HOUR, 6 * HOUR, 12 * HOUR, DAY, 2 * DAY, 5 * DAY, 10 * DAY, 30 * DAY, 91 * DAY, 365 * DAY];

export class Picture {
  // x and y: {from, to, label, isTime}
  constructor({ width, height, x, y, title, description, right = MARGIN.right, bottom = MARGIN.bottom }) {
    this.width = width;
    this.height = height;
    this.x = x;
    this.y = y;
    this.left = MARGIN.left;
    this.right = width - right;
    this.top = MARGIN.top;
    this.bottom = height - bottom;
    this.svg = svg("svg", { viewBox: `0 0 ${width} ${height}`, role: "img", "aria-label": `${title}. ${description}` });
    this.clip = `clip-${Math.random().toString(36).slice(2)}`;
    this.svg.append(svg("defs", {}, svg("clipPath", { id: this.clip },
      svg("rect", { x: this.left, y: this.top, width: this.right - this.left, height: this.bottom - this.top }))));
    this.axes();
    this.inside = svg("g", { "clip-path": `url(#${this.clip})` });
    this.svg.append(this.inside);
  }

  px(value) {
    return this.left + ((value - this.x.from) / (this.x.to - this.x.from)) * (this.right - this.left);
  }

  py(value) {
    return this.bottom - ((value - this.y.from) / (this.y.to - this.y.from)) * (this.bottom - this.top);
  }

  axes() {
    for (const [value, text] of ticks(this.y, (this.bottom - this.top) / 50)) {
      const at = this.py(value);
      this.svg.append(svg("path", { class: "grid", d: `M${this.left} ${at}H${this.right}` }),
        svg("text", { class: "tick", x: this.left - 8, y: at + 4, "text-anchor": "end" }, text));
    }
    for (const [value, text] of ticks(this.x, (this.right - this.left) / (this.x.isTime ? 110 : 70))) {
      const at = this.px(value);
      this.svg.append(svg("path", { class: "axis", d: `M${at} ${this.bottom}v5` }),
        svg("text", { class: "tick", x: at, y: this.bottom + 19, "text-anchor": "middle" }, text));
    }
    this.svg.append(
      svg("path", { class: "axis", d: `M${this.left} ${this.bottom}H${this.right}` }),
      svg("text", { x: this.right, y: this.bottom + 37, "text-anchor": "end" }, this.x.label),
      svg("text", { x: 0, y: 0, transform: `translate(13 ${this.top}) rotate(-90)`, "text-anchor": "end" }, this.y.label));
  }

  // Points are [x, y]; a y that is null breaks the line.
  path(points) {
    let isOpen = false;
    const parts = [];
    for (const [x, y] of points) {
      if (y === null || !Number.isFinite(y)) isOpen = false;
      else {
        parts.push(`${isOpen ? "L" : "M"}${this.px(x).toFixed(1)} ${this.py(y).toFixed(1)}`);
        isOpen = true;
      }
    }
    return parts.join("");
  }

  line(points, name, parent = this.inside) {
    const d = this.path(points);
    if (d) parent.append(svg("path", { class: name, d }));
  }

  // Points are [x, low, high]; gaps part the area.
  area(points, name, parent = this.inside) {
    let run = [];
    const close = () => {
      if (run.length > 1) {
        const there = run.map(([x, , high]) => `${this.px(x).toFixed(1)} ${this.py(high).toFixed(1)}`);
        const back = run.toReversed().map(([x, low]) => `${this.px(x).toFixed(1)} ${this.py(low).toFixed(1)}`);
        parent.append(svg("path", { class: name, d: `M${[...there, ...back].join("L")}Z` }));
      }
      run = [];
    };
    for (const point of points) {
      if (Number.isFinite(point[1]) && Number.isFinite(point[2])) run.push(point);
      else close();
    }
    close();
  }

  mark(x, text) {
    if (!(x >= this.x.from && x <= this.x.to)) return;
    const at = this.px(x);
    const isLate = at > (this.left + this.right) / 2;
    this.svg.append(svg("path", { class: "here", d: `M${at} ${this.top}V${this.bottom}` }),
      svg("text", { class: "here-label", x: at + (isLate ? -5 : 5), y: this.top + 11, "text-anchor": isLate ? "end" : "start" }, text));
  }
}

function ticks({ from, to, isTime }, many) {
  const step = isTime ? timeStep((to - from) / many) : niceStep((to - from) / many);
  const found = [];
  for (let value = Math.ceil(from / step) * step; value <= to + step * 1e-9; value += step) {
    const rounded = Math.abs(value) < step * 1e-9 ? 0 : value;
    found.push([value, isTime ? timeText(value, step) : number(Number(rounded.toPrecision(12)), 6)]);
    if (found.length > 200) break;
  }
  return found;
}

function niceStep(rough) {
  const power = 10 ** Math.floor(Math.log10(rough));
  return power * STEPS.find((step) => step * power >= rough * 0.999);
}

function timeStep(rough) {
  return TIMES.find((step) => step >= rough) || 365 * DAY * Math.ceil(rough / (365 * DAY));
}

function timeText(value, step) {
  const iso = new Date(value).toISOString();
  if (step >= DAY) return iso.slice(0, 10);
  if (step >= MINUTE) return value % DAY === 0 ? iso.slice(5, 10) : iso.slice(11, 16);
  return iso.slice(11, 19);
}

// Room to either side of the values, from zero where they do not cross it and begin near it.
export function extent(values, fromZero = false) {
  let low = Infinity, high = -Infinity;
  for (const value of values) {
    if (value === null || !Number.isFinite(value)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (low > high) return null;
  if (fromZero && low > 0) low = 0;
  const room = (high - low || Math.abs(high) || 1) * 0.06;
  return [low === 0 ? 0 : low - room, high + room];
}

// A picture with its caption and the buttons that keep it; draw(width) returns it, again when the width changes.
export function plate(caption, name, draw) {
  const holder = el("div");
  const figure = el("figure", { class: "plate" }, el("figcaption", {}, caption), holder,
    el("div", { class: "keep" },
      el("button", { type: "button", onclick: () => saveSvg(holder.firstChild, name), "aria-label": `Save ${name} as SVG` }, "Save SVG"),
      el("button", { type: "button", onclick: () => savePng(holder.firstChild, name), "aria-label": `Save ${name} as PNG` }, "Save PNG")));
  let drawn = 0;
  const watcher = new ResizeObserver(() => {
    if (!figure.isConnected && drawn) {
      watcher.disconnect();
      return;
    }
    const width = Math.round(holder.clientWidth);
    if (width < 50 || Math.abs(width - drawn) < 2) return;
    drawn = width;
    holder.replaceChildren(draw(width));
  });
  watcher.observe(holder);
  return figure;
}

// A copy that needs no style sheet: what the screen shows is written onto every element.
function standalone(picture) {
  const copied = picture.cloneNode(true);
  const [width, height] = picture.getAttribute("viewBox").split(" ").slice(2);
  copied.setAttribute("xmlns", "http://www.w3.org/2000/svg");
  copied.setAttribute("width", width);
  copied.setAttribute("height", height);
  const from = picture.querySelectorAll("*"), to = copied.querySelectorAll("*");
  from.forEach((node, at) => {
    const style = getComputedStyle(node);
    for (const name of KEPT) to[at].setAttribute(name, style.getPropertyValue(name));
    to[at].removeAttribute("class");
    to[at].removeAttribute("tabindex");
  });
  copied.prepend(svg("rect", { width, height, fill: getComputedStyle(picture).backgroundColor }));
  return [new XMLSerializer().serializeToString(copied), Number(width), Number(height)];
}

function saveSvg(picture, name) {
  save([standalone(picture)[0]], `${name}.svg`, "image/svg+xml");
}

async function savePng(picture, name) {
  const [text, width, height] = standalone(picture);
  const image = new Image();
  image.src = URL.createObjectURL(new Blob([text], { type: "image/svg+xml" }));
  await image.decode();
  const canvas = el("canvas", { width: width * 2, height: height * 2 });
  canvas.getContext("2d").drawImage(image, 0, 0, width * 2, height * 2);
  URL.revokeObjectURL(image.src);
  canvas.toBlob((blob) => save([blob], `${name}.png`, "image/png"));
}
