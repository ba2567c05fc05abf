// Machines drawn in lines, in their real proportions.

// plot draws figures into a group, seen by the eye; to takes what the eye sees to
// the units of the drawing. Nearer lines leave a gap in those behind them.
function plot(group, layers, see, to, ground, parts) {
  const at = (p) => to(see(p));
  const segment = (p, q, cls, attrs) => s("line", { x1: p[0], y1: p[1], x2: q[0], y2: q[1], class: cls, ...attrs });
  const out = [];
  if (ground) out.push(s("g", { class: "ground" }, ground.lines.map(([p, q]) => segment(at(p), at(q)))));
  for (const { figure: f, cls, hot } of layers) {
    const seen = f.points.map(see), flat = seen.map(to);
    const lines = f.lines.map((l) => ({ ...l, depth: seen[l.p][2] + seen[l.q][2] })).sort((x, y) => x.depth - y.depth);
    const one = s("g", { class: `machine ${cls}` });
    for (const l of lines) {
      one.append(segment(flat[l.p], flat[l.q], `gap ${l.kind}`),
        segment(flat[l.p], flat[l.q], `${l.kind}${hot && hot.includes(l.leg) ? " hot" : ""}`, { "data-leg": l.leg || null }));
    }
    if (parts) one.append(...joints(f, flat, parts === "numbered"));
    out.push(one);
  }
  empty(group, out);
}

// joints are the joint centres, the tool point and the numbers of the legs.
function joints(f, flat, numbered) {
  const out = [];
  for (const [list, name] of [[f.base, "base"], [f.joints, "platform"]]) {
    list.forEach((p, k) => out.push(s("circle", { cx: flat[p][0], cy: flat[p][1], r: 3.4, class: "joint", "data-joint": `${name}${k + 1}`, "data-xyz": f.points[p].join(" ") })));
  }
  if (flat[f.tool]) {
    const [x, y] = flat[f.tool];
    out.push(s("path", { d: `M${x - 7} ${y}h14M${x} ${y - 7}v14`, class: "toolpoint", "data-xyz": f.points[f.tool].join(" ") }));
  }
  if (!numbered) return out;
  const feet = f.base.map((p) => flat[p]);
  const mx = feet.reduce((sum, q) => sum + q[0], 0) / feet.length, my = feet.reduce((sum, q) => sum + q[1], 0) / feet.length;
  feet.forEach(([x, y], k) => {
    const same = feet.findIndex(([u, v]) => Math.hypot(u - x, v - y) < 4); // legs on one joint: their numbers side by side
    const d = Math.hypot(x - mx, y - my) || 1;
    out.push(s("text", { x: x + 15 * (x - mx) / d + 12 * (k - same), y: y + 15 * (y - my) / d + 4.5, "text-anchor": "middle", class: "number" }, k + 1));
  });
  return out;
}

// groundOf is a grid of a round step in the plane of the base.
function groundOf(points) {
  let r = 0;
  for (const p of points) r = Math.max(r, Math.abs(p[0]), Math.abs(p[1]));
  r = r || 1;
  const ten = 10 ** Math.floor(Math.log10(r / 4));
  const step = [1, 2, 5, 10].map((f) => f * ten).find((f) => f >= r / 4.001);
  const n = Math.ceil(r / step);
  const lines = [];
  for (let k = -n; k <= n; k++) {
    lines.push([[k * step, -n * step, 0], [k * step, n * step, 0]], [[-n * step, k * step, 0], [n * step, k * step, 0]]);
  }
  return { step, lines };
}

// thumbnails are small drawings of machines at home, all to one scale and with their bases at one height.
function thumbnails(figures, view, hanging, labels) {
  const see = sight(view, hanging), zero = see([0, 0, 0]);
  const seen = figures.map((f) => f.points.map((p) => { const q = see(p); return [q[0] - zero[0], q[1] - zero[1]]; }));
  const xs = seen.map((list) => [Math.min(...list.map((q) => q[0])), Math.max(...list.map((q) => q[0]))]);
  const ys = seen.flat().map((q) => q[1]);
  const width = Math.max(...xs.map(([low, high]) => high - low)), top = Math.min(...ys), height = Math.max(...ys) - top;
  const k = Math.min(144 / width, 124 / height);
  return figures.map((f, i) => {
    const group = s("g", {}), middle = (xs[i][0] + xs[i][1]) / 2;
    plot(group, [{ figure: f, cls: "" }], see, (q) => [(q[0] - zero[0] - middle) * k, (q[1] - zero[1] - top) * k], null, "");
    return s("svg", { viewBox: `-76 -4 152 ${height * k + 8}`, class: "thumb", role: "img", "aria-label": labels[i] }, group);
  });
}

// machineView is a drawing that can be turned and zoomed.
function machineView(place, label, unit) {
  let W = 640, H = 500;
  const eye = camera();
  const group = s("g", {}), rule = s("g", { class: "rule" });
  const svg = s("svg", { class: "view", tabindex: "0", role: "img", "aria-label": `${label}. Arrow keys turn it, plus and minus zoom, 0 resets.` }, group, rule);
  let usual = SLANTED, layers = [], ball = { centre: [0, 0, 0], radius: 1 }, ground = groundOf([]), hanging = false;

  function draw() {
    svg.setAttribute("viewBox", `${-W / 2} ${-H / 2} ${W} ${H}`);
    const see = sight(eye, hanging);
    const k = eye.zoom * (H / 2 - 26) / ball.radius, c = see(ball.centre);
    plot(group, layers, see, (q) => [(q[0] - c[0]) * k, (q[1] - c[1]) * k], ground, "numbered");
    const width = ground.step * k, x = 14 - W / 2, y = H / 2 - 12;
    empty(rule, s("path", { d: `M${x} ${y - 6}v6h${width}v-6` }),
      s("text", { x: x + width + 8, y }, withUnit(ground.step, unit) + (eye.tilt > 1.57 || Math.abs(eye.tilt) < 1e-9 ? "" : ", also the step of the grid")));
  }
  const hand = steer(svg, eye, () => usual, draw);
  const go = (view) => { Object.assign(eye, view); draw(); };
  const stage = h("div", { class: "stage" }, svg);
  onWidth(stage, (width) => {
    W = Math.max(300, width);
    H = Math.round(Math.min(W * 0.82, 560));
    draw();
  });
  add(place, [stage,
    h("div", { class: "fields screen", role: "group", "aria-label": "turn and zoom" },
      VIEWS.map(([name, view]) => button(name, () => go(view))),
      button("+", () => hand.zoom(1.25), { "aria-label": "closer" }), button("−", () => hand.zoom(0.8), { "aria-label": "farther" }),
      button("reset", () => go(usual), { "data-do": "reset" }),
      h("span", { class: "note" }, "drag turns; Ctrl with the wheel zooms"))]);
  return {
    eye, svg,
    // look sets the view that the drawing starts from and that reset goes back to.
    look(view) {
      if (view !== usual) Object.assign(eye, usual = view);
    },
    // show takes layers {figure, cls, hot}; points, if given, must fit whatever is shown later.
    show(list, points, hangs) {
      layers = list;
      hanging = hangs;
      if (points) [ball, ground] = [reach(points), groundOf(points)];
      draw();
    },
  };
}
