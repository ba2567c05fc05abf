// Putting the page together.

function start() {
  const model = newModel(JSON.parse(byId("data").textContent));
  titleView(model, byId("title"));
  studyView(model, byId("asked"));
  footerView(model, byId("foot"));
  if (!model.designs.length) {
    for (const id of ["front", "design", "compare", "handover"]) {
      byId(id).hidden = true;
      document.querySelector(`nav a[href="#${id}"]`).hidden = true;
    }
    helpView(model, byId("choose"));
    return null;
  }
  const store = newStore(model);
  const best = model.data.first.length ? model.data.first.find((f) => model.designs[f.design].marks.includes("knee")) || model.data.first[0] : { design: 0 };
  store.picked = best.design;
  const second = model.data.first.find((f) => f.design !== best.design);
  if (second) store.other = second.design;
  firstView(store, byId("first"));
  familiesView(store, byId("filters"));
  weightsView(store, byId("filters"));
  const scatter = scatterView(store, byId("scatter"));
  parallelView(store, byId("parallel"));
  rankedView(store, byId("ranked"));
  const sheet = sheetView(store, byId("sheet"));
  const compare = compareView(store, byId("two"));
  handoverView(store, byId("files"));
  const now = byId("now");
  const tell = () => empty(now, "picked ", h("b", { class: "ina" }, model.designs[store.picked].id),
    store.other >= 0 ? [", held against it ", h("b", { class: "inb" }, model.designs[store.other].id)] : "");
  store.on("pick", () => {
    tell();
    say(`Picked ${model.designs[store.picked].id}`);
  });
  tell();
  return { model, store, scatter, sheet, compare, ranking, sight };
}

// For tests and for whoever looks into the page: the same objects that it uses.
window.legwright = start();
