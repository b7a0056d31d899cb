/** Seeded benchmark models, as arrays for the peer and as Thrum text for us. */

/** mulberry32: small, seeded, good enough to scatter stiffnesses. */
export function generator(seed) {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

const four = (x) => Number(x.toPrecision(4));

/**
 * `chain`: masses in a row with non-proportional dashpots; `general`: the same plus cross springs, a dense problem.
 * Springs and dampers are [a, b, value] with b = -1 for ground.
 */
export function benchModel(kind, n, seed = 7) {
  const random = generator(seed + n);
  const mass = Array.from({ length: n }, () => four(1 + 9 * random()));
  const springs = [[0, -1, four(1e5 * (0.5 + random()))]];
  const dampers = [[0, -1, four(20 * (0.5 + random()))]];
  for (let i = 1; i < n; i++) {
    springs.push([i, i - 1, four(1e5 * (0.5 + random()))]);
    dampers.push([i, i - 1, four(20 * (0.2 + random()))]);
  }
  if (kind === "general") {
    for (let i = 0; i < 2 * n; i++) {
      const [a, b] = [Math.floor(random() * n), Math.floor(random() * n)];
      if (a !== b) springs.push([a, b, four(2e4 * (0.5 + random()))]);
    }
  }
  return { mass, springs, dampers, drive: 0, watch: n - 1 };
}

export function modelText(model, { damped = true, ask = "" } = {}) {
  const place = (i) => (i < 0 ? "ground" : `m${i + 1}`);
  const lines = ["thrum 1", ""];
  model.mass.forEach((value, i) => {
    lines.push(`mass m${i + 1} = ${value} kg`);
  });
  model.springs.forEach(([a, b, value], i) => {
    lines.push(`spring k${i + 1} between ${place(a)} and ${place(b)} = ${value} N/m`);
  });
  if (damped) {
    model.dampers.forEach(([a, b, value], i) => {
      lines.push(`damper c${i + 1} between ${place(a)} and ${place(b)} = ${value} N*s/m`);
    });
  }
  return `${lines.join("\n")}\n${ask}`;
}
