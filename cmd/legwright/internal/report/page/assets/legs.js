// Bars of what each leg does over all required poses, against its limits.

function legsView(model, d, place) {
  const f = d.fam;
  const coordinate = model.unit(f.coordinate), effort = model.unit(f.effort), rate = model.unit(f.rate), angle = model.unit("rad");
  const word = f.rotary ? "actuator" : "leg";
  const [low, high] = d.range;
  const ticksOf = [];
  const reached = column(d.legs.flatMap((l) => [l[0] ?? NaN, l[2] ?? NaN]), coordinate, 5);
  const levels = [3, 4, 5, 6, 7].map((c) => column(d.legs.map((l) => l[c] ?? NaN), c < 5 ? effort : c === 5 ? rate : angle, 4));
  const used = (leg, k) => {
    const bounded = low !== null && high !== null && k < f.bounded;
    const bar = bounded ? rangeBar(low, high, f.reserve, leg[0], leg[2], leg[1]) : null;
    ticksOf.push(bar ? bar.tick : null);
    return h("td", { class: "num" }, bar ? bar.node : null, `${reached[2 * k]} … ${reached[2 * k + 1]}`);
  };
  const against = (v, limit, text) => h("td", { class: limit !== null && v > limit * (1 + 1e-9) ? "num bad" : "num" },
    limit !== null && v !== null ? levelBar(v, limit) : null, h("span", { class: "figure" }, text));
  const columns = [
    [`${f.rotary ? "angle" : "length"} used`, coordinate, low === null ? "" : `of ${quantity(low, coordinate, 5)} … ${quantity(high, coordinate, 5)}`],
    [f.rotary ? "torque +" : "push", effort, f.push === null ? "" : `of ${quantity(f.push, effort)}`],
    [f.rotary ? "torque −" : "pull", effort, f.pull === null ? "" : `of ${quantity(f.pull, effort)}`],
    ["speed", rate, f.speed === null ? "" : `of ${quantity(f.speed, rate)}`],
    ["base swing", angle, f.base_swing === null ? "" : `of ${quantity(f.base_swing, angle)}`],
    ["platform swing", angle, f.platform_swing === null ? "" : `of ${quantity(f.platform_swing, angle)}`],
  ];
  const now = d.legs.map(() => h("td", { class: "num" }));
  const rows = d.legs.map((leg, k) => h("tr", {}, h("th", { scope: "row" }, k + 1), used(leg, k), now[k],
    [f.push, f.pull, f.speed, f.base_swing, f.platform_swing].map((limit, c) => against(leg[3 + c], limit, levels[c][k]))));
  const head = columns.map(([name, unit, of]) => h("th", { scope: "col", class: "num" }, name, h("small", {}, ` ${unit.symbol} ${of}`)));
  head.splice(1, 0, h("th", { scope: "col", class: "num" }, "as drawn", h("small", {}, ` ${coordinate.symbol}`)));
  add(place, [
    h("h3", {}, `What each ${word} does`),
    noted(`Least and greatest that the duty asks${f.reserve ? `; ${withUnit(f.reserve, coordinate)} kept free at each end` : ""}. Bars: share of the limit that is used.`, h("table", { class: "legs", "aria-label": `what each ${word} does` },
      h("thead", {}, h("tr", {}, h("th", { scope: "col" }, word), head)), h("tbody", {}, rows))),
  ]);
  // The returned function marks the coordinates of the posture drawn.
  return (q) => d.legs.forEach((_, k) => {
    const there = q.length > k && q[k] !== null;
    now[k].textContent = there ? quantity(q[k], coordinate, 5) : "–";
    if (ticksOf[k]) {
      ticksOf[k].style.visibility = there ? "visible" : "hidden";
      if (there) ticksOf[k].setAttribute("transform", `translate(${Math.max(-2, Math.min(102, 100 * (q[k] - low) / (high - low)))} 0)`);
    }
  });
}

// rangeBar shows the part of a range that is used, the reserve at its ends, and a tick to be moved.
function rangeBar(low, high, reserve, from, to, home) {
  const x = (v) => Math.max(0, Math.min(100, 100 * (v - low) / (high - low)));
  const r = Math.min(50, 100 * reserve / (high - low));
  const out = from < low - 1e-9 || to > high + 1e-9;
  const tick = s("path", { d: "M0-2V12", class: "tick" });
  return { tick, node: s("svg", { class: "bar", viewBox: "0 0 100 10", preserveAspectRatio: "none", "aria-hidden": "true" },
    s("rect", { x: 0, y: 0, width: 100, height: 10, class: "whole" }),
    r > 0 ? [s("rect", { x: 0, y: 0, width: r, height: 10, class: "free" }), s("rect", { x: 100 - r, y: 0, width: r, height: 10, class: "free" })] : null,
    s("rect", { x: x(from), y: 2, width: Math.max(x(to) - x(from), 0.5), height: 6, class: out ? "over" : "part" }),
    s("path", { d: `M${x(home)} 2V8`, class: "home" }), tick) };
}

// levelBar shows a value as a share of its limit.
function levelBar(v, limit) {
  const p = limit > 0 ? 100 * v / limit : v > 0 ? 100 : 0;
  return s("svg", { class: "bar short", viewBox: "0 0 100 10", preserveAspectRatio: "none", "aria-hidden": "true" },
    s("rect", { x: 0, y: 0, width: 100, height: 10, class: "whole" }),
    s("rect", { x: 0, y: 2, width: Math.max(0, Math.min(100, p)), height: 6, class: p > 100 + 1e-7 ? "over" : "part" }));
}
