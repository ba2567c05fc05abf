// The eye that looks at a machine: parallel projection, so that lengths along
// one direction keep their proportion wherever they are.

const SLANTED = { turn: -0.62, tilt: 0.42, zoom: 1 };

// camera has turn (about the vertical), tilt (above the horizon) and zoom.
function camera() {
  return { ...SLANTED };
}

// sight gives the function that takes a point of the base frame to the drawing:
// [right, down, depth] in metres; depth grows towards the eye. A machine that
// hangs is drawn with its base on top.
function sight(eye, hanging) {
  const ct = Math.cos(eye.turn), st = Math.sin(eye.turn);
  const ce = Math.cos(eye.tilt), se = Math.sin(eye.tilt);
  return (p) => {
    const x = p[0], y = hanging ? -p[1] : p[1], z = hanging ? -p[2] : p[2];
    const right = ct * x - st * y, away = st * x + ct * y;
    return [right, -(ce * z + se * away), ce * -away + se * z];
  };
}

// reach is the centre and the radius of the ball about points.
function reach(points) {
  const low = [Infinity, Infinity, Infinity], high = [-Infinity, -Infinity, -Infinity];
  for (const p of points) {
    for (let k = 0; k < 3; k++) {
      low[k] = Math.min(low[k], p[k]);
      high[k] = Math.max(high[k], p[k]);
    }
  }
  const centre = low.map((l, k) => (l + high[k]) / 2);
  let radius = 0;
  for (const p of points) radius = Math.max(radius, Math.hypot(p[0] - centre[0], p[1] - centre[1], p[2] - centre[2]));
  return { centre, radius: radius || 1 };
}

const ABOVE = { turn: 0, tilt: Math.PI / 2, zoom: 1 };

// usualView is where a design is looked at from first: machines that stay in a plane from above.
const usualView = (d) => (["z", "roll", "pitch"].some((c) => d.fam.freedoms.includes(c)) ? SLANTED : ABOVE);

// VIEWS are the directions that buttons look from.
const VIEWS = [
  ["slanted", SLANTED],
  ["from the front", { turn: 0, tilt: 0, zoom: 1 }],
  ["from the side", { turn: -Math.PI / 2, tilt: 0, zoom: 1 }],
  ["from above", ABOVE],
];

// steer lets pointer and keys turn and zoom a drawing; changed draws it again, usual is the view that 0 sets.
function steer(node, eye, usual, changed) {
  let from = null;
  const turn = (right, up) => {
    eye.turn += right;
    eye.tilt = Math.max(-Math.PI / 2, Math.min(Math.PI / 2, eye.tilt + up));
    changed();
  };
  const zoom = (factor) => {
    eye.zoom = Math.max(0.4, Math.min(8, eye.zoom * factor));
    changed();
  };
  node.addEventListener("pointerdown", (e) => {
    if (e.button !== 0) return;
    from = [e.clientX, e.clientY];
    node.setPointerCapture(e.pointerId);
  });
  node.addEventListener("pointermove", (e) => {
    if (!from) return;
    turn(-(e.clientX - from[0]) * 0.008, (e.clientY - from[1]) * 0.008);
    from = [e.clientX, e.clientY];
  });
  for (const end of ["pointerup", "pointercancel"]) node.addEventListener(end, () => { from = null; });
  node.addEventListener("wheel", (e) => {
    if (!e.ctrlKey && document.activeElement !== node) return; // the page scrolls past a drawing that is not in use
    e.preventDefault();
    zoom(Math.exp(-e.deltaY * 0.0015));
  }, { passive: false });
  const keys = {
    ArrowLeft: () => turn(0.1, 0), ArrowRight: () => turn(-0.1, 0),
    ArrowUp: () => turn(0, 0.1), ArrowDown: () => turn(0, -0.1),
    "+": () => zoom(1.2), "=": () => zoom(1.2), "-": () => zoom(1 / 1.2),
    0: () => { Object.assign(eye, usual()); changed(); },
  };
  node.addEventListener("keydown", (e) => {
    if (!keys[e.key] || e.ctrlKey || e.metaKey || e.altKey) return;
    e.preventDefault();
    keys[e.key]();
  });
  return { zoom };
}
