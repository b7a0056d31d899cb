import type { Rule } from "./rule.ts";
import { expectationFails } from "./rules/expectation-fails.ts";
import { expectationThin } from "./rules/expectation-thin.ts";
import { forceExceeded } from "./rules/force-exceeded.ts";
import { freeMotion } from "./rules/free-motion.ts";
import { implausibleDeflection } from "./rules/implausible-deflection.ts";
import { implausibleFrequency } from "./rules/implausible-frequency.ts";
import { lossInTime } from "./rules/loss-in-time.ts";
import { nearResonance } from "./rules/near-resonance.ts";
import { noConvergence } from "./rules/no-convergence.ts";
import { noInertia } from "./rules/no-inertia.ts";
import { nonlinearLinearised } from "./rules/nonlinear-linearised.ts";
import { notDamped } from "./rules/not-damped.ts";
import { notSettled } from "./rules/not-settled.ts";
import { outsideValidity } from "./rules/outside-validity.ts";
import { poorAccuracy } from "./rules/poor-accuracy.ts";
import { recordUndersampled } from "./rules/record-undersampled.ts";
import { startsWithJump } from "./rules/starts-with-jump.ts";
import { staticInstability } from "./rules/static-instability.ts";
import { tooShort } from "./rules/too-short.ts";
import { travelExceeded } from "./rules/travel-exceeded.ts";
import { unreached } from "./rules/unreached.ts";
import { unstableMode } from "./rules/unstable-mode.ts";

/** Every rule, cheap ones first. */
export const RULES: readonly Rule[] = [
  outsideValidity,
  unreached,
  lossInTime,
  nonlinearLinearised,
  startsWithJump,
  noInertia,
  noConvergence,
  freeMotion,
  staticInstability,
  unstableMode,
  nearResonance,
  implausibleDeflection,
  implausibleFrequency,
  poorAccuracy,
  recordUndersampled,
  tooShort,
  notDamped,
  travelExceeded,
  forceExceeded,
  notSettled,
  expectationFails,
  expectationThin,
];
