// Draws the wind on the water: calm lines, ruffled in a patch that grows with the wind of the question.

import { svg } from "./dom.js";

const HIGH = 74, LINES = 11, STEP = 3;
const PATCHES = [[0.2, 0.55, 0.13], [0.46, 0.3, 0.1], [0.72, 0.7, 0.16], [0.93, 0.4, 0.09]]; // across, down, size

let latest = 5; // m s-1

export function drawWater(wind = latest) {
  latest = wind;
  const water = document.getElementById("water");
  const wide = Math.max(water.clientWidth, 320);
  const strength = Math.min(Math.max(wind, 0), 25) / 25;
  water.setAttribute("viewBox", `0 0 ${wide} ${HIGH}`);
  const lines = [];
  for (let line = 0; line < LINES; line += 1) {
    const near = (line + 1) / LINES; // farther lines lie closer together
    lines.push(svg("path", { d: surface(wide, 3 + (HIGH - 6) * near ** 1.5, near, strength), class: "surface" }));
  }
  water.replaceChildren(...lines);
}

function surface(wide, level, near, strength) {
  const high = strength ** 0.8 * 15 * near; // of the ripples
  const long = 9 + 15 * near; // from crest to crest
  const points = [];
  for (let across = 0; across <= wide + STEP; across += STEP) {
    const ruffled = ruffle(across / wide, level / HIGH, strength);
    const phase = (across / long) * 2 * Math.PI + level * 1.7;
    points.push(`${across} ${(level - high * ruffled * Math.abs(Math.sin(phase / 2))).toFixed(2)}`);
  }
  return `M${points.join("L")}`;
}

function ruffle(across, down, strength) {
  let most = strength > 0 ? 0.06 : 0;
  for (const [x, y, size] of PATCHES) {
    const wide = size * (0.5 + strength);
    most = Math.max(most, Math.exp(-(((across - x) / wide) ** 2) - ((down - y) / (wide * 2.6)) ** 2));
  }
  return most;
}

addEventListener("resize", () => drawWater());
