// The conditioning over two coordinates of the duty, as a map with a scale.

const RAMP = [[20, 38, 84], [37, 92, 131], [55, 145, 136], [136, 190, 106], [246, 226, 118]];

function ramp(t) {
  const x = Math.max(0, Math.min(1, t)) * (RAMP.length - 1), k = Math.min(Math.floor(x), RAMP.length - 2);
  return `rgb(${RAMP[k].map((c, j) => Math.round(c + (x - k) * (RAMP[k + 1][j] - c))).join(" ")})`;
}

function mapView(model, d, place) {
  if (!d.detail || !d.detail.maps.length) return;
  const { maps } = d.detail;
  const chart = h("div", {}), read = h("p", { class: "tip", role: "status" });
  const names = (m) => `${m.x} and ${m.y}`;
  const all = maps.flatMap((m) => m.values.filter((v) => v >= 0));
  const top = Math.max(...all) * 1e-4, low = Math.min(...all) * 1e-4;

  let which = 0, full = 560;
  function draw() {
    const m = maps[which];
    const W = Math.max(300, Math.min(full, 760)), H = Math.round(Math.min(430, W * 0.85)), L = 58, R = 80, T = 12, B = 46, w = W - L - R, hh = H - T - B;
    const ux = model.unit(COORDINATES.indexOf(m.x) < 3 ? "m" : "rad"), uy = model.unit(COORDINATES.indexOf(m.y) < 3 ? "m" : "rad");
    const dx = (m.x_range[1] - m.x_range[0]) / (m.n - 1), dy = (m.y_range[1] - m.y_range[0]) / (m.n - 1);
    // Each value stands for a cell about its point.
    const px = (v) => L + w * (v - m.x_range[0] + dx / 2) / (dx * m.n);
    const py = (v) => T + hh * (1 - (v - m.y_range[0] + dy / 2) / (dy * m.n));
    const cw = w / m.n, ch = hh / m.n;
    const cells = m.values.map((v, k) => {
      const x = L + cw * (k % m.n), y = T + hh - ch * (Math.floor(k / m.n) + 1);
      const box = { x: x.toFixed(2), y: y.toFixed(2), width: (cw + 0.3).toFixed(2), height: (ch + 0.3).toFixed(2) };
      return v < 0 ? s("rect", { ...box, class: "none" })
        : [s("rect", { ...box, fill: ramp((v * 1e-4 - low) / (top - low || 1)), "data-value": v }),
          m.fails[k] === "x" ? s("path", { d: `M${x} ${y + ch}L${x + cw} ${y}`, class: "fails" }) : null];
    });
    const frame = [
      ticks(m.x_range[0] * ux.factor, m.x_range[1] * ux.factor, 5).map((t) => s("text", { x: px(t / ux.factor), y: H - B + 16, "text-anchor": "middle" }, digits(t, 5))),
      ticks(m.y_range[0] * uy.factor, m.y_range[1] * uy.factor, 5).map((t) => s("text", { x: L - 6, y: py(t / uy.factor) + 4, "text-anchor": "end" }, digits(t, 5))),
      s("text", { x: L + w / 2, y: H - 8, "text-anchor": "middle", class: "name" }, `${m.x}, ${ux.symbol}`),
      s("text", { x: -(T + hh / 2), y: 14, transform: "rotate(-90)", "text-anchor": "middle", class: "name" }, `${m.y}, ${uy.symbol}`),
    ];
    const ix = COORDINATES.indexOf(m.x), iy = COORDINATES.indexOf(m.y);
    const zones = model.data.zones.filter((z) => z.low[ix] < z.high[ix] && z.low[iy] < z.high[iy] && z.kind !== "axes").map((z) => {
      const x = Math.max(L, px(z.low[ix])), y = Math.max(T, py(z.high[iy])), x2 = Math.min(L + w, px(z.high[ix])), y2 = Math.min(T + hh, py(z.low[iy]));
      const shape = z.kind === "ellipsoid" ? s("ellipse", { cx: (x + x2) / 2, cy: (y + y2) / 2, rx: (x2 - x) / 2, ry: (y2 - y) / 2, class: "zone" })
        : s("rect", { x, y, width: x2 - x, height: y2 - y, class: "zone" });
      return [shape, s("text", { x: x + 5, y: y + 15, class: "zonename" }, z.name)];
    });
    const steps = 32, sx = W - R + 22;
    const legend = [Array.from({ length: steps }, (_, k) => s("rect", { x: sx, y: T + hh * (1 - (k + 1) / steps), width: 14, height: hh / steps + 0.4, fill: ramp((k + 0.5) / steps) })),
      ticks(low, top, 5).map((t) => s("text", { x: sx + 20, y: T + hh * (1 - (t - low) / (top - low || 1)) + 4 }, digits(t, 3)))];
    const svg = s("svg", { viewBox: `0 0 ${W} ${H}`, class: "map", role: "img", tabindex: "0",
      "aria-label": `Conditioning of ${d.id} over ${names(m)}: from ${digits(low, 3)} to ${digits(top, 3)}. Arrow keys read single values.` },
    s("g", {}, cells), s("g", { class: "frame" }, frame, legend), s("g", {}, zones), s("rect", { x: L, y: T, width: w, height: hh, class: "edge" }));
    const cursor = s("rect", { width: cw, height: ch, class: "deciding", visibility: "hidden" });
    svg.append(cursor);
    const at = [Math.floor(m.n / 2), Math.floor(m.n / 2)];
    const tell = () => {
      const v = m.values[at[1] * m.n + at[0]], fails = m.fails[at[1] * m.n + at[0]] === "x";
      cursor.setAttribute("x", L + cw * at[0]);
      cursor.setAttribute("y", T + hh - ch * (at[1] + 1));
      cursor.setAttribute("visibility", "visible");
      read.textContent = `${m.x} ${withUnit(m.x_range[0] + dx * at[0], ux, 4)}, ${m.y} ${withUnit(m.y_range[0] + dy * at[1], uy, 4)}: `
        + (v < 0 ? "out of reach" : `conditioning ${digits(v * 1e-4, 4)}${fails ? ", a limit fails" : ""}`);
    };
    svg.addEventListener("pointermove", (e) => {
      const box = svg.getBoundingClientRect(), k = W / box.width;
      const x = Math.floor(((e.clientX - box.left) * k - L) / cw), y = Math.floor((T + hh - (e.clientY - box.top) * k) / ch);
      if (x < 0 || y < 0 || x >= m.n || y >= m.n) return;
      [at[0], at[1]] = [x, y];
      tell();
    });
    svg.addEventListener("keydown", (e) => {
      const by = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowDown: [0, -1], ArrowUp: [0, 1] }[e.key];
      if (!by) return;
      e.preventDefault();
      [0, 1].forEach((c) => { at[c] = Math.max(0, Math.min(m.n - 1, at[c] + by[c])); });
      tell();
    });
    const held = poseText(model, d, m.at);
    empty(chart, svg);
    read.textContent = held === "home" ? "All other coordinates are at home." : `All other coordinates are at: ${held}.`;
  }

  add(place, [h("h3", {}, "Conditioning over the duty"),
    h("div", { class: "fields" }, choice("over", maps.map((m, k) => [k, names(m)]), 0, (k) => { which = Number(k); draw(); })),
    chart, read, h("p", { class: "note" }, "Bright is good; one scale for all maps of this design. Struck through: a pose limit fails. Empty: out of reach. Outlines: zones of the duty.")]);
  onWidth(chart, (width) => { full = width; draw(); });
}
