import { describe, expect, it } from "vitest";
import { packedSignal, type Signal, signalFrom } from "../../shared-core/answers/drive-signal.ts";
import { modalOutput, modalState, modalSystem } from "../../shared-core/answers/time-modal.ts";
import { Motion, outputValue } from "../../shared-core/answers/time-motion.ts";
import { phiFunctions, sineResponse } from "../../shared-core/answers/time-phi.ts";
import {
  DIRECT_ORDERS,
  type StateForm,
  withoutInputDerivatives,
} from "../../shared-core/answers/time-state.ts";
import { matrixExponential } from "../../shared-core/numerics/matrix-exponential.ts";
import { product, seeded, unwrap } from "../numerics/helpers.ts";

/** State of z' = A z + B u after `steps` of length h with u linear between its values: exponential of [A B 0; 0 0 I; 0]. */
function reference(system: StateForm, z0: Float64Array, values: readonly number[], h: number): Float64Array {
  const n = system.size;
  const width = n + 2;
  const m = new Float64Array(width * width);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) m[i * width + j] = system.a[i * n + j] * h;
    m[i * width + n] = system.b[i] * h;
  }
  m[n * width + n + 1] = 1;
  const step = unwrap(matrixExponential(m, width));
  let z = Float64Array.from(z0);
  for (let k = 0; k + 1 < values.length; k++) {
    const full = Float64Array.from([...z, values[k], values[k + 1] - values[k]]);
    z = Float64Array.from(product(step, full, width, width, 1).subarray(0, n));
  }
  return z;
}

function record(values: readonly number[], h: number): Signal {
  const pieces = values.length - 1;
  const coefficients = new Float64Array(2 * pieces);
  for (let k = 0; k < pieces; k++) {
    coefficients[2 * k] = values[k];
    coefficients[2 * k + 1] = (values[k + 1] - values[k]) / h;
  }
  return packedSignal({
    starts: Float64Array.from({ length: pieces }, (_, k) => k * h),
    order: 2,
    coefficients,
    omega: 0,
    sineRe: new Float64Array(pieces),
    sineIm: new Float64Array(pieces),
  });
}

const whole = (n: number) => [Array.from({ length: n }, (_, i) => i)];

/** Every state of the motion at its end. */
function finalStates(system: StateForm, signals: readonly Signal[], duration: number, z0: Float64Array) {
  const modal = modalSystem(system, whole(system.size));
  const motion = new Motion(modal, signals, duration, modalState(modal, z0));
  const row = new Float64Array(motion.width);
  const inputs = new Float64Array(signals.length * DIRECT_ORDERS);
  unwrap(motion.rowAt(duration, "before", row, inputs));
  const z = Float64Array.from({ length: system.size }, (_, i) => {
    const state = new Float64Array(system.size);
    state[i] = 1;
    return outputValue(modalOutput(modal, { state, direct: new Float64Array(inputs.length) }), row, inputs);
  });
  return { z, modal };
}

function compare(system: StateForm, tolerance: number) {
  const next = seeded(3);
  const h = 0.02;
  const values = Array.from({ length: 101 }, () => next());
  const z0 = Float64Array.from({ length: system.size }, () => next());
  const { z, modal } = finalStates(system, [record(values, h)], 100 * h, z0);
  const exact = reference(system, z0, values, h);
  const scale = Math.max(...exact.map(Math.abs));
  z.forEach((v, i) => {
    expect(Math.abs(v - exact[i]), `state ${i}`).toBeLessThan(tolerance * scale);
  });
  return modal;
}

