// Makes elements, and brings texts to the clipboard or into a file.

const SVG = "http://www.w3.org/2000/svg";

export function el(tag, attributes = {}, ...children) {
  return filled(document.createElement(tag), attributes, children);
}

export function svg(tag, attributes = {}, ...children) {
  return filled(document.createElementNS(SVG, tag), attributes, children);
}

function filled(node, attributes, children) {
  for (const [name, value] of Object.entries(attributes)) {
    if (value === undefined || value === null || value === false) continue;
    if (name.startsWith("on")) node.addEventListener(name.slice(2), value);
    else node.setAttribute(name, value === true ? "" : value);
  }
  node.append(...children.flat().filter((child) => child !== null && child !== undefined && child !== false));
  return node;
}

export function chooser(attributes, choices, chosen) {
  // choices: [value, text], or {label, choices} for a group
  const option = ([value, text]) => el("option", { value, selected: value === chosen }, text);
  const parts = choices.map((each) =>
    Array.isArray(each) ? option(each) : el("optgroup", { label: each.label }, each.choices.map(option)));
  return el("select", attributes, parts);
}

export async function copy(text, button) {
  const before = button.textContent;
  const isCopied = await toClipboard(text);
  button.textContent = isCopied ? "Copied" : "Select it and press Ctrl+C";
  setTimeout(() => { button.textContent = before; }, 2000);
}

async function toClipboard(text) {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    // without TLS, as on a ship's network, there is no such clipboard: the old way still works
    const area = el("textarea", { class: "unseen", "aria-hidden": "true" });
    area.value = text;
    document.body.append(area);
    area.select();
    const isCopied = document.execCommand("copy");
    area.remove();
    return isCopied;
  }
}

export function save(parts, name, type) {
  const address = URL.createObjectURL(new Blob([parts].flat(), { type }));
  const link = el("a", { href: address, download: name });
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(address), 60000);
}
