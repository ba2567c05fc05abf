// One axis of the parallel coordinates, with two grips that set the range of
// designs to keep: by pointer, touch or keys.

function rail(store, a, svg, { T, B, H, W }) {
  const end = H - B;
  const band = s("rect", { x: a.x - 9, width: 18, class: "band" });
  const grips = ["low", "high"].map((which) => s("path", {
    class: `grip ${which}`, tabindex: "0", role: "slider", "aria-orientation": "vertical",
    "aria-label": which === "low" ? `${a.label}: least value kept` : `${a.label}: largest value kept`,
    "aria-valuemin": a.low * a.unit.factor, "aria-valuemax": a.high * a.unit.factor,
    "data-axis": a.key, "data-end": which,
    d: which === "low" ? "M-11 0H11L6 9H-6Z" : "M-11 0H11L6-9H-6Z",
  }));
  const width = Math.min(15, 104);
  const label = fold(a.label, width);
  const node = s("g", { class: "rail" },
    s("line", { x1: a.x, x2: a.x, y1: T, y2: end }),
    label.map((t, k) => s("text", { x: a.x, y: 12 + 12 * k, "text-anchor": "middle", class: a.goal ? "goal" : "" }, t)),
    s("text", { x: a.x, y: T - 12, "text-anchor": "middle", class: "end" }, ""),
    s("text", { x: a.x, y: H - 8, "text-anchor": "middle", class: "end" }, ""),
    s("rect", { x: a.x - 22, y: T, width: 44, height: end - T, class: "touch" }),
    band, ...grips);
  const [highText, lowText] = node.querySelectorAll(".end");

  const range = () => store.ranges.get(a.key) || [a.low, a.high];
  const clip = (v) => Math.max(a.low, Math.min(a.high, v));

  function set(low, high) {
    if (low > high) [low, high] = [high, low];
    low = clip(low);
    high = clip(high);
    store.setRange(a.key, low <= a.low && high >= a.high ? null : [low, high]);
  }

  function draw() {
    const [low, high] = range(), on = store.ranges.has(a.key);
    const y0 = a.y(high), y1 = a.y(low);
    band.setAttribute("y", y0);
    band.setAttribute("height", Math.max(y1 - y0, 1));
    node.classList.toggle("set", on);
    [[grips[0], y1, low], [grips[1], y0, high]].forEach(([g, y, v]) => {
      g.setAttribute("transform", `translate(${a.x} ${y})`);
      g.setAttribute("aria-valuenow", v * a.unit.factor);
      g.setAttribute("aria-valuetext", withUnit(v, a.unit));
    });
    highText.textContent = withUnit(high, a.unit);
    lowText.textContent = withUnit(low, a.unit);
  }

  const value = (e) => {
    const box = svg.getBoundingClientRect();
    return a.v((e.clientY - box.top) * (W / box.width));
  };
  let drag = null, waiting = null;
  const apply = () => {
    waiting = null;
    if (drag && drag.next) set(...drag.next);
  };
  node.addEventListener("pointerdown", (e) => {
    if (e.button !== 0) return;
    const [low, high] = range(), v = value(e);
    if (e.target === grips[0]) drag = { move: (to) => [Math.min(to, high), high] };
    else if (e.target === grips[1]) drag = { move: (to) => [low, Math.max(to, low)] };
    else if (store.ranges.has(a.key) && v > low && v < high) {
      drag = { move: (to) => { const d = Math.max(a.low - low, Math.min(a.high - high, to - v)); return [low + d, high + d]; } };
    } else drag = { move: (to) => [Math.min(v, to), Math.max(v, to)], fresh: true };
    node.setPointerCapture(e.pointerId);
    e.preventDefault();
    if (e.target.focus) e.target.focus({ preventScroll: true });
  });
  node.addEventListener("pointermove", (e) => {
    if (!drag) return;
    drag.next = drag.move(value(e));
    if (drag.fresh && Math.abs(a.y(drag.next[0]) - a.y(drag.next[1])) < 3) drag.next = null;
    if (!waiting) waiting = requestAnimationFrame(apply);
  });
  node.addEventListener("pointerup", () => {
    if (waiting) cancelAnimationFrame(waiting);
    apply();
    drag = null;
    say(`${store.count()} designs kept`);
  });
  node.addEventListener("pointercancel", () => { drag = null; });
  node.addEventListener("dblclick", () => store.setRange(a.key, null));

  grips.forEach((g, k) => g.addEventListener("keydown", (e) => {
    const by = { ArrowUp: 1, ArrowRight: 1, ArrowDown: -1, ArrowLeft: -1, PageUp: 10, PageDown: -10 }[e.key];
    const [low, high] = range();
    if (by) {
      const d = by * (a.high - a.low) / 100;
      k === 0 ? set(Math.min(clip(low + d), high), high) : set(low, Math.max(clip(high + d), low));
    } else if (e.key === "Home") k === 0 ? set(a.low, high) : set(low, low);
    else if (e.key === "End") k === 0 ? set(high, high) : set(low, a.high);
    else if (e.key === "Delete" || e.key === "Backspace" || e.key === "Escape") store.setRange(a.key, null);
    else return;
    e.preventDefault();
    say(`${store.count()} designs kept`);
  }));
  store.on("filter", draw);
  draw();
  return node;
}

// fold breaks a label into two lines at most.
function fold(text, width) {
  if (text.length <= width) return ["", text];
  const parts = text.split(" ");
  let first = parts.shift();
  while (parts.length > 1 && (first + " " + parts[0]).length <= width) first += " " + parts.shift();
  return [first, parts.join(" ")];
}
