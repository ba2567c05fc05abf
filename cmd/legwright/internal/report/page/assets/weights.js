// Weights of the goals: sliders that order the designs again at once.

function weightsView(store, place) {
  const { model } = store;
  const top = Math.max(5, ...model.goals.map((g) => g.weight));
  const inputs = [];
  const problem = h("p", { class: "bad", role: "status" });
  const command = h("code", {});

  function read() {
    const weights = inputs.map(([number]) => Number(number.value === "" ? NaN : number.value));
    if (weights.some((w) => !(w >= 0) || !Number.isFinite(w))) {
      problem.textContent = "A weight is a number of 0 or more.";
      return;
    }
    if (!store.weigh(weights)) {
      problem.textContent = "Every weight is 0, which leaves nothing to order by.";
      return;
    }
    problem.textContent = "";
    say(`Best under these weights: ${model.designs[store.order[0]].id}`);
  }

  function tell() {
    command.textContent = `legwright rank ${model.folder} ` + model.goals.map((g, k) => `--weight ${g.name}=${store.weights[k]}`).join(" ");
  }

  const rows = model.goals.map((g, k) => {
    const name = h("span", { id: `weight-${k}` }, g.sense + " ", given(g.label));
    const slider = h("input", { type: "range", min: 0, max: top, step: 0.1, value: g.weight, "aria-labelledby": `weight-${k}`, "data-goal": g.name,
      oninput: () => { number.value = slider.value; read(); } });
    const number = h("input", { type: "number", min: 0, step: "any", value: g.weight, "aria-labelledby": `weight-${k}`,
      oninput: () => { slider.value = number.value; read(); } });
    inputs.push([number, slider]);
    return h("div", { class: "weight" }, name, h("span", { class: "slide" }, slider, number));
  });

  add(place, [
    h("h3", {}, "What counts more"),
    h("p", { class: "note" }, "Weights of the goals. The order is that of closeness to the best of every goal (TOPSIS)."),
    rows, problem,
    h("p", {}, button("as in the brief", () => {
      inputs.forEach(([number, slider], k) => { number.value = slider.value = model.goals[k].weight; });
      read();
    })),
    h("p", { class: "note command" }, "The same on the command line: ", command),
  ]);
  store.on("weights", tell);
  tell();
}

// familiesView leaves families out and takes them in.
function familiesView(store, place) {
  const { model } = store;
  if (model.families.length < 2) return;
  const box = (family) => {
    const input = h("input", { type: "checkbox", checked: true, onchange: () => store.showFamily(family, input.checked) });
    store.on("filter", () => { input.checked = !store.hidden.has(family); });
    const n = model.designs.filter((d) => d.family === family).length;
    return h("label", { class: "check" }, input, familyTag(model, family), ` (${n})`);
  };
  add(place, [h("fieldset", { class: "families" }, h("legend", {}, "Families shown"), model.families.map(box))]);
}
