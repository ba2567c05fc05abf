// Parallel coordinates over goals and dimensions: a line for each design.

function parallelView(store, place) {
  const { model } = store;
  const axes = model.axes.filter((a) => a.parallel && a.high > a.low);
  const same = model.axes.filter((a) => a.parallel && a.high === a.low);
  if (axes.length < 2) {
    add(place, [h("p", { class: "note" }, "The designs do not differ enough to be drawn as lines.")]);
    return;
  }
  const box = { top: 62, bottom: 316, height: 346, side: 62, least: 98 };
  const lines = s("g", { class: "lines" });
  const top = s("g", { class: "top" });
  const rails = axes.map((a) => rail(store, a, box));
  const svg = s("svg", {
    class: "parallel", role: "group",
    "aria-label": "A line for each design over goals and dimensions; each axis has two grips that set a range",
  }, lines, top, rails);
  const paths = model.designs.map((d, i) => s("path", {
    class: `tone${model.families.indexOf(d.family) % 6} dash${model.families.indexOf(d.family) % 4}`, "data-design": i,
  }));
  lines.append(...paths);

  function path(i) {
    let d = "", pen = false;
    axes.forEach((a, k) => {
      const v = a.values[i];
      if (Number.isNaN(v)) { pen = false; return; } // another family's dimension
      d += `${pen ? "L" : "M"}${at[k].toFixed(1)} ${(Number.isFinite(v) ? railY(a, box, v) : box.top).toFixed(1)}`;
      pen = true;
    });
    return d;
  }

  // layout spreads the axes over the width that there is; below a least distance the drawing scrolls.
  let at = [];
  function layout(width) {
    const step = Math.max(box.least, (width - 2 * box.side) / Math.max(axes.length - 1, 1));
    const full = 2 * box.side + step * (axes.length - 1);
    at = axes.map((_, k) => box.side + step * k);
    for (const [k, v] of [["viewBox", `0 0 ${full} ${box.height}`], ["width", full], ["height", box.height]]) svg.setAttribute(k, v);
    rails.forEach((r, k) => r.setAttribute("transform", `translate(${at[k]} 0)`));
    paths.forEach((node, i) => node.setAttribute("d", path(i)));
    mark();
  }

  function filter() {
    paths.forEach((node, i) => {
      const out = !store.shown[i];
      if (node.out !== out) {
        node.out = out;
        node.classList.toggle("out", out);
      }
    });
  }

  function mark() {
    empty(top, [[store.other, "b"], [store.picked, "a"]].filter(([i]) => i >= 0)
      .map(([i, cls]) => s("path", { d: path(i), class: cls })));
  }

  const chips = h("div", { class: "chips", role: "group", "aria-label": "ranges set" });
  function chip() {
    const list = [...store.ranges].map(([key, [low, high]]) => {
      const a = model.axes.find((x) => x.key === key);
      const text = low <= a.low ? `${a.label} to ${withUnit(high, a.unit)}`
        : high >= a.high ? `${a.label} from ${withUnit(low, a.unit)}`
          : `${a.label} ${quantity(low, a.unit)} to ${withUnit(high, a.unit)}`;
      return button(`${text} ✕`, () => store.setRange(key, null), { class: "chip", "aria-label": `${text}: take this range away` });
    });
    empty(chips, list, list.length > 1 || store.hidden.size ? button("show all again", () => store.clearRanges(), { class: "chip" }) : null);
  }

  const frame = wide("parallel coordinates", svg);
  add(place, [frame, chips,
    h("p", { class: "note screen" }, "Drag the grips of an axis, or drag along it, to keep a range; double-click takes it away. Grips also move by arrow keys.",
      same.length ? [" The same for all designs: ", same.map((a) => `${a.label} ${withUnit(a.low, a.unit)}`).join(", "), "."] : "")]);
  for (const f of [filter, chip]) store.on("filter", f);
  store.on("pick", mark);
  new ResizeObserver(() => layout(frame.clientWidth)).observe(frame);
  layout(frame.clientWidth || 900);
  chip();
}
