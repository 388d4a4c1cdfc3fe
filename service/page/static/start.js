// Begins: reads what the API document says, builds the question, and shows the view that the address names.

import { read, state, whenChanged } from "./state.js";
import { Question } from "./question.js";
import { buildForm, showErrors } from "./form.js";
import { answerView } from "./answer.js";
import { drawWater } from "./water.js";
import { el } from "./dom.js";

const VIEWS = { answer: "Answer", take: "Take away", pictures: "Pictures", file: "File", checks: "Checks" };
const LATER = { take: "./take.js", pictures: "./pictures.js", file: "./file.js", checks: "./checks.js" };
const NEED_ANSWER = { answer: true, take: true, pictures: true }; // beside the others a question may be unfinished
const WIDE = matchMedia("(min-width: 62rem)");
const PAUSE = 150; // ms that typing rests before the service is asked
const views = {};
let description;
let timer = 0;

function viewNamed() {
  const name = location.hash.slice(1);
  return name in VIEWS ? name : "answer";
}

// Each view is loaded when it is first looked at.
async function view(name) {
  if (!(name in views)) {
    views[name] = name === "answer"
      ? answerView(document.getElementById("answer-body"))
      : (await import(LATER[name])).view(document.getElementById(`${name}-body`), description);
  }
  return views[name];
}

async function showView(focus = false) {
  const name = viewNamed();
  for (const each of Object.keys(VIEWS)) {
    const link = document.querySelector(`.views a[href="#${each}"]`);
    document.getElementById(each).hidden = each !== name;
    if (each === name) link.setAttribute("aria-current", "page");
    else link.removeAttribute("aria-current");
  }
  document.body.dataset.view = name;
  document.title = name === "answer" ? "Catspaw: air-water gas exchange" : `Catspaw: ${VIEWS[name].toLowerCase()}`;
  fold();
  if (focus) document.getElementById(name).focus({ preventScroll: WIDE.matches });
  await refresh();
}

// Beside the answer the question is open; where there is no room for both it gives way to the other views.
function fold() {
  document.getElementById("question").open = WIDE.matches || viewNamed() === "answer";
}

async function refresh() {
  const question = new Question(description);
  const shown = viewNamed();
  const answer = await view("answer");
  if (shown in NEED_ANSWER) answer.ask(question, showErrors);
  if (shown !== "answer") (await view(shown)).show(question);
}

async function begin() {
  const files = document.body.dataset.files;
  drawWater();
  try {
    description = await (await fetch(`${files}description.json`)).json();
  } catch {
    const text = "The service does not answer. Load the page again when it does.";
    document.getElementById("form").replaceChildren(el("p", { class: "error" }, text));
    return;
  }
  read(description);
  const form = buildForm(document.getElementById("form"), description);
  whenChanged(() => {
    form.update();
    document.getElementById("answer-body").setAttribute("aria-busy", "true");
    clearTimeout(timer);
    timer = setTimeout(refresh, PAUSE);
  });
  addEventListener("hashchange", () => showView(true));
  addEventListener("popstate", () => {
    const before = state.quantity + JSON.stringify([...state.values]);
    read(description);
    if (before !== state.quantity + JSON.stringify([...state.values])) {
      form.reset();
      showView();
    }
  });
  WIDE.addEventListener("change", fold);
  await showView();
}

begin();
