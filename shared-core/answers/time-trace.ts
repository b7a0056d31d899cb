/** Quantities along a motion: their values, slopes and curvatures, for whole chunks of rows and for single ones. */
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { multiply } from "../numerics/products.ts";
import { type ModalOutput, type ModalSystem, modalDerivative } from "./time-modal.ts";
import { type Chunk, type Grid, type Motion, outputValue } from "./time-motion.ts";
import { DIRECT_ORDERS } from "./time-state.ts";

/** A quantity in modal coordinates: linear + constant + sum of factor * (a + aConstant) * b. */
export interface ModalQuantity {
  readonly linear: ModalOutput;
  readonly constant: number;
  readonly products: readonly {
    readonly factor: number;
    readonly a: ModalOutput;
    readonly aConstant: number;
    readonly b: ModalOutput;
  }[];
}

/** Value, slope and curvature of a quantity at a row. */
export class QuantityReader {
  readonly quantity: ModalQuantity;
  readonly #linear: readonly ModalOutput[];
  readonly #products: readonly {
    readonly factor: number;
    readonly aConstant: number;
    readonly a: readonly ModalOutput[];
    readonly b: readonly ModalOutput[];
  }[];

  constructor(modal: ModalSystem, quantity: ModalQuantity) {
    const three = (output: ModalOutput): ModalOutput[] => {
      const first = modalDerivative(modal, output);
      return [output, first, modalDerivative(modal, first)];
    };
    this.quantity = quantity;
    this.#linear = three(quantity.linear);
    this.#products = quantity.products.map((p) => ({ ...p, a: three(p.a), b: three(p.b) }));
  }

  value(row: Float64Array, inputs: Float64Array): number {
    let sum = outputValue(this.#linear[0], row, inputs) + this.quantity.constant;
    for (const { factor, a, aConstant, b } of this.#products) {
      sum += factor * (outputValue(a[0], row, inputs) + aConstant) * outputValue(b[0], row, inputs);
    }
    return sum;
  }

  slope(row: Float64Array, inputs: Float64Array): number {
    let sum = outputValue(this.#linear[1], row, inputs);
    for (const { factor, a, aConstant, b } of this.#products) {
      const a0 = outputValue(a[0], row, inputs) + aConstant;
      const b0 = outputValue(b[0], row, inputs);
      sum += factor * (outputValue(a[1], row, inputs) * b0 + a0 * outputValue(b[1], row, inputs));
    }
    return sum;
  }

  curvature(row: Float64Array, inputs: Float64Array): number {
    let sum = outputValue(this.#linear[2], row, inputs);
    for (const { factor, a, aConstant, b } of this.#products) {
      const a0 = outputValue(a[0], row, inputs) + aConstant;
      const b0 = outputValue(b[0], row, inputs);
      const cross = 2 * outputValue(a[1], row, inputs) * outputValue(b[1], row, inputs);
      sum += factor * (outputValue(a[2], row, inputs) * b0 + cross + a0 * outputValue(b[2], row, inputs));
    }
    return sum;
  }
}

/** All linear outputs that a set of quantities needs, evaluated for whole chunks at a time. */
export class OutputTable {
  readonly count: number;
  readonly withInputs: boolean;
  readonly #quantities: readonly ModalQuantity[];
  /** width x count and J * DIRECT_ORDERS x count. */
  readonly #factors: Float64Array;
  readonly #direct: Float64Array;
  readonly #width: number;

  constructor(quantities: readonly ModalQuantity[], modal: ModalSystem) {
    const outputs = quantities.flatMap((q) => [q.linear, ...q.products.flatMap((p) => [p.a, p.b])]);
    const count = outputs.length;
    const width = 2 * modal.count + modal.rest;
    this.count = count;
    this.#quantities = quantities;
    this.#width = width;
    this.#factors = new Float64Array(width * count);
    this.#direct = new Float64Array(modal.inputs * DIRECT_ORDERS * count);
    outputs.forEach((output, o) => {
      for (let k = 0; k < modal.count; k++) {
        this.#factors[k * count + o] = output.re[k];
        this.#factors[(modal.count + k) * count + o] = -output.im[k];
      }
      for (let k = 0; k < modal.rest; k++) this.#factors[(2 * modal.count + k) * count + o] = output.rest[k];
      for (let k = 0; k < output.direct.length; k++) this.#direct[k * count + o] = output.direct[k];
    });
    this.withInputs = this.#direct.some((v) => v !== 0);
  }

  #product(chunk: Chunk): Float64Array {
    const { count } = this;
    const width = this.#width;
    if (count === 1) return dots(chunk.rows, this.#factors, chunk.count, width);
    return multiply(chunk.rows, this.#factors, chunk.count, width, count);
  }

  /** Values of the quantities at the rows of a chunk: count rows of quantities, into `out`. */
  values(chunk: Chunk, out: Float64Array): void {
    const { count } = this;
    const plain = this.#product(chunk);
    if (this.withInputs) {
      const directWidth = this.#direct.length / count;
      const direct = multiply(chunk.inputs, this.#direct, chunk.count, directWidth, count);
      for (let p = 0; p < plain.length; p++) plain[p] += direct[p];
    }
    const columns = this.#quantities.length;
    for (let r = 0; r < chunk.count; r++) {
      let at = r * count;
      for (let q = 0; q < columns; q++) {
        const { constant, products } = this.#quantities[q];
        let sum = plain[at++] + constant;
        for (let p = 0; p < products.length; p++) {
          sum += products[p].factor * (plain[at] + products[p].aConstant) * plain[at + 1];
          at += 2;
        }
        out[r * columns + q] = sum;
      }
    }
  }
}

/** Values of quantities along a grid. */
export interface Trace {
  readonly grid: Grid;
  readonly count: number;
  readonly times: Float64Array;
  readonly steps: Int32Array;
  readonly after: Uint8Array;
  /** One array a quantity. */
  readonly values: readonly Float64Array[];
}

/** Follows quantities along a grid; `upTo` of a failure holds what was followed until the motion ran away. */
export function followTrace(
  motion: Motion,
  grid: Grid,
  quantities: readonly ModalQuantity[],
): Outcome<Trace> {
  const table = new OutputTable(quantities, motion.modal);
  const room = grid.segments.length + 1 + motion.line.edges.length;
  const times = new Float64Array(room);
  const steps = new Int32Array(room);
  const after = new Uint8Array(room);
  const values = quantities.map(() => new Float64Array(room));
  const columns = quantities.length;
  let count = 0;
  let buffer = new Float64Array(0);
  const options = { withInputs: table.withInputs, doubleUpTo: table.withInputs ? 2 : -1 };
  const marched = motion.march(grid, options, (chunk) => {
    if (buffer.length < chunk.count * columns) buffer = new Float64Array(chunk.count * columns);
    table.values(chunk, buffer);
    times.set(chunk.times.subarray(0, chunk.count), count);
    steps.set(chunk.steps.subarray(0, chunk.count), count);
    after.set(chunk.after.subarray(0, chunk.count), count);
    for (let q = 0; q < columns; q++) {
      const column = values[q];
      for (let r = 0; r < chunk.count; r++) column[count + r] = buffer[r * columns + q];
    }
    count += chunk.count;
  });
  const trace = { grid, count, times, steps, after, values };
  return marched.ok ? succeed(trace) : fail(marched.reason, trace);
}

function dots(rows: Float64Array, factors: Float64Array, count: number, width: number): Float64Array {
  const out = new Float64Array(count);
  for (let r = 0; r < count; r++) {
    let sum = 0;
    const at = r * width;
    for (let k = 0; k < width; k++) sum += rows[at + k] * factors[k];
    out[r] = sum;
  }
  return out;
}
