// The body of a long table, in parts of which only the first and those near the
// window are laid out; others are as high as they were, or as their rows may be expected to be.

const PART = 30, ROW = 30; // rows of a part, height of a row in px

function windowed() {
  let table = null, parts = [], whole = false;
  const near = new IntersectionObserver((seen) => {
    for (const e of seen) {
      const part = parts.find((p) => p.node === e.target);
      if (part) show(part, e.isIntersecting || whole || part === parts[0]);
    }
  }, { rootMargin: "900px 0px" });

  function show(part, on) {
    if (on === part.shown) return;
    if (!on) {
      if (part.node.contains(document.activeElement)) return;
      if (part.shown) part.height = part.node.getBoundingClientRect().height;
    }
    part.shown = on;
    part.node.replaceChildren(...(on ? part.rows : [part.gap]));
    if (!on) part.gap.style.setProperty("height", `${part.height}px`);
  }

  function rows(list) {
    near.disconnect();
    for (const p of parts) p.node.remove();
    parts = [];
    for (let k = 0; k === 0 || k < list.length; k += PART) {
      const part = { node: h("tbody", {}), gap: h("tr", { class: "gaprow", "aria-hidden": "true" }), rows: list.slice(k, k + PART), shown: null };
      part.height = ROW * part.rows.length;
      show(part, k === 0 || whole);
      part.gap.style.setProperty("height", `${part.height}px`);
      parts.push(part);
    }
    table.append(...parts.map((p) => p.node));
    for (const p of parts) near.observe(p.node);
  }

  const all = (on) => () => {
    whole = on;
    for (const p of parts) if (on) show(p, true);
  };
  addEventListener("beforeprint", all(true));
  addEventListener("afterprint", all(false));
  return { of(node) { table = node; }, rows };
}