describe("motion against the exponential of the augmented matrix", () => {
  it.each([1, 2, 3, 4])("agrees for seeded stable matrices (seed %d)", (seed) => {
    const next = seeded(seed);
    const n = 3 + seed * 2;
    const a = Float64Array.from({ length: n * n }, () => 6 * next());
    for (let i = 0; i < n; i++) a[i * n + i] -= 8;
    const b = Float64Array.from({ length: n }, () => next());
    expect(compare({ size: n, a, inputs: 1, b }, 1e-11).rest).toBe(0);
  });

  it("keeps a free body's double root of zero in its block", () => {
    // Two masses with a damper between them and one spring: nothing holds them together.
    const a = Float64Array.from([0, 0, 1, 0, 0, 0, 0, 1, -30, 30, -0.6, 0.6, 20, -20, 0.4, -0.4]);
    const modal = compare({ size: 4, a, inputs: 1, b: Float64Array.of(0, 0, 1, 0) }, 1e-11);
    expect([modal.count, modal.rest]).toEqual([1, 2]);
  });

  it("keeps a defective root of three in its block, beside roots it splits off", () => {
    // A Jordan block of three at -2, two plain roots, mixed by a similarity.
    const n = 5;
    const jordan = Float64Array.from([
      -2, 1, 0, 0, 0, 0, -2, 1, 0, 0, 0, 0, -2, 0, 0, 0, 0, 0, -5, 0, 0, 0, 0, 0, 1,
    ]);
    const next = seeded(8);
    const mix = Float64Array.from({ length: n * n }, (_, p) => (p % (n + 1) === 0 ? 1 : 0) + 0.3 * next());
    const inverse = invert(mix, n);
    const a = Float64Array.from(product(product(mix, jordan, n, n, n), inverse, n, n, n));
    const modal = compare({ size: n, a, inputs: 1, b: Float64Array.of(1, 0, 2, 0, 1) }, 1e-9);
    expect([modal.count, modal.rest]).toEqual([2, 3]);
  });

  it("keeps a doubly oscillating root with one vector in its block", () => {
    // x'' + w^2 x = y, y'' + w^2 y = u: resonance of an oscillator by another, and two more states.
    const w2 = 40;
    const a = new Float64Array(36);
    const put = (i: number, j: number, v: number) => {
      a[i * 6 + j] = v;
    };
    put(0, 1, 1);
    put(1, 0, -w2);
    put(1, 2, 1);
    put(2, 3, 1);
    put(3, 2, -w2);
    put(4, 5, 1);
    put(5, 4, -9);
    put(5, 5, -0.5);
    put(5, 0, 0.7);
    const modal = compare({ size: 6, a, inputs: 1, b: Float64Array.of(0, 0, 0, 1, 0, 0) }, 1e-9);
    expect([modal.count, modal.rest]).toEqual([1, 4]);
  });
});

describe("inputs in closed form", () => {
  const system: StateForm = {
    size: 2,
    a: Float64Array.of(0, 1, -25, -0.4),
    inputs: 1,
    b: Float64Array.of(0, 1),
  };

  it("takes a cubic and a sinusoid on one piece as RK4 with tiny steps does", () => {
    const u = (t: number) => 1 - 2 * t + 3 * t * t - t ** 3 + 0.7 * Math.cos(9 * t) + 0.2 * Math.sin(9 * t);
    const signal = signalFrom([{ start: 0, polynomial: [1, -2, 3, -1], sine: [0.7, -0.2] }], 9);
    const { z } = finalStates(system, [signal], 1.5, Float64Array.of(0.1, 0));
    // Classical Runge-Kutta, error (h w)^4: 1e-12 at h = 1e-4.
    let [x, v] = [0.1, 0];
    const h = 1e-4;
    const f = (t: number, p: number, q: number) => [q, -25 * p - 0.4 * q + u(t)];
    for (let k = 0; k < 15000; k++) {
      const t = k * h;
      const [a1, b1] = f(t, x, v);
      const [a2, b2] = f(t + h / 2, x + (h / 2) * a1, v + (h / 2) * b1);
      const [a3, b3] = f(t + h / 2, x + (h / 2) * a2, v + (h / 2) * b2);
      const [a4, b4] = f(t + h, x + h * a3, v + h * b3);
      x += (h / 6) * (a1 + 2 * a2 + 2 * a3 + a4);
      v += (h / 6) * (b1 + 2 * b2 + 2 * b3 + b4);
    }
    expect(z[0]).toBeCloseTo(x, 10);
    expect(z[1]).toBeCloseTo(v, 9);
  });

  it("drops the derivatives of inputs without changing the transfer function", () => {
    const next = seeded(21);
    const n = 3;
    const draw = (count: number) => Float64Array.from({ length: count }, () => next());
    const raw = { size: n, a: draw(9), inputs: 1, b0: draw(3), b1: draw(3), b2: draw(3) };
    const { system: clean, p0, p1 } = withoutInputDerivatives(raw);
    for (const s of [0.7, -2.3, 5]) {
      const m = raw.a.map((v, p) => (p % 4 === 0 ? s : 0) - v);
      const inverse = invert(m, n);
      const direct = product(
        inverse,
        raw.b0.map((v, i) => v + s * raw.b1[i] + s * s * raw.b2[i]),
        n,
        n,
        1,
      );
      const z = product(inverse, clean.b, n, n, 1);
      direct.forEach((v, i) => {
        expect(z[i] + p0[i] + s * p1[i]).toBeCloseTo(v, 11);
      });
    }
  });
});

