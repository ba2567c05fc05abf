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
  function draw() {
    const d = model.designs[store.picked], at = `designs/${d.id}`;
    const { sheets } = d.raw;
    empty(place,
      h("p", {}, "Design ", h("b", {}, d.id), ". The files lie in the study folder beside this page. Not for construction until checked."),
      h("ul", { class: "files" }, link(`${at}.yaml`, "design file, for legwright appraise, prove and locate"),
        sheets ? SHEETS.map(([name, text]) => link(`${at}/${name}`, text)) : null),
      sheets ? null : h("p", { class: "note" }, "Its plans and tables are not written yet. This writes them, and shows them here: ", h("code", {}, `legwright report ${model.folder} --detail ${d.id}`)));
  }
  store.on("pick", draw);
  draw();
}
