// The order of the designs under weights: closeness to the ideal (TOPSIS, Hwang
// and Yoon 1981), digit for digit as the program computes it: the same
// operations in the same order.

// topsis gives the closeness of each row of values, 1 at best.
function topsis(values, maximise, weights) {
  let total = 0;
  for (const w of weights) total += w;
  const plus = new Float64Array(values.length);
  const minus = new Float64Array(values.length);
  for (let k = 0; k < maximise.length; k++) {
    let big = 0;
    for (const row of values) big = Math.max(big, Math.abs(row[k]));
    if (big === 0) continue;
    let norm = 0, best = -Infinity, worst = Infinity;
    for (const row of values) {
      const v = row[k] / big;
      norm += v * v;
      best = Math.max(best, v);
      worst = Math.min(worst, v);
    }
    if (!maximise[k]) [best, worst] = [worst, best];
    const w = weights[k] / total / Math.sqrt(norm);
    for (let i = 0; i < values.length; i++) {
      const v = values[i][k] / big;
      plus[i] += (w * (v - best)) * (w * (v - best));
      minus[i] += (w * (v - worst)) * (w * (v - worst));
    }
  }
  return Array.from(plus, (_, i) => {
    const p = Math.sqrt(plus[i]), q = Math.sqrt(minus[i]);
    return p + q > 0 ? q / (p + q) : 1;
  });
}

// goalValues has a row for each design and a column for each goal. A value
// without bound counts as the worst that any design has.
function goalValues(designs, goals) {
  const rows = designs.map((d) => goals.map((g) => d.measures[g.measure] ?? NaN));
  goals.forEach((g, k) => {
    let worst = NaN;
    for (const row of rows) {
      const v = row[k];
      if (Number.isFinite(v) && (Number.isNaN(worst) || (v < worst) === g.more)) worst = v;
    }
    if (Number.isNaN(worst)) worst = 0;
    for (const row of rows) if (!Number.isFinite(row[k])) row[k] = worst;
  });
  return rows;
}

// ranking orders designs under weights: their indices, best first, and the score of each.
function ranking(designs, goals, weights) {
  const rows = goalValues(designs, goals);
  const more = goals.map((g) => g.more);
  const byGoals = (a, b) => {
    for (let k = 0; k < more.length; k++) {
      const x = rows[a][k], y = rows[b][k];
      if (x !== y) return (x > y) === more[k] ? -1 : 1;
    }
    return designs[a].id < designs[b].id ? -1 : designs[a].id > designs[b].id ? 1 : 0;
  };
  // Sums are taken in the order of the goals, so that the order given changes no last digit.
  const start = designs.map((_, i) => i).sort(byGoals);
  const closeness = topsis(start.map((i) => rows[i]), more, weights);
  const score = new Float64Array(designs.length);
  start.forEach((i, place) => { score[i] = closeness[place]; });
  const order = start.sort((a, b) => score[b] - score[a] || byGoals(a, b));
  return { order, score };
}