describe("phi functions", () => {
  it("agrees on both sides of the change between series and recurrence", () => {
    // phi_k(x) by its integral is sum x^j / (j + k)!; summed in plain order, all terms positive.
    const re = new Float64Array(9);
    const im = new Float64Array(9);
    for (const x of [1e-9, 0.3, 1.999, 2.001, 4]) {
      phiFunctions(x, 0, 8, re, im);
      for (let k = 0; k <= 8; k++) {
        let factorial = 1;
        for (let q = 2; q <= k; q++) factorial *= q;
        let term = 1 / factorial;
        let sum = 0;
        for (let j = 0; j < 60; j++) {
          sum += term;
          term *= x / (j + k + 1);
        }
        expect(Math.abs(re[k] / sum - 1), `phi_${k}(${x})`).toBeLessThan(1e-11);
        expect(im[k]).toBe(0);
      }
    }
  });

  it("keeps phi(conj z) = conj phi(z) and the recurrence for complex arguments", () => {
    const [a, b, c, d] = Array.from({ length: 4 }, () => new Float64Array(5));
    for (const [x, y] of [
      [-0.2, 1.1],
      [-30, 400],
      [0, 2],
      [-1e4, 0],
    ]) {
      phiFunctions(x, y, 4, a, b);
      phiFunctions(x, -y, 4, c, d);
      a.forEach((v, k) => {
        expect(c[k]).toBe(v);
        expect(d[k]).toBeCloseTo(-b[k], 300);
      });
      // z phi_2 = phi_1 - 1.
      expect(x * a[2] - y * b[2]).toBeCloseTo(a[1] - 1, 13);
      expect(x * b[2] + y * a[2]).toBeCloseTo(b[1], 13);
    }
  });

  it("passes through resonance smoothly", () => {
    const out = new Float64Array(2);
    sineResponse(0, 50, 50, 3, out);
    // t e^(i w t) exactly at resonance.
    expect(out[0]).toBeCloseTo(3 * Math.cos(150), 13);
    expect(out[1]).toBeCloseTo(3 * Math.sin(150), 13);
    sineResponse(0, 50, 50 * (1 + 1e-9), 3, out);
    expect(out[0]).toBeCloseTo(3 * Math.cos(150), 6);
    sineResponse(-1e6, 0, 50, 3, out);
    expect(Number.isFinite(out[0]) && Number.isFinite(out[1])).toBe(true);
  });
});

function invert(a: Float64Array, n: number): Float64Array {
  // Gauss-Jordan with row pivoting, apart from the code under test.
  const m = Array.from({ length: n }, (_, i) => [
    ...a.subarray(i * n, (i + 1) * n),
    ...Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)),
  ]);
  for (let k = 0; k < n; k++) {
    let best = k;
    for (let i = k; i < n; i++) if (Math.abs(m[i][k]) > Math.abs(m[best][k])) best = i;
    [m[k], m[best]] = [m[best], m[k]];
    const pivot = m[k][k];
    m[k] = m[k].map((v) => v / pivot);
    for (let i = 0; i < n; i++) {
      const factor = m[i][k];
      if (i !== k) m[i] = m[i].map((v, j) => v - factor * m[k][j]);
    }
  }
  return Float64Array.from(m.flatMap((row) => row.slice(n)));
}
