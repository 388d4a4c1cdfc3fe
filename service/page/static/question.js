// What the question asks for, which inputs it needs as it stands, and how it is sent.

import { state, encode } from "./state.js";

// Written by the page itself, since they say how an answer is written and not what it is.
export const OF_THE_FORM = ["form", "errors", "nocache", "detail", "decimal", "headers", "missing", "ignore", "strict"];
const LONGEST_ADDRESS = 6000; // bytes; beyond it the question goes as the body of a POST

export class Question {
  constructor(description) {
    this.description = description;
    this.quantity = description.quantities[state.quantity];
    this.gas = state.values.get("gas");
  }

  about(name) {
    return this.quantity.own[name] || this.description.names[name];
  }

  value(name) {
    return state.values.get(name) ?? "";
  }

  get inputs() {
    return this.quantity.inputs.map((each) => each.name);
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

  isNeeded(input) {
    if (input.needed === "always") return true;
    if (input.needed === "with_input") return input.with.some((name) => this.value(name) !== "");
    if (input.needed !== "by_method") return false;
    return Object.entries(input.methods).some(([option, methods]) =>
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

  pairs(extra = []) {
    const given = [...state.values].filter(([name, value]) => value.trim() !== "" && !OF_THE_FORM.includes(name));
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
