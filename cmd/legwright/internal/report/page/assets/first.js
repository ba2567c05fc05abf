// The first screen: a few designs that differ, side by side, and what a step
// along the front costs.

function firstView(store, place) {
  const { model } = store;
  const { data } = model;
  const few = data.first.map((f) => {
    const d = model.designs[f.design];
    return { d, figure: atPose(d, 0).figure, why: [...d.marks.filter((m) => m !== CROSSES && !(d.proof && m.startsWith(d.proof))), ...(f.near || []).map((m) => `near ${m}`)] };
  });
  const drawings = thumbnails(few.map((c) => c.figure), few.some(({ d }) => usualView(d) === SLANTED) ? SLANTED : ABOVE, data.hanging, few.map(({ d }) => `${d.family} ${d.id} at home; all are drawn to one scale`));
  const picks = few.map(({ d }) => button(d.id, () => store.pick(d.index), { class: "pick big", "aria-pressed": "false", "data-pick": d.id, "aria-label": `design ${d.id}: open its sheet below` }));
  const heads = few.map((_, k) => h("th", { scope: "col" }, picks[k], drawings[k]));
  const row = (name, cells, attrs) => h("tr", attrs || {}, h("th", { scope: "row" }, name), cells);

  const goalRow = (g, k) => {
    const values = few.map(({ d }) => d.measures[g.measure]);
    const best = Math[g.more ? "max" : "min"](...values.filter(Number.isFinite));
    const texts = column(values, g.shown);
    return row([given(g.label), h("small", {}, [g.shown.symbol, g.more ? "more is better" : "less is better"].filter(Boolean).join(", "))],
      few.map(({ d }, i) => h("td", { class: values[i] === best ? "num best" : "num" }, texts[i],
        values[i] === best && few.length > 1 ? h("small", {}, "best here") : null, meter(1 - model.scaled[d.index][k]))));
  };
  const figureRow = ({ label, unit, of }) => {
    const values = few.map(({ d }) => of(d));
    if (!values.some((v) => Number.isFinite(v))) return null;
    return row([label, unit.symbol ? h("small", {}, unit.symbol) : null], column(values, unit).map((t) => h("td", { class: "num" }, t)));
  };

  const grid = h("table", { class: "few" },
    h("caption", { class: "hide" }, "The designs to choose from first, a column for each"),
    h("thead", {}, h("tr", {}, h("td", {}), heads)),
    h("tbody", {},
      row("why it is here", few.map((c) => h("td", {}, c.why.length ? h("ul", { class: "marks" }, c.why.map((m) => h("li", {}, given(words(m))))) : "between the others"))),
      model.families.length > 1 ? row("family", few.map(({ d }) => h("td", {}, familyTag(model, d.family)))) : null,
      model.goals.map(goalRow),
      row("tightest limit", few.map(({ d }) => h("td", {}, d.tightest
        ? [given(words(d.tightest.measure)), h("b", { class: d.tightest.holds ? "room" : "bad" }, marginText(d.tightest), h("small", {}, d.tightest.holds ? " left" : " short"))] : "no limit"))),
      row("checked", few.map(({ d }) => h("td", { class: `proof-${d.proof || "none"}` }, d.checked))),
      row("singularity within its strokes", few.map(({ d }) => h("td", { class: d.crosses ? "bad" : "" }, beyond(d)))),
      neededFigures(model).map(figureRow)));
  add(place, [
    h("p", { class: "note" }, few.length > 1
      ? `${few.length} of ${model.designs.length} designs, chosen to differ. All are drawn to one scale. The bar under a figure shows where it lies on the whole front: empty at the worst, full at the best. A number opens the design's sheet.`
      : "The front holds one design."),
    wide("designs to choose from first", grid),
    h("p", { class: "note" }, "Tightest limit: room left before it fails, in % of its bound (of the stroke for the range of the legs), or as a length or an angle where the bound is 0."),
  ]);
  if (data.steps && data.steps.length) {
    const knee = model.designs.find((d) => d.marks.includes("knee"));
    add(place, [h("h3", {}, "What a step along the front costs", knee ? `, from the knee (${knee.id})` : ""),
      h("p", { class: "note" }, "The knee is the compromise from which a gain in one goal begins to cost much in the others."),
      h("ul", {}, data.steps.map((t) => h("li", {}, given(t))))]);
  }
  function mark() {
    few.forEach(({ d }, k) => {
      picks[k].setAttribute("aria-pressed", d.index === store.picked);
      heads[k].classList.toggle("a", d.index === store.picked);
      heads[k].classList.toggle("b", d.index === store.other);
    });
  }
  store.on("pick", mark);
  mark();
}

// neededFigures are what one buys and builds by, beside the goals.
function neededFigures(model) {
  const out = [];
  const drives = [...new Set(model.designs.map((d) => d.fam.coordinate))];
  for (const key of drives) {
    out.push({ label: key === model.designs[0].fam.coordinate && drives.length === 1 ? "actuator range used" : `actuator range used (${model.unit(key).symbol})`,
      unit: model.unit(key), of: (d) => (d.fam.coordinate === key ? strokeUsed(d) : NaN) });
  }
  for (const name of ["stroke", "leg_min", "push_force", "pull_force", "motor_torque", "footprint", "home_height"]) {
    const m = model.measures.find((x) => x.name === name);
    if (m && !model.goals.some((g) => g.measure === m.index)) out.push({ label: m.label, unit: m.shown, of: (d) => d.measures[m.index] });
  }
  return out;
}

// meter is a bar for a share between 0 and 1.
const meter = (v) => (Number.isFinite(v) ? h("span", { class: "meter", "aria-hidden": "true" }, h("span", { style: { width: `${(100 * v).toFixed(1)}%` } })) : null);

// marginText is how far a limit is from failing.
function marginText(l) {
  if (l.value === null) return l.holds ? "without bound" : "fails";
  if (l.bound === 0) {
    const v = l.sense === "at_most" ? -l.value : l.value;
    return (v > 0 ? "+" : "") + withUnit(v, l.shown, 3);
  }
  return l.margin === null ? "none" : share(l.margin);
}
