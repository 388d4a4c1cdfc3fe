// Runs the examples of the reference against this server and shows what comes back.

import { ask } from "./net.js";
import { el } from "./dom.js";
import { drawWater } from "./water.js";

const LONGEST = 20000; // characters of an answer that are shown

drawWater(6);
for (const figure of document.querySelectorAll(".example")) {
  const button = figure.querySelector(".run");
  button.hidden = false;
  button.addEventListener("click", () => run(figure, button));
}
addEventListener("beforeprint", () => {
  for (const each of document.querySelectorAll("details")) each.open = true;
});

async function run(figure, button) {
  const { method, url, kind } = figure.dataset;
  const sent = figure.querySelector(".sent")?.textContent;
  const output = figure.querySelector(".answered")
    || figure.appendChild(el("pre", { class: "answered", tabindex: "0", role: "group", "aria-label": `Answer to ${button.getAttribute("aria-label")}` }));
  button.disabled = true;
  try {
    const response = await ask(url, { method, body: method === "POST" ? sent : undefined, type: kind || undefined });
    output.textContent = pretty(await response.text(), response.headers.get("Content-Type") || "");
  } catch (problem) {
    output.textContent = problem.document ? JSON.stringify(problem.document, null, 1) : problem.message;
  }
  button.disabled = false;
  button.focus();
}

function pretty(text, kind) {
  const shown = kind.includes("json") ? JSON.stringify(JSON.parse(text), null, 1) : text;
  return shown.length > LONGEST ? `${shown.slice(0, LONGEST)}\n… ${shown.length - LONGEST} more characters` : shown;
}
