/** Seeded random models and drives: every history satisfies the equations of motion and hides nothing between rows. */
import { describe, expect, it } from "vitest";
import { driveSignal } from "../../shared-core/answers/drive-history.ts";
import { signalDerivatives } from "../../shared-core/answers/drive-signal.ts";
import type { Assembly, DriveInfo, DriveShape } from "../../shared-core/mechanics/assembly.ts";
import { sketch } from "../mechanics/helpers.ts";
import { seeded, unwrap } from "../numerics/helpers.ts";
import {
  elementOf,
  equationError,
  forceOn,
  historyAsk,
  motionDrive,
  motionOf,
  solved,
  startingAt,
  withDrives,
} from "./history-helpers.ts";

const LASTING = 2.5;

function randomModel(seed: number): Assembly {
  const draw = seeded(seed);
  const next = () => (draw() + 1) / 2;
  const pick = <T>(list: readonly T[]): T => list[Math.floor(next() * list.length)];
  const masses = Object.fromEntries(
    Array.from({ length: 1 + Math.floor(4 * next()) }, (_, i) => [`m${i}`, 10 ** (2 * next() - 1)]),
  );
  const junctions = Array.from({ length: Math.floor(3 * next()) }, (_, i) => `j${i}`);
  const places = [...Object.keys(masses), ...junctions];
  const joints = Array.from({ length: places.length + Math.floor(4 * next()) }, (_, i) => {
    const a = places[i] ?? pick(places);
    const b = pick([...places.filter((p) => p !== a), "floor", "ground"]);
    const kind = next();
    if (kind < 0.6)
      return { a, b, stiffness: 10 ** (1 + 3 * next()), damping: next() < 0.4 ? 10 ** (2 * next() - 1) : 0 };
    return kind < 0.9 ? { a, b, damping: 10 ** (3 * next() - 1) } : { a, b, inertance: next() };
  });
  const base = startingAt(
    sketch({
      masses,
      junctions,
      supports: ["floor"],
      joints: [...joints, ...places.map((a) => ({ a, stiffness: 20 }))],
    }),
    { m0: [next() - 0.5, next()] },
  );
  const shape = (): DriveShape => {
    const kind = Math.floor(5 * next());
    if (kind === 0)
      return { kind: "sine", amplitude: 3, frequencyHz: 8 * next(), phase: 6 * next(), order: 1 };
    if (kind === 1) {
      const pulse = pick(["half_sine", "haversine", "triangle", "rectangle", "rising_sawtooth"] as const);
      return {
        kind: "pulse",
        shape: pulse,
        peak: 4,
        duration: 0.01 + 0.4 * next(),
        rise: 0,
        fall: 0,
        start: next(),
      };
    }
    if (kind === 2) return { kind: "step", step: 2, start: next(), rise: next() < 0.5 ? 0 : 0.2 };
    if (kind === 3)
      return { kind: "chirp", fromHz: 1, toHz: 12 * next(), amplitude: 2, lasting: 2, phase: 0 };
    let time = -0.05;
    const times = Float64Array.from({ length: 120 }, () => {
      time += 0.03 * (0.2 + next());
      return time;
    });
    return { kind: "record", samples: { times, values: times.map(() => 4 * next() - 2) } };
  };
  const derivative = pick([0, 1, 2] as const);
  return withDrives(
    base,
    forceOn(base, pick(places), shape()),
    motionDrive(base, "floor", derivative, shape()),
  );
}

/** The force drive's value over the free coordinates. */
function forcesAt(assembly: Assembly, drive: DriveInfo, time: number): Float64Array {
  const { signal } = unwrap(driveSignal(drive, { lasting: LASTING, tolerance: 1e-10, finer: 2 }));
  let piece = 0;
  while (piece + 1 < signal.starts.length && signal.starts[piece + 1] <= time) piece++;
  const value = new Float64Array(5);
  signalDerivatives(signal, piece, time - signal.starts[piece], value);
  const forces = new Float64Array(assembly.free);
  if (drive.on.kind === "form")
    drive.on.form.coordinates.forEach((i) => {
      forces[i] += value[0];
    });
  return forces;
}

describe("random histories", () => {
  it.each(Array.from({ length: 30 }, (_, k) => k + 1))("seed %d", (seed) => {
    const assembly = randomModel(seed);
    const quantities = [
      motionOf(assembly, "m0"),
      motionOf(assembly, "m0", 2),
      elementOf(assembly, "force", "e1"),
    ];
    const run = solved(assembly, historyAsk(LASTING, quantities, { by: [0, 1], step: 0.09 }));
    const answer = unwrap(run.answer());
    for (const t of [0.31, 1.2345, 2.4]) {
      expect(equationError(assembly, run, t, forcesAt(assembly, assembly.drives[0], t))).toBeLessThan(1e-7);
    }
    for (const quantity of quantities) {
      const high = unwrap(run.response.highest(quantity)).value;
      const low = unwrap(run.response.lowest(quantity)).value;
      const most = Math.max(Math.abs(high), Math.abs(low));
      expect(answer.peaks.get(quantity.text)?.value).toBeCloseTo(
        most,
        6 - Math.ceil(Math.log10(most + 1e-9)),
      );
      for (let i = 0; i < 400; i++) {
        const value = unwrap(run.response.at(quantity, (LASTING * (i + 0.37)) / 400));
        expect(value).toBeLessThanOrEqual(high + 1e-8 * most);
        expect(value).toBeGreaterThanOrEqual(low - 1e-8 * most);
      }
    }
  });
});
