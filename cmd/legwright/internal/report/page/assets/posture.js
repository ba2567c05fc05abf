// Postures of machines: all points of a skeleton in the base frame.

const STEP = 1e-5; // of counts in tracks and paths: m or rad

// turned gives the function that takes a point of the platform frame to the base
// frame: R = Rz(yaw) Ry(pitch) Rx(roll), then the platform's origin added.
function turned([x, y, z, roll, pitch, yaw]) {
  const cr = Math.cos(roll), sr = Math.sin(roll), cp = Math.cos(pitch), sp = Math.sin(pitch), cy = Math.cos(yaw), sy = Math.sin(yaw);
  const R = [
    [cy * cp, cy * sp * sr - sy * cr, cy * sp * cr + sy * sr],
    [sy * cp, sy * sp * sr + cy * cr, sy * sp * cr - cy * sr],
    [-sp, cp * sr, cp * cr],
  ];
  return ([a, b, c]) => [
    x + R[0][0] * a + R[0][1] * b + R[0][2] * c,
    y + R[1][0] * a + R[1][1] * b + R[1][2] * c,
    z + R[2][0] * a + R[2][1] * b + R[2][2] * c,
  ];
}

const triples = (flat) => Array.from({ length: flat.length / 3 }, (_, k) => flat.slice(3 * k, 3 * k + 3));

// figure makes what is drawn: points, lines between them, and which of them are joints.
function figure(d, place, moving) {
  const sk = d.fam.skeleton;
  const there = moving.length === 3 * sk.moving; // else no posture: the moving parts are left out
  const points = [...triples(d.raw.fixed), ...triples(d.raw.platform).map(turned(place)), ...(there ? triples(moving) : [])];
  return {
    points,
    lines: sk.lines.filter(([, , p, q]) => p < points.length && q < points.length).map(([kind, leg, p, q]) => ({ kind: sk.kinds[kind], leg, p, q })),
    base: sk.base, joints: sk.joints, tool: sk.tool,
  };
}

// atPose is the figure of a design at one of its own poses: 0 is home.
function atPose(d, k) {
  const pose = d.raw.poses[k];
  return { figure: figure(d, pose.place, pose.moving || []), at: pose.at, q: pose.q, conditioning: null, fails: "" };
}

// atTrack is the figure at a place of a track of the design's detail.
function atTrack(d, track, k, poses) {
  const sk = d.fam.skeleton, n = d.legs.length;
  const take = (list, m, step) => (list || []).slice(m * k, m * k + m).map((v) => v * step);
  const lost = (track.lost || []).includes(k);
  const fail = (track.fails || []).find((f) => f.pose === k);
  return {
    figure: figure(d, take(track.place, 6, STEP), lost ? [] : take(track.moving, 3 * sk.moving, STEP)),
    at: poses.slice(6 * k, 6 * k + 6).map((v) => v * STEP),
    q: lost ? [] : take(track.q, n, STEP),
    conditioning: lost ? null : track.conditioning[k] * 1e-4,
    fails: lost ? "out of reach" : fail ? fail.limit : "",
  };
}

// allPoints are the points of every posture of a design that is shown, so that all of them fit.
function allPoints(model, d) {
  const out = d.raw.poses.flatMap((_, k) => atPose(d, k).figure.points);
  if (d.detail) {
    const { corners } = model.data;
    for (let k = 0; k < corners.length / 6; k++) out.push(...atTrack(d, d.detail.corners, k, corners).figure.points);
  }
  return out;
}

const COORDINATES = ["x", "y", "z", "roll", "pitch", "yaw"];

// poseText is a pose about home in words, without what is zero.
function poseText(model, d, at) {
  const parts = COORDINATES.map((c, k) => {
    const unit = model.unit(k < 3 ? "m" : "rad");
    return d.fam.freedoms.includes(c) && Math.abs(at[k]) * unit.factor >= 0.005 ? `${c} ${fixed(at[k] * unit.factor, k < 3 ? 1 : 2)} ${unit.symbol}` : "";
  }).filter(Boolean);
  return parts.length ? parts.join(", ") : "home";
}
