// The files of the picked design that go to those who draw, buy and build.

function handoverView(store, place) {
  const { model } = store;
  const { data } = model;
  function draw() {
    const d = model.designs[store.picked];
    const files = (data.files || []).map(([name, text]) => h("li", {}, h("a", { href: `designs/${encodeURIComponent(d.id)}/${name}` }, `designs/${d.id}/${name}`), ` ${text}`));
    empty(place, h("p", {}, "For design ", h("b", {}, d.id), ", in the study folder beside this page. Each sheet says what it is drawn from; not for construction until checked."), h("ul", { class: "files" }, files));
  }
  store.on("pick", draw);
  draw();
}
