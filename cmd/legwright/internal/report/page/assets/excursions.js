// How far a design goes: together, alone, over its whole stroke; and what a small
// change of each dimension does to the goals.

function excursionsView(model, d, place) {
  const { data } = model;
  add(place, [h("h3", {}, "How far it goes")]);
  if (d.detail && d.detail.together.length) {
    add(place, [table("All coordinates of a zone at the same time: how much of it is reached, beyond 1 if it could be larger",
      ["zone", num("reachable"), "what fails beyond", "towards"],
      d.detail.together.map((t) => [given(model.zone(t.zone)), num(t.factor === null ? "3 and more" : `${(Math.floor(t.factor * 100 + 1e-6) / 100).toFixed(2)} of the zone`),
        given(words(t.fails)), { node: given(t.factor === null ? "" : poseText(model, d, t.at)), class: "prose" }]))]);
  }
  const alone = d.detail ? d.detail.excursions : [];
  if (alone.length) {
    add(place, [table("Each coordinate alone, all others at home. Such excursions are not reachable together.",
      ["coordinate", num("from"), num("to"), "low end set by", "high end set by"],
      alone.map((e) => {
        const unit = model.unit(e.unit), end = (v) => num(v === null ? "nothing fails" : withUnit(v, unit));
        return [e.coordinate, end(e.low), end(e.high), given(words(e.low_fails)), given(words(e.high_fails))];
      }))]);
  }
  if (!d.detail) add(place, [h("p", { class: "note" }, "Excursions: ", h("code", {}, `legwright report ${model.folder} --detail ${d.id}`))]);
  add(place, [h("p", {}, h("b", {}, "Whole stroke: "), given(d.raw.whole_stroke || "not looked at; the figures hold for the duty only.")),
    h("p", {}, h("b", {}, "Proof: "), given(d.raw.proved || `${d.checked}; ${data.left_out[0] || ""}`))]);
}

// sensitivityView says what a small change of each dimension does to the goals.
function sensitivityView(model, d, place) {
  if (!d.detail || !d.detail.sensitivity.length) return;
  const change = (v) => (v === null || v === undefined ? "–" : share(v));
  const worse = (g, v) => (v === null || v === undefined || Math.abs(v) < 1e-4 ? "" : (v > 0) === g.more ? " room" : " bad");
  const rows = d.detail.sensitivity.map((c) => {
    const dim = d.fam.dimensions[c.dimension];
    return [given(words(dim.name)), given(c.text),
      ...model.goals.flatMap((g, k) => [c.lower[k], c.higher[k]].map((v) => num(change(v), { class: "num" + worse(g, v) }))),
      given([c.lower_fails && `less: ${words(c.lower_fails)}`, c.higher_fails && `more: ${words(c.higher_fails)}`].filter(Boolean).join("; "))];
  });
  add(place, [h("h3", {}, "If a dimension moves a little"),
    table("Change of each goal when one dimension is made smaller (−) or larger (+), all others as they are; sized legs follow",
      ["dimension", "moved by", ...model.goals.flatMap((g) => [num([given(g.label), " −"]), num([given(g.label), " +"])]), "limits that fail then"], rows, { class: "sensitivity" })]);
}
