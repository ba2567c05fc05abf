// Families are told apart by shape and word; a colour only helps.

const SHAPES = [
  ["disc", "M0-5A5 5 0 1 1 0 5A5 5 0 1 1 0-5Z"],
  ["square", "M-4.5-4.5H4.5V4.5H-4.5Z"],
  ["triangle", "M0-6L5.5 4.5H-5.5Z"],
  ["diamond", "M0-6.3L5.4 0L0 6.3L-5.4 0Z"],
  ["cross", "M-2-6H2V-2H6V2H2V6H-2V2H-6V-2H-2Z"],
  ["tipped triangle", "M0 6L-5.5-4.5H5.5Z"],
  ["bow", "M-6-5L6 5V-5L-6 5Z"],
  ["star", "M0-6.5L1.8-2H6.4L2.8 1L4 5.8L0 3L-4 5.8L-2.8 1L-6.4-2H-1.8Z"],
  ["bar", "M-2-6.5H2V6.5H-2Z"],
  ["hexagon", "M-3-5.4H3L6 0L3 5.4H-3L-6 0Z"],
  ["ring", "M0-6A6 6 0 1 1 0 6A6 6 0 1 1 0-6ZM0-2.5A2.5 2.5 0 1 0 0 2.5A2.5 2.5 0 1 0 0-2.5Z"],
];

const shapeOf = (model, family) => SHAPES[model.families.indexOf(family) % SHAPES.length];

// sign is a family's shape as a small picture.
function sign(model, family) {
  const [name, path] = shapeOf(model, family);
  return s("svg", { class: `sign tone${model.families.indexOf(family) % 6}`, viewBox: "-8 -8 16 16", width: 16, height: 16, role: "img", "aria-label": name },
    s("path", { d: path }));
}

// familyTag is a family's shape and name.
const familyTag = (model, family) => h("span", { class: "family" }, sign(model, family), " ", given(family));
