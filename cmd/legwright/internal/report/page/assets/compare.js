// Two designs side by side: in numbers, and in one drawing laid over the other.

function compareView(store, place) {
  const { model } = store;
  const { data } = model;
  const options = model.designs.map((d, i) => [i, `${d.id}  ${d.family}`]);
  const first = choice("picked", options, store.picked, (v) => store.pick(Number(v)));
  const second = choice("held against it", [[-1, "none"], ...options], store.other, (v) => store.against(Number(v)));
  const figure = h("div", { class: "stay" }), numbers = h("div", {}), none = h("p", { class: "note" }, "Choose a second design here, or with “hold” in the ranked table.");
  const view = machineView(figure, "Two machines laid over each other", model.unit("m"));
  const legend = h("p", { class: "legend" });
  const slider = h("input", { type: "range", min: 0, max: Math.max(data.path.length / 6 - 1, 0), value: 0, step: 1, oninput: () => show() });
  const path = h("label", { class: "path" }, h("span", {}, "both through the duty"), slider);
  add(figure, [legend, path]);
  const body = h("div", { class: "pair sheet" }, figure, numbers);
  add(place, [h("div", { class: "fields screen" }, first, second, button("swap", () => {
    const [a, b] = [store.picked, store.other];
    if (b < 0) return;
    store.other = a;
    store.pick(b);
  })), none, body]);

  const pose = (d) => (d.detail && path.hidden === false && Number(slider.value) > 0 ? atTrack(d, d.detail.path, Number(slider.value), data.path) : atPose(d, 0)).figure;

  function show(points) {
    const a = model.designs[store.picked], b = model.designs[store.other];
    view.show([{ figure: pose(b), cls: "b" }, { figure: pose(a), cls: "a" }], points || null, data.hanging);
  }

  function draw() {
    first.querySelector("select").value = store.picked;
    second.querySelector("select").value = store.other;
    const on = store.other >= 0 && store.other !== store.picked;
    none.hidden = on;
    body.hidden = !on;
    if (!on) return;
    const a = model.designs[store.picked], b = model.designs[store.other];
    path.hidden = !(a.detail && b.detail && data.path.length);
    slider.value = 0;
    empty(legend, h("b", { class: "ina" }, `${a.id} full lines`), ", ", h("b", { class: "inb" }, `${b.id} dashed`), path.hidden ? "; both at home, on one base frame" : "; on one base frame");
    view.look(usualView(a));
    show([...allPoints(model, a), ...allPoints(model, b)]);
    empty(numbers, table("Differences are those from the first to the second; ▲ better, ▼ worse", ["", num(a.id), num(b.id), num("difference")], differences(model, a, b), { class: "differences" }));
  }
  store.on("pick", draw);
  draw();
  return { view };
}

// differences has a row for each goal, dimension and measure in which two designs differ.
function differences(model, a, b) {
  const rows = [];
  const row = (label, u, v, unit, better) => {
    if (!Number.isFinite(u) && !Number.isFinite(v)) return;
    const [s, t] = column([u, v], unit, 4);
    const d = v - u, there = Number.isFinite(d);
    const equal = there && Math.abs(d) <= 1e-9 * Math.max(Math.abs(u), Math.abs(v));
    const word = there && !equal && better ? ((d > 0) === (better > 0) ? "better" : "worse") : "";
    rows.push([given(label + (unit.symbol ? `, ${unit.symbol}` : "")), num(s), num(t),
      num([sign(word), !there ? "–" : equal ? "same" : `${d > 0 ? "+" : ""}${quantity(d, unit, 3)}${u !== 0 ? ` (${share(d / Math.abs(u))})` : ""}`])]);
  };
  const sign = (word) => (word ? h("span", { class: word === "better" ? "room" : "bad", title: word }, word === "better" ? "▲" : "▼", h("span", { class: "hide" }, ` ${word},`), " ") : "");
  const isGoal = new Set(model.goals.map((g) => g.measure));
  if (a.family !== b.family) rows.push(["family", a.family, b.family, ""]);
  for (const g of model.goals) row(g.label, a.measures[g.measure], b.measures[g.measure], g.shown, g.more ? 1 : -1);
  if (a.tightest && b.tightest) rows.push(["tightest limit", num([given(words(a.tightest.measure)), " ", marginText(a.tightest)]), num([given(words(b.tightest.measure)), " ", marginText(b.tightest)]), ""]);
  if (a.proof !== b.proof) rows.push(["checked", a.checked, b.checked, ""]);
  const named = new Map(a.fam.dimensions.map((c, k) => [c.name, a.raw.dimensions[k] ?? NaN]));
  const other = new Map(b.fam.dimensions.map((c, k) => [c.name, b.raw.dimensions[k] ?? NaN]));
  const unitOf = (name) => model.unit((a.fam.dimensions.find((c) => c.name === name) || b.fam.dimensions.find((c) => c.name === name)).unit);
  for (const name of new Set([...named.keys(), ...other.keys()])) row(words(name), named.get(name) ?? NaN, other.get(name) ?? NaN, unitOf(name), 0);
  for (const m of model.measures) {
    if (isGoal.has(m.index) || named.has(m.name)) continue;
    row(m.label, a.measures[m.index], b.measures[m.index], m.shown, m.sense === "larger" ? 1 : m.sense === "smaller" ? -1 : 0);
  }
  return rows;
}
