// What the page knows, read once from the data that the program put in.

function newModel(data) {
  for (const list of ["designs", "first", "steps", "notes", "goals", "measures", "limits", "zones", "cases", "families", "path", "way", "corners", "left_out"]) data[list] ||= [];
  const unit = (key) => data.units[key] || BARE;
  const measures = data.measures.map((m, index) => ({ ...m, index, label: words(m.name), shown: unit(m.unit) }));
  const designs = data.designs.map((d, index) => newDesign(data, d, index));
  const goals = data.goals.map((g) => {
    const m = measures[g.measure];
    return { measure: g.measure, more: g.more, weight: g.weight, name: m.name, label: m.label, text: m.text, shown: m.shown, sense: g.more ? "more" : "less" };
  });
  const model = {
    data, unit, measures, designs, goals,
    families: data.families.map((f) => f.name).filter((name) => designs.some((d) => d.family === name)),
    folder: shellWord(data.folder || "DIR"),
    zone: (k) => (k >= 0 && data.zones[k] ? data.zones[k].name : ""),
    case: (k) => (k >= 0 && data.cases[k] !== undefined ? data.cases[k] : ""),
  };
  model.axes = newAxes(model);
  model.scaled = scaledGoals(designs, goals);
  return model;
}

// shellWord quotes a path so that it can be pasted into a shell.
const shellWord = (path) => (/^[\w./-]+$/.test(path) ? path : `'${path.replaceAll("'", "'\\''")}'`);

// CROSSES is the mark of designs that meet a singularity within their strokes, and a mark that warns.
const CROSSES = "singular within strokes";

// beyond says what is known of singularities within the strokes of a design.
const beyond = (d) => (d.crosses ? "met" : d.raw.whole_stroke ? "none found" : "not looked at");

// CHECKED says how far the limits of a design are known to hold.
const CHECKED = { "": "not proved", proved: "proved", refuted: "refuted: a limit fails", undecided: "proof undecided" };

function newDesign(data, d, index) {
  const fam = data.families[d.family];
  const unbounded = new Set(d.unbounded || []);
  const limits = d.limits.map(([kind, bound, value, margin, holds]) => {
    const k = data.limits[kind];
    return { measure: k.measure, origin: k.origin, shown: data.units[k.unit] || BARE, sense: k.at_least ? "at_least" : "at_most", bound, value, margin, holds: holds === 1 };
  });
  return {
    raw: d, index, id: d.id, fam, family: fam.name, marks: d.marks || [], crosses: (d.marks || []).includes(CROSSES), limits, legs: d.legs, range: d.range,
    measures: d.measures.map((v, k) => (v !== null ? v : unbounded.has(k) ? Infinity : NaN)),
    tightest: d.tightest >= 0 ? limits[d.tightest] : null,
    checked: (d.proof === "proved" && (d.marks || []).find((m) => m.startsWith("proved"))) || CHECKED[d.proof] || d.proof,
    proof: d.proof,
    detail: d.detail || null,
  };
}

// newAxes are the goals, then the dimensions that designs differ in, then other measures. A dimension
// of the same name in several families is one axis.
function newAxes(model) {
  const { data, designs, goals } = model;
  const axis = (key, name, text, unit, of, more) => {
    const values = designs.map(of);
    const finite = values.filter(Number.isFinite);
    return { key, name, label: words(name), text, unit, values, low: Math.min(...finite), high: Math.max(...finite), some: finite.length > 0, wish: "", ...more };
  };
  const axes = goals.map((g) => axis(`m:${g.name}`, g.name, g.text, g.shown, (d) => d.measures[g.measure],
    { goal: true, parallel: true, table: true, wish: g.more ? " (more is better)" : " (less is better)" }));
  const dimensions = new Map();
  data.families.forEach((f) => f.dimensions.forEach((c) => { if (!dimensions.has(c.name)) dimensions.set(c.name, c); }));
  for (const c of dimensions.values()) {
    const place = new Map(data.families.map((f) => [f.name, f.dimensions.findIndex((x) => x.name === c.name)]));
    axes.push(axis(`d:${c.name}`, c.name, c.text, model.unit(c.unit), (d) => d.raw.dimensions[place.get(d.family)] ?? NaN, { dimension: true, parallel: true, table: true }));
  }
  for (const m of model.measures) {
    if (goals.some((g) => g.measure === m.index) || dimensions.has(m.name)) continue;
    axes.push(axis(`m:${m.name}`, m.name, m.text, m.shown, (d) => d.measures[m.index], { measure: m.index }));
  }
  return axes.filter((a) => a.some);
}

// scaledGoals has the goals of each design as shares of their range over the front, 0 at best.
function scaledGoals(designs, goals) {
  const rows = goalValues(designs, goals);
  const out = rows.map(() => new Array(goals.length).fill(0));
  goals.forEach((g, k) => {
    const all = rows.map((r) => r[k]);
    const low = Math.min(...all), high = Math.max(...all);
    if (high > low) rows.forEach((r, i) => { out[i][k] = (g.more ? high - r[k] : r[k] - low) / (high - low); });
  });
  return out;
}

// strokeUsed is the travel between the least and the greatest coordinate of the legs that are bounded.
function strokeUsed(d) {
  const legs = d.legs.slice(0, d.fam.bounded);
  const used = Math.max(...legs.map((l) => l[2] ?? NaN)) - Math.min(...legs.map((l) => l[0] ?? NaN));
  return Number.isFinite(used) ? used : NaN;
}

// deciding is what decides a measure of a design: {pose, leg, mate, zone, case}, or null.
function deciding(d, measure) {
  const row = d.raw.deciding.find((r) => r[0] === measure);
  return row ? { pose: row[1], leg: row[2], mate: row[3], zone: row[4], case: row[5] } : null;
}
