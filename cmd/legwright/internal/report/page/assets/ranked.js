// The ranked table. Designs that differ by little from a better ranked one are
// folded under it.

function rankedView(store, place) {
  const { model } = store;
  const columns = [
    ...model.axes.filter((a) => a.goal),
    ...model.axes.filter((a) => !a.goal && a.table && a.high > a.low),
  ];
  const text = new Map(columns.map((a) => [a.key, column(a.values, a.unit)]));
  let most = 25, sortKey = "", down = false, listed = [];
  const open = new Set();
  const proofs = model.designs.some((d) => d.proof); // else all are as checked as each other
  const count = h("p", { class: "note", "aria-live": "polite" });
  const looked = model.designs.some((d) => beyond(d) !== "not looked at");
  const body = windowed();
  const heads = new Map();
  const head = (key, name, attrs) => {
    const th = h("th", { scope: "col", ...attrs }, key === null ? name : button(name, () => sort(key), { class: "sort" }));
    if (key !== null) heads.set(key, th);
    return th;
  };
  const grid = h("table", { class: "ranked", "aria-label": "designs in the order of rank under the weights" },
    h("thead", {}, h("tr", {},
      head("", "rank", { class: "num" }), head(null, "design"),
      model.families.length > 1 ? head(null, "family") : null, head(null, "marks"), looked ? head(null, "singular within strokes") : null,
      head("score", "score", { class: "num" }),
      columns.map((a) => head(a.key, a.label + (a.unit.symbol ? `, ${a.unit.symbol}` : ""), { class: "num" })),
      head("margin", "tightest limit"), proofs ? head(null, "checked") : null)));
  body.of(grid);

  const rows = model.designs.map((d, i) => {
    const pick = button(d.id, () => store.pick(i), { class: "pick", "aria-pressed": "false", "data-pick": d.id });
    const against = button("hold", () => store.against(store.other === i ? -1 : i), { class: "hold", "aria-pressed": "false", "aria-label": `hold ${d.id} against the picked design` });
    const twin = button("", () => { open.has(i) ? open.delete(i) : open.add(i); draw(); }, { class: "twin", hidden: true });
    const rank = h("td", { class: "num" }), score = h("td", { class: "num" });
    const node = h("tr", { "data-design": i }, rank,
      h("th", { scope: "row" }, pick, " ", against, " ", twin),
      model.families.length > 1 ? h("td", {}, familyTag(model, d.family)) : null,
      h("td", { class: "marked" }, given(d.marks.filter((m) => m !== CROSSES).map(words).join(", "))),
      looked ? h("td", { class: d.crosses ? "beyond bad" : "beyond" }, beyond(d)) : null,
      score,
      columns.map((a) => h("td", { class: "num" }, text.get(a.key)[i])),
      h("td", { class: "tight" }, tightest(d)), proofs ? h("td", {}, d.checked) : null);
    return { node, rank, score, pick, against, twin };
  });

  function sort(key) {
    down = sortKey === key ? !down : false;
    sortKey = key;
    draw();
  }

  function ordered() {
    const list = [...store.order];
    if (sortKey && sortKey !== "score") {
      const values = sortKey === "margin" ? model.designs.map((d) => (d.tightest ? d.tightest.margin ?? Infinity : Infinity))
        : model.axes.find((a) => a.key === sortKey).values;
      list.sort((i, j) => (values[i] === values[j] ? 0 : Number.isNaN(values[i]) ? 1 : Number.isNaN(values[j]) ? -1 : values[i] - values[j]));
    }
    return down ? list.reverse() : list;
  }

  function draw() {
    const list = ordered().filter((i) => store.shown[i]);
    const { heads: groups, under } = group(model, list);
    const out = [];
    for (const i of groups) {
      const twins = under.get(i) || [];
      rows[i].twin.hidden = twins.length === 0;
      rows[i].twin.textContent = open.has(i) ? `fold ${twins.length}` : `+${twins.length} near`;
      rows[i].twin.setAttribute("aria-expanded", open.has(i));
      rows[i].twin.setAttribute("aria-label", `${twins.length} designs that differ little from ${model.designs[i].id}`);
      rows[i].node.classList.remove("under");
      out.push(i);
      if (open.has(i)) {
        for (const j of twins) {
          rows[j].twin.hidden = true;
          rows[j].node.classList.add("under");
          out.push(j);
        }
      }
    }
    const now = out.slice(0, most);
    if (now.length !== listed.length || now.some((i, k) => i !== listed[k])) { // a table is slow to lay out
      body.rows(now.map((i) => rows[i].node));
      grid.setAttribute("aria-rowcount", now.length + 1);
      now.forEach((i, k) => rows[i].node.setAttribute("aria-rowindex", k + 2));
      listed = now;
    }
    for (const i of now) {
      rows[i].rank.textContent = store.place[i];
      rows[i].score.textContent = store.score[i].toFixed(4);
    }
    count.textContent = `${list.length} of ${model.designs.length} designs kept, ${groups.length} of them apart from each other; ${now.length} listed. A heading sorts by its column; “hold” puts a design beside the picked one.`;
    more.hidden = now.length === out.length;
    for (const [key, th] of heads) {
      if (key === sortKey) th.setAttribute("aria-sort", down ? "descending" : "ascending");
      else th.removeAttribute("aria-sort");
    }
  }

  function mark() {
    rows.forEach((r, i) => {
      r.node.classList.toggle("a", i === store.picked);
      r.node.classList.toggle("b", i === store.other);
      r.pick.setAttribute("aria-pressed", i === store.picked);
      r.against.setAttribute("aria-pressed", i === store.other);
    });
  }

  const more = h("p", { class: "screen" },
    button("list 50 more", () => { most += 50; draw(); }), " ", button("list all", () => { most = Infinity; draw(); }));
  add(place, [count, wide("ranked table", grid), more]);
  store.on("filter", draw);
  store.on("weights", draw);
  store.on("pick", mark);
  draw();
  mark();
}

// NEAR is the difference in every goal, as a share of its range over the front,
// below which two designs are near-twins.
const NEAR = 0.02;

// group folds designs under the first of the list that they are near to.
function group(model, list) {
  const heads = [], under = new Map();
  const scaled = model.scaled;
  for (const i of list) {
    const twin = heads.find((j) => model.designs[j].family === model.designs[i].family
      && scaled[i].every((v, k) => Math.abs(v - scaled[j][k]) < NEAR));
    if (twin === undefined) heads.push(i);
    else if (under.has(twin)) under.get(twin).push(i);
    else under.set(twin, [i]);
  }
  return { heads, under };
}

// tightest is the limit with the least room, and the room.
const tightest = (d) => (d.tightest ? [given(words(d.tightest.measure)), " ", marginText(d.tightest)] : "none");
