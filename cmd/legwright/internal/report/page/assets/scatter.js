// Any two measures against each other, a third as the size of the signs.

function scatterView(store, place) {
  const { model } = store;
  const L = 62, R = 20, T = 14, B = 48;
  let W = 640, H = 440;
  const axes = model.axes;
  const goals = axes.filter((a) => a.goal);
  const at = {
    x: (goals[goals.length > 2 ? 2 : 0] || axes[0]).key,
    y: (goals[goals.length > 2 ? 0 : 1] || axes[1] || axes[0]).key,
    size: goals.length > 2 ? goals[1].key : "",
  };
  const axis = (key) => axes.find((a) => a.key === key);
  const options = axes.map((a) => [a.key, a.label]);
  const frame = s("g", { class: "frame" });
  const dots = s("g", {});
  const halo = s("g", { class: "halo", "aria-hidden": "true" });
  const svg = s("svg", { class: "scatter", role: "img", "aria-label": "Scatter of the front; the table below lists the same designs" }, frame, dots, halo);
  const tip = h("p", { class: "tip", "aria-hidden": "true" });
  let xy = [];

  const signs = model.designs.map((d, i) => s("path", {
    d: shapeOf(model, d.family)[1],
    class: `dot tone${model.families.indexOf(d.family) % 6}`,
    "data-design": i,
  }));
  dots.append(...signs);

  function scale(key, from, to) {
    const a = axis(key);
    const pad = (a.high - a.low || Math.abs(a.high) || 1) * 0.05;
    const low = a.low - pad, high = a.high + pad;
    return {
      a, low, high,
      of: (v) => from + ((Number.isFinite(v) ? v : high) - low) / (high - low) * (to - from),
    };
  }

  function draw() {
    svg.setAttribute("viewBox", `0 0 ${W} ${H}`);
    const x = scale(at.x, L, W - R), y = scale(at.y, H - B, T);
    const size = at.size ? axis(at.size) : null;
    empty(frame);
    for (const [c, across] of [[x, true], [y, false]]) {
      const f = c.a.unit.factor;
      const marks = ticks(c.low * f, c.high * f, across ? W / 110 : 5);
      for (const t of marks) {
        const p = c.of(t / f);
        add(frame, [
          s("line", across ? { x1: p, x2: p, y1: T, y2: H - B } : { x1: L, x2: W - R, y1: p, y2: p }),
          s("text", across ? { x: p, y: H - B + 16, "text-anchor": "middle" } : { x: L - 7, y: p + 4, "text-anchor": "end" }, digits(t, 6)),
        ]);
      }
      const name = c.a.label + (c.a.unit.symbol ? `, ${c.a.unit.symbol}` : "") + c.a.wish;
      add(frame, [s("text", across ? { x: (L + W - R) / 2, y: H - 8, "text-anchor": "middle", class: "name" }
        : { x: -(T + H - B) / 2, y: 14, transform: "rotate(-90)", "text-anchor": "middle", class: "name" }, name)]);
    }
    xy = model.designs.map((d, i) => [x.of(x.a.values[i]), y.of(y.a.values[i])]);
    signs.forEach((node, i) => {
      let k = 0.85;
      if (size) {
        const v = size.values[i];
        k = 0.55 + 1.05 * (Number.isFinite(v) && size.high > size.low ? (v - size.low) / (size.high - size.low) : 0.5);
      }
      node.setAttribute("transform", `translate(${xy[i][0].toFixed(2)} ${xy[i][1].toFixed(2)}) scale(${k.toFixed(3)})`);
    });
    mark();
    filter();
  }

  function filter() {
    signs.forEach((node, i) => {
      const out = !store.shown[i];
      if (node.out !== out) {
        node.out = out;
        node.classList.toggle("out", out);
      }
    });
  }

  function mark() {
    empty(halo);
    for (const [i, cls] of [[store.other, "b"], [store.picked, "a"]]) {
      if (i < 0) continue;
      const [px, py] = xy[i];
      const flip = px > W - 80;
      add(halo, [s("circle", { cx: px, cy: py, r: 12, class: cls }),
        s("text", { x: flip ? px - 16 : px + 16, y: py + (cls === "a" ? -6 : 16), class: cls, "text-anchor": flip ? "end" : "start" }, model.designs[i].id)]);
    }
  }

  function nearest(e) {
    const box = svg.getBoundingClientRect();
    const k = W / box.width, px = (e.clientX - box.left) * k, py = (e.clientY - box.top) * k;
    let best = -1, least = 18 * Math.max(1, k);
    xy.forEach(([qx, qy], i) => {
      const d = Math.hypot(qx - px, qy - py);
      if (store.shown[i] && d < least) [best, least] = [i, d];
    });
    return best;
  }

  svg.addEventListener("click", (e) => {
    const i = nearest(e);
    if (i >= 0) e.shiftKey ? store.against(i) : store.pick(i);
  });
  svg.addEventListener("pointermove", (e) => {
    const i = nearest(e);
    empty(tip, i < 0 ? "" : summary(model, i));
  });

  add(place, [
    h("div", { class: "fields" },
      choice("across", options, at.x, (v) => { at.x = v; draw(); }),
      choice("up", options, at.y, (v) => { at.y = v; draw(); }),
      choice("size", [["", "all the same"], ...options], at.size, (v) => { at.size = v; draw(); })),
    svg, tip,
  ]);
  store.on("filter", filter);
  store.on("pick", mark);
  draw();
  onWidth(place, (width) => {
    W = Math.max(300, Math.min(width, 900));
    H = Math.round(Math.max(300, W * 0.66));
    draw();
  });
  return { position: (i) => xy[i] };
}

// summary says what a design is in one line.
function summary(model, i) {
  const d = model.designs[i];
  const goals = model.goals.map((g) => `${g.label} ${withUnit(d.measures[g.measure], g.shown)}`);
  return `${d.id}, ${d.family}: ${goals.join(", ")}`;
}
