// The same question ready to be pasted: address, shell, Python, R, spreadsheet, macro, CSV, and its bibliography.

import { copy, el, save } from "./dom.js";
import { ask, askJson, hasToken } from "./net.js";
import { address, state } from "./state.js";

const PIECE = 200; // characters; a text within a formula may have at most 255 in some offices
const CELL_ADDRESS = 2048; // characters that a spreadsheet's WEBSERVICE takes

export function view(root) {
  let running = null;
  const used = el("div");
  return {
    async show(question) {
      running?.abort();
      running = new AbortController();
      const focused = root.contains(document.activeElement) ? document.activeElement.dataset.of : "";
      root.replaceChildren(...snippets(question).map(block), used);
      if (focused) root.querySelector(`[data-of="${focused}"]`)?.focus();
      try {
        await bibliography(question, used, running.signal);
      } catch (problem) {
        if (problem.name !== "AbortError") used.replaceChildren(el("p", { class: "help" }, "The bibliography is told once the question has an answer."));
      }
    },
  };
}

function block({ title, about, text, name, type }) {
  const key = title.toLowerCase().replaceAll(/\W+/g, "-");
  const button = el("button", { type: "button", "data-of": key, "aria-label": `Copy: ${title}`, onclick: () => copy(text, button) }, "Copy");
  const keep = name && el("button", { type: "button", "aria-label": `Save: ${title}`, onclick: () => save([text], name, type) }, "Save");
  return el("div", { class: "block" },
    el("h3", {}, title, el("span", {}, button, keep ? " " : "", keep)),
    about && el("p", { class: "help" }, about),
    el("pre", { tabindex: "0", role: "group", "aria-label": title, "data-snippet": key }, el("code", {}, text)));
}

export function snippets(question) {
  const whole = location.origin + question.url();
  const bare = location.origin + question.url([...first(question), ["form", "number"]]);
  const cell = location.origin + question.url([...first(question), ["form", "number"], ["errors", "text"]]);
  const long = cell.length > CELL_ADDRESS
    ? `This address has ${cell.length} characters; an office that takes at most ${CELL_ADDRESS} needs the macro, or CSV.` : "";
  return [
    { title: "Link to this page", text: location.origin + address(), about: "Shows what you see now, to whoever can reach this service." },
    { title: "Address", text: whole, about: "The whole answer, as JSON." },
    { title: "curl", text: curl(whole) },
    { title: "Python", text: python(question), about: "With the standard library alone." },
    { title: "R", text: r(bare), about: "With base R; the bare number, or one per sample." },
    { title: "Spreadsheet cell", text: formula(bare, ","), about: long || "Where a comma parts the arguments of a function." },
    { title: "Spreadsheet cell, decimal-comma office", text: formula(bare, ";"), about: long || "Where the decimal sign is a comma, and semicolons part the arguments." },
    { title: "Spreadsheet cell that shows what is wrong", text: `=WEBSERVICE(${quoted(cell)})`, about: "The number as text, or one line that begins with ERROR." },
    { title: "Macro line", text: macro(bare), about: "Basic for Excel on Windows; Val reads the point in every office." },
    { title: "CSV for several samples", text: table(question), name: "samples.csv", type: "text/csv", about: "Write one line per sample; columns of your own pass through." },
    { title: "curl, the CSV", text: `curl --data-binary @samples.csv ${shell(location.origin + tableAddress(question))}${header()} > answered.csv` },
  ];
}

// The result that is wanted: the first of those picked, else the main one.
function first(question) {
  const picked = state.values.get("pick");
  return picked && picked !== "all" ? [] : [["pick", question.quantity.results[0].name]];
}

function header() {
  return hasToken() ? ` -H "Authorization: Bearer $CATSPAW_TOKEN"` : "";
}

function shell(text) {
  return `'${text.replaceAll("'", "'\\''")}'`;
}

function curl(target) {
  return `curl ${shell(target)}${header()}`;
}

