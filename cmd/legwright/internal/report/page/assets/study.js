// What was asked, what was spent, and what the figures leave out.

function titleView(model, place) {
  const { data } = model;
  const title = data.title && data.title.trim() ? data.title : "Study without a title";
  document.title = `${title} – report`;
  const feasible = data.evaluations > 0 ? `, ${digits(100 * data.feasible / data.evaluations, 2)} % of them hold every limit` : "";
  const n = model.designs.length, proved = model.designs.filter((d) => d.proof === "proved").length;
  add(place, [h("h1", { dir: "auto" }, given(title)),
    h("p", { class: "note" }, `${data.evaluations} designs tried${feasible}; ${n} ${n === 1 ? "is" : "are"} left of which none is beaten by another in every goal`,
      model.families.length ? [" (", model.families.map((f, k) => [k ? ", " : "", given(f)]), ")"] : "", ". ",
      proved ? `Limits proved for ${proved} of them.` : "No design is proved.")]);
}

function studyView(model, place) {
  const { data } = model;
  const list = (title, items) => (items && items.length ? h("div", {}, h("h3", {}, title), h("ul", {}, items.map((t) => h("li", {}, given(t))))) : null);
  const spent = `Seed ${data.seed}; ${data.evaluations}${data.budget ? ` of ${data.budget}` : ""} designs tried (${data.status || "finished"}), ${data.evaluations > 0 ? digits(100 * data.feasible / data.evaluations, 2) : 0} % of them feasible; ${data.poses} sampled poses; legwright `;
  add(place, [
    h("div", { class: "pair" },
      h("div", {}, h("p", {}, given(data.brief.paragraph)),
        h("p", {}, spent, given(data.program), "; brief ", given(data.brief.file), " with hash ", h("code", {}, data.brief_hash ? data.brief_hash.slice(0, 16) : "–"), ".")),
      h("div", {}, h("aside", { class: "caution", "aria-label": "caution" }, h("p", {}, h("b", {}, "Caution. "), given(data.full_caution || data.caution))),
        list("What the figures leave out", data.left_out))),
    h("details", {}, h("summary", {}, "The brief as a list, and notes"),
      h("div", { class: "asked" }, list("Zones of required poses", data.brief.zones), list("Load cases", data.brief.cases), list("Limits", data.brief.limits),
        list("What the search could vary", data.brief.open), data.families.length > 1 ? list("Families", data.families.map((f) => `${f.name}: ${f.summary || f.text}`)) : null,
        list("Notes", data.notes))),
  ]);
}

function footerView(model, place) {
  const { data } = model;
  const reference = (data.reference || []).map((v, k) => {
    const g = model.goals[k];
    return g ? `${g.label} ${v === null ? "without bound" : withUnit(v, g.shown)}` : "";
  }).filter(Boolean).join(", ");
  add(place, [h("p", {}, "legwright ", given(data.program), `. Hypervolume of the front ${data.hypervolume === null ? "–" : digits(data.hypervolume, 5)}`,
    reference ? ` against ${reference}` : "", ", for comparing runs of the same brief; it says nothing of a single design."),
  h("p", {}, "The same figures, in full: front.json, front.csv and designs/ in the study folder. This page asks nothing of any network.")]);
}

// helpView stands where no design holds every limit.
function helpView(model, place) {
  empty(place, h("h2", {}, "No design holds every limit"),
    h("p", {}, "What binds, and what would have to give:"),
    h("ul", {}, (model.data.help || []).map((t) => h("li", {}, given(t)))), nearestView(model.data.nearest || []));
}

// nearestView lists the designs that came nearest, with what each breaks.
function nearestView(near) {
  if (!near.length) return null;
  return [h("h3", {}, "The designs that came nearest"),
    table("Each with the limits that it breaks", ["design", "limit it breaks", num("value"), "wanted", num("margin")],
      near.flatMap((d) => d.broken.map(([limit, value, wanted, margin], k) => [k ? "" : d.number, given(limit), num(value), wanted, num(margin)])), { class: "nearest" }),
    h("ul", {}, near.map((d) => h("li", {}, `Design ${d.number}: `, given(d.text))))];
}
