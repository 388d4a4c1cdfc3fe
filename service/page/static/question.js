// What the question asks for, which inputs it needs as it stands, and how it is sent.

import { state, encode } from "./state.js";

// Written by the page itself, since they say how an answer is written and not what it is.
export const OF_THE_FORM = ["form", "errors", "nocache", "detail", "headers", "missing", "ignore", "strict"];
const DECIMAL_COMMA = /(\d),(?=\d)/g;
const LONGEST_ADDRESS = 6000; // bytes; beyond it the question goes as the body of a POST

export class Question {
  constructor(description) {
    this.description = description;
    this.quantity = description.quantities[state.quantity];
    this.gas = state.values.get("gas");
  }

  get uncertain() {
    return this.inputs.filter((name) => !this.quantity.certain.includes(name));
  }

  // By which methods of which options an input is needed.
  methodsOf(name) {
    return this.quantity.needs[name]?.methods || this.description.needed_by[name] || {};
  }

  needed(name) {
    return this.quantity.needs[name]?.needed || "never";
  }

  broughtBy(name) {
    return this.quantity.needs[name]?.with || [];
  }

  about(name) {
    return this.quantity.own[name] || this.description.names[name];
  }

  result(name) {
    return this.description.results[name];
  }

  value(name) {
    return state.values.get(name) ?? "";
  }

  get inputs() {
    return this.quantity.takes.filter((name) => this.about(name).unit !== undefined);
  }

  get options() {
    const inputs = new Set(this.inputs);
    return this.quantity.takes.filter((name) => !inputs.has(name) && !OF_THE_FORM.includes(name));
  }

  // The method that an option has now: the one chosen, or the default of the gas.
  method(option) {
    const about = this.about(option);
    return this.value(option) || this.assumedMethod(about) || "";
  }

  // The default of an option for the gas of the question.
  assumedMethod(about) {
    const byGas = about?.["default-by-gas"];
    return (byGas && (this.gas in byGas ? byGas[this.gas] : byGas.mostly)) ?? about?.default ?? "";
  }

  isNeeded(name) {
    const needed = this.needed(name);
    if (needed === "always") return true;
    if (needed === "with_input") return this.broughtBy(name).some((other) => this.value(other) !== "");
    if (needed !== "by_method") return false;
    return Object.entries(this.methodsOf(name)).some(([option, methods]) =>
      this.method(option).split(";").some((method) => methods.includes(method)));
  }

  side(name) {
    return this.quantity.sides.find((side) => side.members.includes(name));
  }

  // The member by which a side is told: the one that has a value.
  told(side) {
    return side.members.find((name) => this.value(name) !== "") || "";
  }

  assumedOf(side) {
    const water = this.value("water");
    const assumed = Object.entries(side.default_by_gas[this.gas] || {});
    return assumed.filter(([name]) => !(this.about(name)["no-default-for-water"] || []).includes(water));
  }

  isSideNeeded(side) {
    if (side.needed_for_gases.includes(this.gas) || side.needed_for_results.length > 0) return true;
    return Object.keys(side.default_by_gas).length > 0;
  }

  membersOf(side) {
    const only = side.gases_by_member || {};
    return side.members.filter((name) => !only[name] || only[name].includes(this.gas));
  }

  // An input that belongs to one that is shown and has a default is shown beside it.
  goesWith(name, shown) {
    const about = this.about(name);
    return about.default !== undefined && (about["used-with"] || []).some((other) => shown.has(other));
  }

  // Decimal commas are for the fields of the page alone: what is sent has points, and so has what comes back.
  withPoint(name, value) {
    const isNumber = this.about(name.replace(/^u_/, ""))?.unit !== undefined;
    return isNumber && state.values.get("decimal") === "comma" ? value.replace(DECIMAL_COMMA, "$1.") : value;
  }

  pairs(extra = []) {
    const given = [...state.values].filter(([name, value]) => value.trim() !== "" && name !== "decimal" && !OF_THE_FORM.includes(name))
      .map(([name, value]) => [name, this.withPoint(name, value)]);
    const named = new Set(extra.map(([name]) => name));
    return [...given.filter(([name]) => !named.has(name)), ...extra];
  }

  url(extra = []) {
    const query = encode(this.pairs(extra));
    return query ? `${this.quantity.address}?${query}` : this.quantity.address;
  }

  // What fetch is told: an address alone, or with a body where that would be too long.
  request(extra = []) {
    const url = this.url(extra);
    if (url.length <= LONGEST_ADDRESS) return [url, {}];
    const type = "application/x-www-form-urlencoded";
    return [this.quantity.address, { method: "POST", body: encode(this.pairs(extra)), type, accept: "application/json" }];
  }
}
