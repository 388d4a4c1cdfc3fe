// The question and what is shown of it, kept in the address so that a link tells the same.

const OF_PAGE = ["quantity", "check_gas", "check_text", "window", "time"]; // names that are the page's own

export const state = { quantity: "", values: new Map(), page: new Map(), isExample: false };
const listeners = [];
const remembered = new Map(); // what was told for other quantities, for when the person comes back to them
let timer = 0;

export function read(description) {
  const query = new URLSearchParams(location.search);
  const asked = query.get("quantity");
  state.quantity = asked && asked in description.quantities ? asked : firstQuantity(description);
  const quantity = description.quantities[state.quantity];
  state.values = new Map();
  state.page = new Map();
  for (const [name, value] of query) {
    if (OF_PAGE.includes(name)) state.page.set(name, value);
    else if (takes(quantity, name)) state.values.set(name, value);
  }
  state.isExample = state.values.size === 0;
  if (state.isExample) state.values = example(quantity);
}

// The flux, where there is one, is what most people come for.
function firstQuantity(description) {
  return "flux" in description.quantities ? "flux" : Object.keys(description.quantities)[0];
}

export function takes(quantity, name) {
  return quantity.takes.includes(name)
    || (name.startsWith("u_") && quantity.takes.includes(name.slice(2)) && !quantity.certain.includes(name.slice(2)))
    || (name.startsWith("unit.") && quantity.results.some((each) => each.name === name.slice(5)));
}

export function example(quantity) {
  return new Map(new URLSearchParams(quantity.example.split("?")[1] || ""));
}

// Another quantity begins with its own example, in which what was already told takes its place.
export function changeQuantity(description, name) {
  const quantity = description.quantities[name];
  for (const [key, value] of state.values) remembered.set(key, value);
  state.quantity = name;
  if (state.isExample) {
    state.values = example(quantity);
  } else {
    const kept = new Set([...example(quantity).keys(), ...neededSides(quantity).flatMap((side) => side.members)]);
    const wanted = (key) => takes(quantity, key) && (kept.has(key) || ["gas", "water", "parameterisation"].includes(key));
    state.values = new Map([...remembered].filter(([key]) => wanted(key)));
  }
  changed();
}

export function forget(name) {
  state.values.delete(name);
  remembered.delete(name);
}

function neededSides(quantity) {
  const gas = remembered.get("gas");
  return quantity.sides.filter((side) => side.needed_for_gases.includes(gas) || side.needed_for_results.length);
}

export function set(name, value) {
  if (value === "" || value === null || value === undefined) forget(name);
  else state.values.set(name, value);
  if (name !== "gas") state.isExample = false;
  changed();
}

export function setPage(name, value) {
  if (value) state.page.set(name, value);
  else state.page.delete(name);
  write();
}

export function changed() {
  write();
  for (const listener of listeners) listener();
}

export function whenChanged(listener) {
  listeners.push(listener);
}

// Browsers refuse an address that changes with every key, so that it follows when typing rests.
function write() {
  clearTimeout(timer);
  timer = setTimeout(() => history.replaceState(null, "", address()), 200);
}

export function address() {
  const query = new URLSearchParams([["quantity", state.quantity], ...state.values, ...state.page]);
  query.delete("quantity");
  const text = encode([["quantity", state.quantity], ...query]);
  return `${location.pathname}?${text}${location.hash}`;
}

export function encode(pairs) {
  const part = (text) => encodeURIComponent(text).replaceAll("%3B", ";").replaceAll("%40", "@").replaceAll("'", "%27");
  return pairs.map(([name, value]) => `${part(name)}=${part(value)}`).join("&");
}
