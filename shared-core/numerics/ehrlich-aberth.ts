/**
 * All roots of a real function known only through f′/f, by simultaneous Newton steps that repel each other.
 *
 * Method: Ehrlich-Aberth (Aberth, Mathematics of Computation 27, 1973; for quadratic eigenproblems Bini & Noferini,
 * Linear Algebra Appl. 439, 2013). Roots are real or in conjugate pairs; a pair is one item with positive
 * imaginary part and moves with its mirror image. An item that cannot settle is split into two real ones, and
 * two restless real ones are joined to a pair, since neither kind can turn into the other by small steps.
 */

export type RootItems = {
  /** Imaginary part 0: a single real root; positive: a pair. */
  re: number[];
  im: number[];
};

/** Evaluations of f′/f allowed, for each root on average; four to six are usual. */
const EVALUATIONS_PER_ROOT = 40;
/** Steps after which an item near the real axis, or a real one, is taken to be of the wrong kind. */
const RESTLESS = 12;
/** Imaginary part, relative to the real one, up to which a pair may be two real roots. */
const NEAR_AXIS = 0.3;
/** Times that items may change their kind, for each root on average. */
const CHANGES_PER_ROOT = 2;

/**
 * Improves `items` in place until every Newton step is below `tolerance` times |z|. `logDerivative(re, im, out)`
 * writes f′/f at z into out[0], out[1] (NaN or ∞ where f vanishes: the item has arrived). `zeros` more roots
 * are known to lie at the origin. Returns false at the caps.
 */
export function ehrlichAberth(
  items: RootItems,
  zeros: number,
  tolerance: number,
  logDerivative: (re: number, im: number, out: Float64Array) => void,
): boolean {
  const roots = zeros + items.re.reduce((sum, _, j) => sum + (items.im[j] > 0 ? 2 : 1), 0);
  let budget = EVALUATIONS_PER_ROOT * roots;
  let changes = CHANGES_PER_ROOT * roots;
  /** Steps since an item came to be; −1 once it has settled. */
  let age = items.re.map(() => 0);
  const out = new Float64Array(2);
  while (budget > 0) {
    let moving = 0;
    let doubtful = 0;
    for (let j = 0; j < items.re.length; j++) {
      if (age[j] < 0) continue;
      const x = items.re[j];
      const y = items.im[j];
      budget--;
      logDerivative(x, y, out);
      if (!Number.isFinite(out[0]) || !Number.isFinite(out[1])) {
        age[j] = -1;
        continue;
      }
      const gr = out[0];
      const gi = out[1];
      repulsion(items, j, zeros, out);
      // Step = 1 / (f′/f − Σ 1/(z − zₖ)); Newton's own is 1 / (f′/f).
      const dr = gr - out[0];
      const di = gi - out[1];
      const square = dr * dr + di * di;
      const size = Math.sqrt(x * x + y * y);
      if (1 <= tolerance * size * Math.sqrt(gr * gr + gi * gi)) {
        age[j] = -1;
        continue;
      }
      moving++;
      age[j]++;
      if (age[j] > RESTLESS && y <= NEAR_AXIS * Math.abs(x)) doubtful++;
      if (!(square > 0)) continue;
      items.re[j] = x - dr / square;
      if (y > 0) {
        // A pair's head stays above the axis; below it, it is its own mirror image.
        items.im[j] = Math.abs(y + di / square);
        if (items.im[j] === 0) items.im[j] = y;
      }
    }
    if (moving === 0) return true;
    if (doubtful > 0) {
      changes -= doubtful;
      if (changes < 0) return false;
      age = changeKinds(items, age);
    }
  }
  return false;
}

/** Σ 1/(zⱼ − zₖ) over all other roots, mirror images included. */
function repulsion(items: RootItems, j: number, zeros: number, out: Float64Array): void {
  const { re, im } = items;
  const x = re[j];
  const y = im[j];
  let sr = 0;
  let si = 0;
  for (let k = 0; k < re.length; k++) {
    if (k === j) continue;
    const dx = x - re[k];
    const up = y - im[k];
    const square = dx * dx + up * up;
    if (square === 0) continue;
    const inverse = 1 / square;
    sr += dx * inverse;
    si -= up * inverse;
    if (im[k] === 0) continue;
    const down = y + im[k];
    const other = 1 / (dx * dx + down * down);
    sr += dx * other;
    si -= down * other;
  }
  if (y > 0) si -= 1 / (2 * y);
  if (zeros > 0) {
    const square = x * x + y * y;
    if (square > 0) {
      sr += (zeros * x) / square;
      si -= (zeros * y) / square;
    }
  }
  out[0] = sr;
  out[1] = si;
}

/** Splits doubtful pairs, joins neighbouring doubtful reals; returns the new ages. */
function changeKinds(items: RootItems, age: readonly number[]): number[] {
  const re: number[] = [];
  const im: number[] = [];
  const ages: number[] = [];
  const put = (x: number, y: number, a: number) => {
    re.push(x);
    im.push(y);
    ages.push(a);
  };
  const reals: number[] = [];
  for (let j = 0; j < items.re.length; j++) {
    const [x, y] = [items.re[j], items.im[j]];
    if (age[j] <= RESTLESS || y > NEAR_AXIS * Math.abs(x)) put(x, y, age[j]);
    else if (y === 0) reals.push(x);
    else {
      put(x - y, 0, 0);
      put(x + y, 0, 0);
    }
  }
  reals.sort((a, b) => a - b);
  for (let t = 0; t < reals.length; t += 2) {
    if (t + 1 === reals.length) put(reals[t], 0, 0);
    else {
      const half = 0.5 * (reals[t + 1] - reals[t]);
      put(0.5 * (reals[t] + reals[t + 1]), half > 0 ? half : 1e-3 * Math.abs(reals[t]), 0);
    }
  }
  items.re.splice(0, items.re.length, ...re);
  items.im.splice(0, items.im.length, ...im);
  return ages;
}
