// The postures that a design is shown in: home and the deciding ones, the path
// through the duty, the outermost poses.

function poseControl(store, view, changed) {
  const { model } = store;
  const { data } = model;
  const place = h("div", { class: "poses" });
  const status = h("p", { class: "status", role: "status" });
  let d = null, timer = 0, slider = null;

  function show(kind, k, why, hot) {
    const p = kind === "path" ? atTrack(d, d.detail.path, k, data.path)
      : kind === "corner" ? atTrack(d, d.detail.corners, k, data.corners) : atPose(d, k);
    view.show([{ figure: p.figure, cls: "", hot }], null, data.hanging);
    const where = poseText(model, d, p.at);
    const parts = [why && why !== where ? why + ": " : "", where];
    if (kind === "path") parts.push(` (pose ${k} of ${data.path.length / 6 - 1} of the path${data.way.includes(k) ? ", required" : ", on the way"})`);
    if (p.conditioning !== null) parts.push(`; conditioning ${digits(p.conditioning, 3)}`);
    empty(status, parts.join(""), p.fails ? h("span", { class: "bad" }, " ", given(words(p.fails)), p.fails === "out of reach" ? "" : " fails here") : null);
    changed(p);
  }

  function stop() {
    clearInterval(timer);
    timer = 0;
    const play = place.querySelector("[data-do=play]");
    if (play) play.textContent = "move";
  }

  function play() {
    if (timer) return stop();
    place.querySelector("[data-do=play]").textContent = "stop";
    const last = data.path.length / 6;
    timer = setInterval(() => {
      slider.value = (Number(slider.value) + 1) % last;
      show("path", Number(slider.value));
    }, 70);
  }

  function build() {
    stop();
    const home = button("home", () => { stop(); show("pose", 0, "home"); }, { "data-do": "home" });
    if (!d.detail) {
      slider = null;
      empty(place, h("div", { class: "fields" }, home), h("p", { class: "note" },
        "The path through the duty, maps and sensitivities are here for the best and the marked designs. For this one write: ", h("code", {}, `legwright report ${model.folder} --detail ${d.id}`)));
      return;
    }
    const corners = data.corners.length / 6;
    slider = h("input", { type: "range", min: 0, max: data.path.length / 6 - 1, step: 1, value: 0, "data-do": "path",
      oninput: () => { stop(); show("path", Number(slider.value)); } });
    const corner = h("select", { "data-do": "corner", onchange: () => { stop(); show("corner", Number(corner.value), "far out"); } },
      Array.from({ length: corners }, (_, k) => h("option", { value: k }, `${k + 1}: ${poseText(model, d, data.corners.slice(6 * k, 6 * k + 6).map((v) => v * STEP))}`)));
    empty(place,
      h("label", { class: "path" }, h("span", {}, "through the duty"), slider),
      h("div", { class: "fields" }, home, button("move", play, { "data-do": "play" }),
        corners ? h("label", { class: "field" }, h("span", {}, "poses that lie farthest out"), corner) : null));
  }

  return {
    place, status,
    design(next) {
      d = next;
      view.look(usualView(d));
      view.show([], allPoints(model, d), data.hanging);
      build();
      show("pose", 0, "home");
    },
    // deciding shows the pose that decides a measure, with the legs that do.
    deciding(measure, label) {
      stop();
      const w = deciding(d, measure);
      show("pose", w.pose, `${label} is decided here`, [w.leg, w.mate].filter((l) => l > 0));
    },
  };
}
