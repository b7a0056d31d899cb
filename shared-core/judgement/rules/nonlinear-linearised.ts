import type { DriveInfo } from "../../mechanics/assembly.ts";
import { formatNumber } from "../../units/show.ts";
import { nameSpan, relatedTo } from "../places.ts";
import type { Rule } from "../rule.ts";
import { quoted } from "../wording.ts";

/**
 * Modes and sweeps hold for small motion about standstill, where the slope of a torque over speed is not that of
 * the running speed: it is left out of them.
 */
export const nonlinearLinearised: Rule = {
  code: "nonlinear-linearised",
  cost: "text",
  check({ model, assembly, instance }) {
    const asks = instance.asks.filter(({ kind }) => kind === "modes" || kind === "sweep");
    return assembly.drives.flatMap((drive) => {
      if (drive.shape.kind !== "speed-curve") return [];
      const { speedsHz } = drive.shape;
      const reach = `${rpm(speedsHz[0])} to ${rpm(speedsHz[speedsHz.length - 1])} rpm`;
      return asks.map((ask) => ({
        span: nameSpan(ask.node),
        message: `${quoted(drive.name)} takes no part in ${quoted(ask.name)}, which holds for small motion about standstill: its torque follows the speed, with rows from ${reach}`,
        hint: `a history follows it; about a running speed it damps with minus its slope there, ${slopes(drive)}, which a damper can stand for`,
        related: relatedTo(model, drive.name, `rows from ${reach}`),
        key: `${ask.name} ${drive.name}`,
      }));
    });
  },
};

/** Speeds of machines are read in rpm. */
const rpm = (hz: number): string => formatNumber(60 * hz);

/** "-2.3 to 0.4 N*m*s/rad between its rows". */
function slopes({ shape }: DriveInfo): string {
  if (shape.kind !== "speed-curve") return "0";
  const { speedsHz, torques } = shape;
  const between = torques.slice(1).map((torque, i) => {
    return (torque - torques[i]) / (2 * Math.PI * (speedsHz[i + 1] - speedsHz[i]));
  });
  const [low, high] = [Math.min(0, ...between), Math.max(0, ...between)];
  return `${formatNumber(low)} to ${formatNumber(high)} N*m*s/rad`;
}