function python(question) {
  const text = (value) => JSON.stringify(value).replaceAll("\u2028", "\\u2028");
  const pairs = question.pairs().map(([name, value]) => `    ${text(name)}: ${text(value)},`).join("\n");
  const target = `${text(location.origin + question.quantity.address)} + "?" + urllib.parse.urlencode(question)`;
  const asked = hasToken()
    ? `urllib.request.Request(${target}, headers={"Authorization": "Bearer " + os.environ["CATSPAW_TOKEN"]})` : target;
  const result = picked(question);
  return [
    hasToken() ? "import json\nimport os\nimport urllib.parse\nimport urllib.request" : "import json\nimport urllib.parse\nimport urllib.request",
    "",
    `question = {\n${pairs}\n}`,
    `with urllib.request.urlopen(${asked}) as response:`,
    "    answer = json.load(response)",
    `print(answer["results"][${text(result)}]["values"], answer["quality"]["flags"])`,
  ].join("\n");
}

function picked(question) {
  const name = (state.values.get("pick") || "").split(";")[0];
  return name && name !== "all" ? name : question.quantity.results[0].name;
}

function r(target) {
  const open = hasToken() ? `url(address, headers = c(Authorization = paste("Bearer", Sys.getenv("CATSPAW_TOKEN"))))` : "address";
  return `address <- ${JSON.stringify(target)}\nvalue <- as.numeric(readLines(${open}, warn = FALSE))\nprint(value, digits = 17)`;
}

function quoted(text, piece = PIECE, join = "&") {
  const pieces = text.match(new RegExp(`.{1,${piece}}`, "gs")) || [""];
  return pieces.map((each) => `"${each.replaceAll('"', '""')}"`).join(join);
}

function formula(target, parting) {
  return `=NUMBERVALUE(WEBSERVICE(${quoted(target)})${parting}".")`;
}

function macro(target) {
  const lines = quoted(target, 700, " & _\n  ");
  return `With CreateObject("MSXML2.ServerXMLHTTP.6.0"): .Open "GET", ${lines}, False: .send: ActiveCell.Value = Val(.responseText): End With`;
}

// Columns for what may differ between samples, in the units of the question; the rest stays in the address.
function columns(question) {
  const inputs = new Set(question.inputs);
  return question.pairs().filter(([name]) => inputs.has(name) && question.about(name).holds !== "request" && question.about(name).holds !== "course");
}

function tableAddress(question) {
  const inTable = new Set(columns(question).map(([name]) => name));
  const pairs = question.pairs().filter(([name]) => !inTable.has(name));
  const query = new URLSearchParams(pairs).toString().replaceAll("+", "%20");
  return question.quantity.address + (query ? `?${query}` : "");
}

function table(question) {
  const parted = columns(question).map(([name, value]) => {
    const cells = value.split(";").map((each) => each.trim());
    const last = cells.at(-1).match(/^([+-]?[\d.,]+(?:[eE][+-]?\d+)?)\s*(.*)$/);
    const unit = last && last[2] ? last[2] : question.about(name).unit;
    if (last) cells[cells.length - 1] = last[1];
    return { header: unit === "1" || question.about(name).holds === "series" ? name : `${name} [${unit}]`, cells };
  });
  const long = Math.max(1, ...parted.map((each) => each.cells.length));
  const lines = Array.from({ length: long }, (_, at) => parted.map((each) => each.cells[Math.min(at, each.cells.length - 1)]).join(","));
  return `${[parted.map((each) => each.header).join(","), ...lines].join("\n")}\n`;
}

// Of the whole bibliography the entries of the methods that the answer used, and of those its steps quote.
async function bibliography(question, root, signal) {
  const [url, options] = question.request([["detail", "steps"]]);
  const answer = await askJson(url, { ...options, signal });
  const { sources } = await askJson("/v1/sources", { signal });
  const entries = (await (await ask("/v1/sources?form=bibtex", { signal })).text()).split(/\n(?=@)/);
  const outcomes = [answer, ...Object.values(answer.by_parameterisation || {})];
  const quoted_ = [...Object.values(answer.methods || {}).flat(), ...outcomes.flatMap((each) => each.steps || [])];
  const used = new Set(quoted_.filter((each) => each.source).map((each) => each.source));
  const keys = sources.filter((each) => used.has(each.citation)).map((each) => each.key);
  const text = `${keys.flatMap((key) => entries.filter((entry) => entry.startsWith("@") && entry.split(/[{,]/)[1] === key)).map((each) => each.trim()).join("\n\n")}\n`;
  if (signal.aborted) return;
  root.replaceChildren(block({
    title: "Bibliography", text: keys.length ? text : "", name: "methods.bib", type: "application/x-bibtex",
    about: keys.length ? `BibTeX of the ${keys.length} sources this answer used.` : "This answer rests on definitions alone.",
  }));
}
