// Asks the service, with the token where one is needed, and turns what goes wrong into words.

let token = "";
const waiting = [];

export class Problem extends Error {
  constructor(status, document) {
    super(document.detail || document.title || `status ${status}`);
    this.status = status;
    this.document = document;
    this.errors = document.errors || [];
    this.more = document.more || 0;
  }
}

export function hasToken() {
  return token !== "";
}

export async function ask(address, { signal, method = "GET", body, type, accept } = {}) {
  const headers = {};
  if (token) headers.Authorization = `Bearer ${token}`;
  if (type) headers["Content-Type"] = type;
  if (accept) headers.Accept = accept;
  let response;
  try {
    response = await fetch(address, { method, headers, body, signal, credentials: "omit", redirect: "error" });
  } catch (error) {
    if (error.name === "AbortError") throw error;
    throw new Problem(0, { detail: "The service does not answer: it may have been stopped, or the network is down." });
  }
  if (response.status === 401) {
    await response.text(); // so that the connection is free while the person looks for the token
    await tokenGiven();
    return ask(address, { signal, method, body, type, accept });
  }
  if (!response.ok) throw new Problem(response.status, await readable(response));
  return response;
}

export async function askJson(address, options) {
  return (await ask(address, options)).json();
}

async function readable(response) {
  try {
    return await response.json();
  } catch {
    return { detail: `The service answered with status ${response.status}.` };
  }
}

// Resolves when the person has given a token; the page itself needs none.
function tokenGiven() {
  const form = document.getElementById("token");
  const field = document.getElementById("token-text");
  if (token) {
    form.querySelector("label").textContent = "That was not its token; this service asks for its token";
    token = "";
  }
  form.hidden = false;
  if (!form.dataset.wired) {
    form.dataset.wired = "yes";
    form.addEventListener("submit", (event) => {
      event.preventDefault();
      token = field.value.trim();
      field.value = "";
      form.hidden = true;
      for (const go of waiting.splice(0)) go();
    });
  }
  return new Promise((go) => waiting.push(go));
}
