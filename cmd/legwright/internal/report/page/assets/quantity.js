// Numbers and units. The data are SI and radians; the table of display units
// comes with the page.

const BARE = { symbol: "", factor: 1, finest: -1 }; // how a number without unit is shown

// digits is a number with so many significant digits at most, without trailing zeros.
function digits(v, n) {
  const r = Number(v.toExponential(Math.max(n - 1, 0)));
  if (r === 0) return "0";
  const a = Math.abs(r);
  if (a >= 1e9 || a < 1e-6) return String(r).replace("-", "−");
  return minus(plain(r));
}

// plain writes a number without exponent.
function plain(r) {
  const t = String(r);
  return t.includes("e") ? r.toFixed(12).replace(/0+$/, "") : t;
}

const minus = (t) => t.replace(/^-/, "−");

// quantity shows an SI value without its unit.
function quantity(si, unit, n = 4) {
  if (si === null || si === undefined || Number.isNaN(si)) return "–";
  if (!Number.isFinite(si)) return si < 0 ? "−∞" : "∞";
  const v = si * unit.factor;
  let places = n;
  if (v !== 0 && unit.finest >= 0) {
    const lead = Math.floor(Math.log10(Math.abs(v)));
    places = Math.max(Math.min(n, lead + 1 + unit.finest), 1);
  }
  return digits(v, places);
}

// withUnit shows an SI value with its unit.
function withUnit(si, unit, n = 4) {
  if (si !== null && si !== undefined && !Number.isNaN(si) && !Number.isFinite(si)) return "without bound";
  const t = quantity(si, unit, n);
  return unit.symbol && t !== "–" ? t + "\u00a0" + unit.symbol : t;
}

// column shows values side by side with the same number of decimals.
function column(values, unit, n = 4, most = n + 2) {
  const shown = values.filter((v) => Number.isFinite(v)).map((v) => v * unit.factor);
  const largest = Math.max(0, ...shown.map(Math.abs));
  const range = shown.length ? Math.max(...shown) - Math.min(...shown) : 0;
  let places = 0;
  if (largest > 0) {
    const lead = Math.floor(Math.log10(largest));
    places = n - 1 - lead;
    if (range > 1e-9 * largest) {
      places = Math.min(Math.max(places, 1 - Math.floor(Math.log10(range))), most - 1 - lead);
    }
    places = Math.min(Math.max(places, 0), 12);
    if (unit.finest >= 0) places = Math.min(places, unit.finest);
  }
  return values.map((v) => (Number.isFinite(v) ? fixed(v * unit.factor, places) : quantity(v, unit)));
}

// fixed is a number with so many decimals, without a minus before zero.
function fixed(v, places) {
  const t = v.toFixed(places);
  return minus(Number(t) === 0 ? (0).toFixed(places) : t);
}

// share is a ratio in percent, with its sign.
function share(v) {
  const p = 100 * v;
  const t = Math.abs(p) < 10 ? fixed(p, 2) : digits(p, 3);
  if (Number(t.replace("−", "-")) === 0) return "0 %";
  return (p > 0 ? "+" : "") + t + "\u00a0%";
}

// ticks are round numbers between two, about so many.
function ticks(low, high, about) {
  if (!(high > low)) return [low];
  const raw = (high - low) / about;
  const ten = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((f) => f * ten).find((f) => f >= raw * 0.999);
  const out = [];
  for (let k = Math.ceil(low / step - 1e-9); k * step <= high + 1e-9 * step; k++) out.push(k * step);
  return out;
}

// words turns a key of the data into words.
const words = (name) => String(name).replaceAll("_", " ");
