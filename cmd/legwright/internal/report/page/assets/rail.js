// One axis of the parallel coordinates, with two grips that set the range of
// designs to keep: by pointer, touch or keys. It is drawn about x = 0.

// railY is the height at which a value stands.
const railY = (a, box, v) => box.top + (1 - (v - a.low) / (a.high - a.low)) * (box.bottom - box.top);

function rail(store, a, box) {
  const band = s("rect", { x: -9, width: 18, class: "band" });
  const grips = ["low", "high"].map((which) => s("path", {
    class: `grip ${which}`, tabindex: "0", role: "slider", "aria-orientation": "vertical",
    "aria-label": which === "low" ? `${a.label}: least value kept` : `${a.label}: largest value kept`,
    "aria-valuemin": a.low * a.unit.factor, "aria-valuemax": a.high * a.unit.factor,
    "data-axis": a.key, "data-end": which,
    d: which === "low" ? "M-11 0H11L6 9H-6Z" : "M-11 0H11L6-9H-6Z",
  }));
  const ends = [h0(box.top - 14), h0(box.bottom + 24)];
  const node = s("g", { class: "rail" },
    s("title", {}, a.text || a.label),
    s("line", { x1: 0, x2: 0, y1: box.top, y2: box.bottom }),
    fold(a.label, 14).map((t, k) => s("text", { x: 0, y: 14 + 14 * k, "text-anchor": "middle", class: a.goal ? "goal" : "" }, t)),
    ends,
    s("rect", { x: -22, y: box.top, width: 44, height: box.bottom - box.top, class: "touch" }),
    band, grips);

  function h0(y) { return s("text", { x: 0, y, "text-anchor": "middle", class: "end" }); }

  const range = () => store.ranges.get(a.key) || [a.low, a.high];
  const clip = (v) => Math.max(a.low, Math.min(a.high, v));

  function set(low, high) {
    low = clip(low);
    high = clip(high);
    store.setRange(a.key, low <= a.low && high >= a.high ? null : [low, high]);
  }

  function draw() {
    const [low, high] = range();
    const y0 = railY(a, box, high), y1 = railY(a, box, low);
    band.setAttribute("y", y0);
    band.setAttribute("height", Math.max(y1 - y0, 1));
    node.classList.toggle("set", store.ranges.has(a.key));
    [[grips[0], y1, low], [grips[1], y0, high]].forEach(([g, y, v]) => {
      g.setAttribute("transform", `translate(0 ${y})`);
      g.setAttribute("aria-valuenow", v * a.unit.factor);
      g.setAttribute("aria-valuetext", withUnit(v, a.unit));
    });
    ends[0].textContent = withUnit(high, a.unit);
    ends[1].textContent = withUnit(low, a.unit);
  }

  // value is the value at the height of a pointer.
  const value = (e) => {
    const frame = node.ownerSVGElement.getBoundingClientRect();
    const y = (e.clientY - frame.top) * (box.height / frame.height);
    return a.low + (1 - (y - box.top) / (box.bottom - box.top)) * (a.high - a.low);
  };
  let drag = null, waiting = 0;
  const apply = () => {
    waiting = 0;
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
  });
  node.addEventListener("pointermove", (e) => {
    if (!drag) return;
    drag.next = drag.move(value(e));
    if (drag.fresh && drag.next[1] - drag.next[0] < 0.02 * (a.high - a.low)) drag.next = null;
    if (!waiting) waiting = requestAnimationFrame(apply);
  });
  node.addEventListener("pointerup", () => {
    cancelAnimationFrame(waiting);
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

// fold breaks a label into two lines.
function fold(text, width) {
  if (text.length <= width) return ["", text];
  const parts = text.split(" ");
  let first = parts.shift();
  while (parts.length > 1 && (first + " " + parts[0]).length <= width) first += " " + parts.shift();
  return [first, parts.join(" ")];
}
