// Parallel coordinates over goals and dimensions: a line for each design.

function parallelView(store, place) {
  const { model } = store;
  const axes = model.axes.filter((a) => a.parallel && a.high > a.low);
  const same = model.axes.filter((a) => a.parallel && a.high === a.low);
  const step = 104, T = 44, B = 34, H = 340, L = 58;
  const W = L * 2 + step * Math.max(axes.length - 1, 1);
  const lines = s("g", { class: "lines" });
  const top = s("g", { class: "top" });
  const rails = s("g", {});
  const svg = s("svg", {
    viewBox: `0 0 ${W} ${H}`, class: "parallel", role: "group",
    "aria-label": "A line for each design over goals and dimensions; each axis has two grips that set a range",
    style: { "min-width": `${Math.max(330, W * 0.8)}px`, "max-width": `${W * 1.5}px` },
  }, lines, top, rails);

  axes.forEach((a, k) => {
    a.x = L + step * k;
    a.y = (v) => T + (1 - (v - a.low) / (a.high - a.low)) * (H - T - B);
    a.v = (y) => a.low + (1 - (y - T) / (H - T - B)) * (a.high - a.low);
    // Values without bound stand at the bad end.
    a.place = (v) => (Number.isFinite(v) ? a.y(v) : Number.isNaN(v) ? NaN : a.better > 0 ? H - B : T);
  });

  function path(i) {
    let d = "", pen = false;
    for (const a of axes) {
      const y = a.place(a.values[i]);
      if (Number.isNaN(y)) { pen = false; continue; } // another family's dimension
      d += `${pen ? "L" : "M"}${a.x} ${y.toFixed(1)}`;
      pen = true;
    }
    return d;
  }

  const paths = model.designs.map((d, i) => s("path", {
    d: path(i), class: `tone${model.families.indexOf(d.family) % 6} dash${model.families.indexOf(d.family) % 4}`, "data-design": i,
  }));
  lines.append(...paths);
  for (const a of axes) rails.append(rail(store, a, svg, { T, B, H, W }));

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

  const chips = h("div", { class: "chips", "aria-label": "ranges set" });
  function chip() {
    const list = [...store.ranges].map(([key, [low, high]]) => {
      const a = model.axes.find((x) => x.key === key);
      const text = low <= a.low ? `${a.label} to ${withUnit(high, a.unit)}`
        : high >= a.high ? `${a.label} from ${withUnit(low, a.unit)}`
          : `${a.label} ${quantity(low, a.unit)} to ${withUnit(high, a.unit)}`;
      return button(`${text} ✕`, () => store.setRange(key, null), { class: "chip", "aria-label": `${text}: take this range away` });
    });
    empty(chips, list, list.length > 1 ? button("take all ranges away", () => store.clearRanges(), { class: "chip" }) : null);
  }

  add(place, [
    wide("parallel coordinates", svg), chips,
    same.length ? h("p", { class: "note" }, "The same for all designs: ",
      same.map((a) => `${a.label} ${withUnit(a.low, a.unit)}`).join(", "), ".") : null,
  ]);
  for (const f of [filter, chip]) store.on("filter", f);
  store.on("pick", mark);
  mark();
  chip();
}
