// Every measure of a design, against its limit where it has one, with the pose
// that decides it.

function limitsView(model, d, place, showPose) {
  const byName = new Map(model.measures.map((m) => [m.name, m]));
  const rest = new Set(model.measures.map((m) => m.index));
  const where = (index) => {
    const w = index === undefined ? null : deciding(d, index);
    if (!w) return "";
    const m = model.measures[index];
    const parts = [w.leg ? (w.mate ? `legs ${w.leg} and ${w.mate}` : `leg ${w.leg}`) : "", model.case(w.case), model.zone(w.zone)].filter(Boolean);
    return button(given(parts.join(", ") || "a pose"), () => showPose(index, m.label), { class: "posed", "data-pose": m.name, title: `show the pose that decides ${m.label}` });
  };
  const goalText = (m) => {
    const g = m && model.goals.find((x) => x.measure === m.index);
    return g ? h("small", {}, " goal") : "";
  };
  const rows = [];
  // Coverage falls short because of the others: it has no room of its own.
  const room = (l) => (l === d.tightest ? -Infinity : l.measure === "coverage" ? Infinity : l.margin ?? Number.MAX_VALUE);
  const sorted = [...d.limits].sort((x, y) => (room(x) < room(y) ? -1 : room(x) > room(y) ? 1 : 0));
  for (const l of sorted) {
    const m = byName.get(l.measure), unit = l.shown;
    if (m) rest.delete(m.index);
    rows.push([[given(words(l.measure)), goalText(m)], num(withUnit(l.value ?? (m ? d.measures[m.index] : NaN), unit, 5)),
      num(`${l.sense === "at_least" ? "at least" : "at most"} ${withUnit(l.bound, unit, 5)}`),
      { node: [l.holds ? "holds " : "fails ", l.measure === "coverage" ? "" : marginText(l)], class: l.holds ? "num" : "num bad" },
      where(m ? m.index : undefined)]);
  }
  for (const m of model.measures) {
    const v = d.measures[m.index];
    if (!rest.has(m.index) || Number.isNaN(v)) continue;
    rows.push([[h("span", { title: m.text }, given(m.label)), goalText(m)], num(withUnit(v, m.shown, 5)), num("–"), "", where(m.index)]);
  }
  add(place, [h("h3", {}, "Measures and limits"),
    table("Tightest limit first, each with the worst that the duty asks. Press what decides a figure to see the pose.",
      ["measure", num("value"), num("wanted"), num("margin"), "decided by"], rows, { class: "limits" })]);
}
