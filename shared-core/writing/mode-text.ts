import type { Mode, ModeTable } from "../answers/answer.ts";
import { largestShare } from "../judgement/shapes.ts";
import { percent } from "../judgement/wording.ts";
import { formatNumber } from "../units/show.ts";
import { tableLines } from "./table.ts";
import { inUnit, type UnitView } from "./units/unit-view.ts";

/** Coordinates that move at least this much of the largest are named, up to `NAMED` of them. */
const WORTH_NAMING = 0.05;
const NAMED = 3;

/** The mode table: number, frequency, damping, what moves most, which element strains most. */
export function modeLines(table: ModeTable, coordinates: readonly string[], units: UnitView): string[] {
  const rows = table.modes.map((mode) => [
    mode.number === null ? "–" : String(mode.number),
    frequencyText(mode, units),
    dampingText(mode, units),
    movesMost(mode, coordinates),
    strainsMost(mode),
  ]);
  return tableLines(
    [
      { head: "mode", align: "right" },
      { head: "frequency", align: "right" },
      { head: "damping", align: "right" },
      { head: "moves most", align: "left" },
      { head: "strains most", align: "left" },
    ],
    rows,
  );
}

function frequencyText(mode: Mode, units: UnitView): string {
  if (mode.number === 0) return "free";
  const hertz = mode.frequencyHz ?? mode.dampedFrequencyHz;
  if (mode.number === null && hertz === 0) return "–";
  return inUnit(hertz, units.unitFor("Hz", hertz));
}

/** The ratio; a growing mode and a root without a ratio say how fast they grow or decay. */
function dampingText(mode: Mode, units: UnitView): string {
  const [growth] = mode.eigenvalue;
  const rate = () => inUnit(Math.abs(growth), units.unitFor("1/s", Math.abs(growth)));
  if (mode.dampingRatio !== null && mode.dampingRatio < 0) return `grows ${rate()}`;
  if (mode.dampingRatio !== null) return percent(mode.dampingRatio);
  if (mode.number === 0 && growth === 0) return "";
  return growth > 0 ? `grows ${rate()}` : `decays ${rate()}`;
}

/** `slab 1, unit −0.4`: the undamped shape's largest coordinates, with signs, the largest 1. */
export function movesMost(mode: Mode, coordinates: readonly string[]): string {
  const { re, im } = mode.shape;
  const sizes = coordinates.map((_, i) => (im[i] === 0 ? Math.abs(re[i]) : Math.hypot(re[i], im[i])));
  let top = 0;
  for (const size of sizes) top = Math.max(top, size);
  const worth: number[] = [];
  sizes.forEach((size, i) => {
    if (size > 0 && size >= WORTH_NAMING * top) worth.push(i);
  });
  worth.sort((a, b) => sizes[b] - sizes[a]);
  const named = worth.slice(0, NAMED).map((i) => {
    const share = formatNumber(Number((sizes[i] / top).toPrecision(2)));
    return `${coordinates[i]} ${re[i] < 0 ? "−" : ""}${share}`;
  });
  const more = worth.length - named.length;
  return more > 0 ? `${named.join(", ")}, ${more} more` : named.join(", ");
}

function strainsMost(mode: Mode): string {
  const most = largestShare(mode);
  if (most === undefined || !(most.share > 0)) return "";
  return `${most.name} ${formatNumber(Number((most.share * 100).toPrecision(2)))} %`;
}
