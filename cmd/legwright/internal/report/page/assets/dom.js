// Building the document. Text from the data always goes through text nodes and
// set attributes, never through markup.

const SVG = "http://www.w3.org/2000/svg";

// fill sets attributes and children of an element. A key that starts with "on"
// is a listener, "style" an object of custom properties, false and null leave
// the attribute out.
function fill(node, attrs, children) {
  for (const [key, value] of Object.entries(attrs || {})) {
    if (value === false || value === null || value === undefined) continue;
    if (key.startsWith("on")) node.addEventListener(key.slice(2), value);
    else if (key === "style") for (const [k, v] of Object.entries(value)) node.style.setProperty(k, v);
    else node.setAttribute(key, value === true ? "" : String(value));
  }
  add(node, children);
  return node;
}

// add appends nodes and texts, and lists of them.
function add(node, children) {
  for (const child of children.flat(Infinity)) {
    if (child === null || child === undefined || child === false) continue;
    node.append(child instanceof Node ? child : String(child));
  }
}

const h = (tag, attrs, ...children) => fill(document.createElement(tag), attrs, children);
const s = (tag, attrs, ...children) => fill(document.createElementNS(SVG, tag), attrs, children);

// given wraps text that came from a file, so that marks of direction in it stay inside.
const given = (text) => h("bdi", {}, String(text ?? ""));

function empty(node, ...children) {
  node.replaceChildren();
  add(node, children);
  return node;
}

const byId = (id) => document.getElementById(id);

// say tells people who cannot see the page what has changed.
let saying = 0;
function say(text) {
  clearTimeout(saying);
  saying = setTimeout(() => { byId("live").textContent = text; }, 250);
}

// choice is a labelled list to pick one of; options are [value, text].
function choice(label, options, value, pick) {
  const select = h("select", { onchange: () => pick(select.value) },
    options.map(([v, text]) => h("option", { value: v, selected: v === value }, text)));
  return h("label", { class: "field" }, h("span", {}, label), select);
}

// button is a plain button.
const button = (text, press, attrs) => h("button", { type: "button", onclick: press, ...attrs }, text);

// wide puts a table or a drawing that may be broader than the page into a frame that scrolls.
function wide(label, node) {
  const frame = h("div", { class: "wide", role: "region", tabindex: "0", "aria-label": label }, node);
  const look = new ResizeObserver(() => frame.classList.toggle("over", frame.scrollWidth > frame.clientWidth + 1));
  look.observe(frame);
  look.observe(node);
  return frame;
}

// onWidth calls draw with the width of a node, now and whenever it changes.
function onWidth(node, draw) {
  let last = 0;
  new ResizeObserver(() => {
    const width = node.clientWidth;
    if (width > 0 && Math.abs(width - last) > 1) draw(last = width);
  }).observe(node);
}

// table makes a table with a note above it from head cells and rows of cells; the first cell of a row heads it.
function table(note, head, rows, attrs) {
  const cell = (c, tag, scope) => {
    const { node, ...rest } = c !== null && typeof c === "object" && "node" in c ? c : { node: c };
    return h(tag, { scope, ...rest }, node);
  };
  return noted(note, h("table", { ...attrs, "aria-label": note },
    h("thead", {}, h("tr", {}, head.map((c) => cell(c, "th", "col")))),
    h("tbody", {}, rows.map((r) => h("tr", {}, r.map((c, i) => (i === 0 ? cell(c, "th", "row") : cell(c, "td"))))))));
}

// noted is a table in a frame with a note above it.
const noted = (note, node) => h("div", { class: "noted" }, h("p", { class: "note" }, note), wide(note, node));

// num is a table cell of a number.
const num = (text, more) => ({ node: text, class: "num", ...more });
