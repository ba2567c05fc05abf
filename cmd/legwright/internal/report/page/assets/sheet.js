// The sheet of the picked design.

function sheetView(store, place) {
  const { model } = store;
  const figure = h("div", { class: "stay" }), tables = h("div", {}), legs = h("div", {}), left = h("div", {}), right = h("div", {}), below = h("div", {});
  const name = h("p", { class: "which" });
  const view = machineView(figure, "The machine in lines", model.unit("m"));
  let follow = () => {}, drawn = -1;
  const poses = poseControl(store, view, (p) => follow(p.q));
  add(figure, [poses.place, poses.status]);

  const select = choice("design", model.designs.map((d, i) => [i, `${d.id}  ${d.family}${d.marks.length ? `  (${d.marks.map(words).join(", ")})` : ""}`]), store.picked, (v) => store.pick(Number(v)));
  const list = select.querySelector("select");
  const step = (by) => {
    const i = store.order[store.order.indexOf(store.picked) + by];
    if (i !== undefined) store.pick(i);
  };
  add(place, [
    h("div", { class: "fields screen" }, select, button("better rank", () => step(-1)), button("next rank", () => step(1)),
      button("hold against others", () => store.against(store.picked), { class: "hold" })),
    name, h("div", { class: "pair sheet" }, figure, tables), legs, h("div", { class: "pair" }, left, right), below,
  ]);

  function showPose(index, label) {
    poses.deciding(index, label);
    if (view.svg.getBoundingClientRect().top < 0) view.svg.scrollIntoView({ block: "center" });
  }

  function title() {
    const d = model.designs[store.picked];
    empty(name, h("b", { class: "id" }, d.id), " ", familyTag(model, d.family), ` · rank ${store.place[d.index]} · closeness ${store.score[d.index].toFixed(3)}`,
      d.marks.length ? [" · ", given(d.marks.map(words).join(", "))] : "", ` · ${d.checked}`);
  }

  function draw() {
    if (drawn === store.picked) return;
    drawn = store.picked;
    const d = model.designs[drawn];
    list.value = drawn;
    title();
    for (const part of [tables, legs, left, right, below]) empty(part);
    dimensionsView(model, d, tables);
    limitsView(model, d, tables, showPose);
    follow = legsView(model, d, legs);
    excursionsView(model, d, left);
    sensitivityView(model, d, below);
    mapView(model, d, right);
    if (d.raw.notes && d.raw.notes.length) add(right, [h("h3", {}, "Notes"), h("ul", {}, d.raw.notes.map((t) => h("li", {}, given(t))))]);
    poses.design(d);
  }
  store.on("pick", draw);
  store.on("weights", title);
  draw();
  return { view, poses };
}

// dimensionsView lists the dimensions of a design.
function dimensionsView(model, d, place) {
  const how = { fixed: "given", sized: "sized by the duty", derived: "follows from the others" };
  const rows = d.fam.dimensions.map((c, k) => {
    const unit = model.unit(c.unit), v = d.raw.dimensions[k];
    const range = c.low !== undefined && c.high !== undefined && c.low !== null && c.high !== null && c.low !== c.high
      ? `${quantity(c.low, unit)} to ${withUnit(c.high, unit)}` : how[c.form] || "";
    const by = c.step ? `, in steps of ${withUnit(c.step, unit)}` : "";
    const edge = v !== null && c.low !== c.high && (v === c.low || v === c.high) ? ", at its end" : "";
    return [h("span", { title: c.text }, given(words(c.name))), num(withUnit(v ?? NaN, unit, 6)), given(range + by + edge)];
  });
  add(place, [h("h3", {}, "Dimensions"), table(d.fam.text, ["dimension", num("value"), "allowed"], rows)]);
}
