// The files of the picked design that go to those who draw, buy and build. The
// study folder has them beside this page.

const SHEETS = [
  ["base.svg", "plan of the base, to scale"], ["base.dxf", "the same for drawing programs (DXF R12)"],
  ["platform.svg", "plan of the platform, to scale"], ["platform.dxf", "the same for drawing programs (DXF R12)"],
  ["joints.csv", "joint centres at home, in base and platform axes"], ["axes.csv", "mounting axes: directions and angles"],
  ["links.csv", "lengths between joint centres"], ["holes.csv", "hole table"],
  ["actuators.csv", "actuator schedule: lengths, stroke, reserve, forces, speed"],
  ["forces.csv", "forces at each joint and case, largest"], ["forces-together.csv", "forces at each joint and case, acting together"],
  ["heights.csv", "lowest and highest platform, collapsed height"],
];

function handoverView(store, place) {
  const { model } = store;
  const link = (path, text) => h("li", {}, h("a", { href: path }, path), h("small", {}, ` ${text}`));
  const command = (d) => h("code", {}, `legwright report ${model.folder} --detail ${d.id}`);
  function draw() {
    const d = model.designs[store.picked], at = `designs/${d.id}`;
    const { sheets } = d.raw, shown = d.detail && d.detail.handover;
    empty(place,
      h("p", {}, "Design ", h("b", {}, d.id), ", ", given(d.family), ". The files lie in the study folder beside this page. ", h("b", {}, "Not for construction until checked.")),
      h("ul", { class: "files" }, link(`${at}.yaml`, "design file, for legwright appraise, prove and locate"),
        sheets ? SHEETS.map(([name, text]) => link(`${at}/${name}`, text)) : null),
      sheets ? null : h("p", { class: "note" }, "Its plans and tables are not written yet. This writes them, and shows them here: ", command(d)),
      sheets && !shown ? h("p", { class: "note" }, "To see its tables here too: ", command(d)) : null,
      shown ? [titleBlock(model, d), h("div", { class: "sheets" }, plansView(d, shown), shown.tables.map((t) => sheetTable(d, t)))] : null);
  }
  store.on("pick", draw);
  draw();
}

// titleBlock says of the sheets below what each sheet says of itself.
function titleBlock(model, d) {
  const { data } = model;
  const rows = [["design", `${d.id}, ${d.family}`], ["units", data.sheet_units], ["datum", data.sheet_datum],
    ["machine", data.hanging ? "hangs: z points down, to the platform" : "stands: z points up"],
    ["brief SHA-256", data.brief_hash || "–"], ["program", `legwright ${data.program}`], ["caution", data.full_caution || data.caution]];
  return h("dl", { class: "block" }, rows.map(([k, v]) => [h("dt", {}, k), h("dd", {}, given(v))]));
}

// plansView draws the plans as they are in the files; of some designs the page has none, to stay small.
function plansView(d, shown) {
  if (!shown.base) return h("p", { class: "note" }, "The plans of this design are in its files alone.");
  return [["base", shown.base], ["platform", shown.platform]].map(([name, svg]) => h("figure", {},
    h("img", { class: "plan", src: `data:image/svg+xml;base64,${svg}`, alt: `Plan of the ${name} of design ${d.id} with dimensions; its joints are in the table of joint coordinates` }),
    h("figcaption", { class: "note" }, `Plan of the ${name}; to scale in designs/${d.id}/${name}.svg`)));
}

// sheetTable is one table of the sheets; columns of figures are set to the right.
function sheetTable(d, t) {
  const figures = t.heads.map((_, k) => k > 0 && t.rows.every((r) => r[k] === "" || r[k] === "unbounded" || Number.isFinite(Number(r[k]))));
  const set = (k, text) => (figures[k] ? num(minus(text)) : given(text));
  return [h("h3", {}, t.name[0].toUpperCase() + t.name.slice(1)), table(`Rounded; in full in designs/${d.id}/${t.file}`, t.heads.map((head, k) => set(k, words(head))), t.rows.map((r) => r.map((c, k) => set(k, c))), { class: "handed" }),
    t.notes.length ? h("ul", { class: "note" }, t.notes.map((n) => h("li", {}, given(n)))) : null];
}
