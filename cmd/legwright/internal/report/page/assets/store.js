// What the reader has chosen: the design picked and the one it is held against,
// ranges on axes, families left out, weights. Views listen for what concerns them.

function newStore(model) {
  const n = model.designs.length;
  const heard = { filter: [], pick: [], weights: [], pose: [] };
  const store = {
    model,
    picked: 0,
    other: -1,
    ranges: new Map(), // axis key → [low, high] in SI
    hidden: new Set(), // families
    shown: new Array(n).fill(true),
    weights: model.goals.map((g) => g.weight),
    order: [],
    score: [],
    place: new Array(n).fill(0), // rank of each design, from 1
    filterTime: 0, // ms that the last filter took, drawing included

    on(topic, listener) { heard[topic].push(listener); },

    tell(topic) { for (const listener of heard[topic]) listener(); },

    setRange(key, range) {
      if (range) store.ranges.set(key, range);
      else store.ranges.delete(key);
      store.filter();
    },

    clearRanges() {
      store.ranges.clear();
      store.hidden.clear();
      store.filter();
    },

    showFamily(family, on) {
      if (on) store.hidden.delete(family);
      else store.hidden.add(family);
      store.filter();
    },

    filter() {
      const before = performance.now();
      const tests = [...store.ranges].map(([key, [low, high]]) => {
        const a = model.axes.find((x) => x.key === key);
        return [a.values, low, high >= a.high ? Infinity : high]; // a range up to the top keeps what has no bound
      });
      for (let i = 0; i < n; i++) {
        let keep = !store.hidden.has(model.designs[i].family);
        for (const [values, low, high] of tests) keep = keep && values[i] >= low && values[i] <= high;
        store.shown[i] = keep;
      }
      store.tell("filter");
      store.filterTime = performance.now() - before;
    },

    count: () => store.shown.reduce((sum, keep) => sum + (keep ? 1 : 0), 0),

    pick(i) {
      if (i < 0 || i >= n || i === store.picked) return;
      store.picked = i;
      store.tell("pick");
    },

    against(i) {
      store.other = i;
      store.tell("pick");
    },

    // weigh orders the designs again. Weights that are all 0 change nothing.
    weigh(weights) {
      store.weights = weights;
      if (!(weights.reduce((a, b) => a + b, 0) > 0)) return false;
      const r = ranking(model.designs, model.goals, weights);
      store.order = r.order;
      store.score = r.score;
      r.order.forEach((i, place) => { store.place[i] = place + 1; });
      store.tell("weights");
      return true;
    },
  };
  store.weigh(store.weights);
  return store;
}
