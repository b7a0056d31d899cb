import type { DriveInfo, QuantityRef } from "../../mechanics/assembly.ts";
import type { AnswerArguments, SweepAsk } from "../../model/model.ts";
import { fail, succeed } from "../../numerics/outcome.ts";
import type { Quantity } from "../../units/dimension.ts";
import { number, sameDimension } from "../../units/quantity.ts";
import type { Found } from "../found.ts";
import type { Trial } from "../trial.ts";
import { kindOfUnit } from "../unit-text.ts";
import { phasorAt } from "./answer-values.ts";
import { argument, numberOf, sweepOf } from "./arguments.ts";

/**
 * Magnitude of the complex force in an element or group over the amplitude of the ask's one drive at that rate
 * (an unbalance: unbalance (2 pi rate)^2), or of a motion over the drive's motion, like with like.
 */
export function transmissibility(trial: Trial, args: AnswerArguments): Found<Quantity> {
  const ask = sweepOf(args);
  if (!ask.ok) return ask;
  const of = argument(args, "of", "series", "element");
  if (!of.ok) return of;
  const at = numberOf(args, "at");
  if (!at.ok) return at;
  const drive = onlyDrive(trial, ask.value);
  if (!drive.ok) return drive;
  const quantity = of.value.is === "element" ? of.value.force : of.value.quantity;
  const against = amplitudeFor(drive.value, quantity, at.value.value);
  if (!against.ok) return against;
  const response = phasorAt(trial, ask.value, quantity, at.value.value);
  return response.ok ? succeed(number(Math.hypot(...response.value) / against.value)) : response;
}

function onlyDrive(trial: Trial, ask: SweepAsk): Found<DriveInfo> {
  const drives = ask.by.map((index) => trial.instance.assembly.drives[index]);
  if (drives.length === 1) return succeed(drives[0]);
  return drives.length === 0
    ? fail(`no drive acts in \`${ask.name}\``)
    : fail(
        `${drives.length} drives act in \`${ask.name}\`, and a transmissibility is of one: give it by = one drive`,
      );
}

/** Amplitude of the drive in the unit of the quantity: N against N, m/s^2 against m/s^2. */
function amplitudeFor(drive: DriveInfo, quantity: QuantityRef, rateHz: number): Found<number> {
  const omega = 2 * Math.PI * rateHz;
  const { shape } = drive;
  if (shape.kind !== "sine" && shape.kind !== "unbalance" && shape.kind !== "none") {
    return fail(`\`${drive.name}\` is no steady drive`);
  }
  const amplitude =
    shape.kind === "unbalance"
      ? shape.unbalance * omega * omega
      : shape.kind === "sine"
        ? (shape.amplitude ?? 1)
        : 1;
  if (!(Math.abs(amplitude) > 0)) return fail(`the amplitude of \`${drive.name}\` is zero there`);
  if (drive.on.kind === "form") {
    return sameUnit(drive.unit, quantity.unit) ? succeed(Math.abs(amplitude)) : fail(unlike(drive, quantity));
  }
  for (const derivative of [0, 1, 2]) {
    if (sameUnit(quantity.unit, motionUnit(drive.unit, drive.derivative, derivative))) {
      return succeed(Math.abs(amplitude) * omega ** (derivative - drive.derivative));
    }
  }
  return fail(unlike(drive, quantity));
}

const unlike = (drive: DriveInfo, quantity: QuantityRef): string =>
  `\`${quantity.text}\` is in ${quantity.unit} and \`${drive.name}\` in ${drive.unit}: a transmissibility compares like with like`;

function sameUnit(a: string, b: string): boolean {
  return a === b || sameDimension(kindOfUnit(a).dimension, kindOfUnit(b).dimension);
}

/** Unit of another derivative of a motion: from m to m/s^2, from rad/s to rad. */
function motionUnit(unit: string, from: number, to: number): string {
  const base = unit.replace(/\/s(\^2)?$/, "");
  if (from === to) return unit;
  return to === 0 ? base : to === 1 ? `${base}/s` : `${base}/s^2`;
}
