/** The frequency ruler of one case. */
import { isSteady } from "../answers/drive-phasor.ts";
import { excitesMode, separationFrom } from "../judgement/drives.ts";
import type { CaseReport, Verdict } from "../judgement/report.ts";
import { elasticModes } from "../judgement/shapes.ts";
import type { CallNode, Expression } from "../syntax/tree.ts";
import { formatNumber } from "../units/show.ts";
import type { Ruler, RulerDrive, RulerLimit, RulerMode } from "./ruler.ts";
import { type AskedOrder, askedOrders } from "./ruler-orders.ts";

/** Modes shown whether or not anything comes near them. */
const ALWAYS = 6;
/** Higher modes are shown up to this multiple of the highest drive or limit, and never more than so many. */
const REACH = 3;
const MOST_MODES = 24;
/** Room at both ends, and the least length of the axis, as frequency ratios. */
const ROOM = 1.3;
const SHORTEST = 4;

/**
 * null: there is no elastic mode and no steady drive.
 * @param earlier the same case at an earlier revision, whose modes are shown beside
 */
export function rulerOf(report: CaseReport, earlier?: CaseReport): Ruler | null {
  const drives = withOrders(steadyDrives(report), askedOrders(report));
  const limits = frequencyLimits(report.verdicts);
  const modes = shownModes(report, [...drives.map(({ toHz }) => toHz), ...limits.map(({ hz }) => hz)]);
  const before = earlier === undefined ? [] : shownModes(earlier, []).slice(0, modes.length);
  const all = [
    ...before.map(({ hz }) => hz),
    ...modes.map(({ hz }) => hz),
    ...drives.flatMap(({ fromHz, toHz }) => [fromHz, toHz]),
    ...limits.map(({ hz }) => hz),
  ].filter((hz) => hz > 0 && Number.isFinite(hz));
  if (all.length === 0) return null;
  const { fromHz, toHz } = ends(all);
  const at = (hz: number): number =>
    hz > 0 ? Math.max(0, Math.min(1, Math.log(hz / fromHz) / Math.log(toHz / fromHz))) : 0;
  const band = report.instance.assembly.resonanceBand;
  return {
    fromHz,
    toHz,
    unit: "Hz",
    ticks: ticksBetween(fromHz, toHz).map(({ hz, major }) => ({
      at: at(hz),
      label: formatNumber(hz),
      major,
    })),
    modes: modes.map((mode) => rulerMode(mode, drives, band, at)),
    drives: drives.map((drive) => rulerDrive(drive, at)),
    limits: limits.map(({ hz, ...limit }) => ({ ...limit, at: at(hz) })),
    earlier: before.map((mode) => earlierMode(mode, at)),
    separations: separations(modes, drives, limits),
    description: describe(modes, drives, limits),
  };
}

interface ShownMode {
  readonly number: number;
  readonly hz: number;
  readonly damping: number;
  /** Names of the drives that excite it. */
  readonly excitedBy: ReadonlySet<string>;
}

interface ShownDrive {
  readonly id: string;
  readonly asked: boolean;
  readonly label: string;
  readonly name: string;
  readonly fromHz: number;
  readonly toHz: number;
}

interface ShownLimit extends Omit<RulerLimit, "at"> {
  readonly hz: number;
}

function shownModes(report: CaseReport, others: readonly number[]): ShownMode[] {
  if (!report.modes.ok) return [];
  const { table } = report.modes;
  const { analysis, instance } = report;
  const highest = REACH * Math.max(0, ...others);
  return elasticModes(table)
    .filter(({ number, frequencyHz }) => number <= ALWAYS || frequencyHz <= highest)
    .slice(0, MOST_MODES)
    .map((mode) => {
      const index = table.modes.indexOf(mode);
      const exciting = instance.assembly.drives.filter((drive) =>
        excitesMode(analysis, instance.assembly, drive, index),
      );
      return {
        number: mode.number,
        hz: mode.frequencyHz,
        damping: mode.dampingRatio ?? 0,
        excitedBy: new Set(exciting.map(({ name }) => name)),
      };
    });
}

function steadyDrives({ instance }: CaseReport): ShownDrive[] {
  return instance.assembly.drives.flatMap((drive) => {
    const band =
      drive.bandHz ?? (drive.writtenHz === undefined ? undefined : [drive.writtenHz, drive.writtenHz]);
    if (band === undefined || !isSteady(drive) || !(Math.min(...band) > 0)) return [];
    const order = drive.shape.kind === "sine" ? drive.shape.order : 1;
    const { name } = drive;
    const label = order === 1 ? name : `${name} (${formatNumber(order)}×)`;
    const [fromHz, toHz] = [Math.min(...band), Math.max(...band)];
    return [{ id: `drive:${name}`, asked: false, label, name, fromHz, toHz }];
  });
}

/** An order at which a drive runs is that drive. */
function withOrders(drives: readonly ShownDrive[], orders: readonly AskedOrder[]): ShownDrive[] {
  const same = (a: number, b: number) => Math.abs(a - b) <= SAME * Math.max(a, b);
  const others = orders.filter(
    ({ fromHz, toHz }) => !drives.some((drive) => same(drive.fromHz, fromHz) && same(drive.toHz, toHz)),
  );
  return [
    ...drives,
    ...others.map(({ name, order, fromHz, toHz, label }) => ({
      id: `order:${name}:${formatNumber(order)}`,
      asked: true,
      label,
      name,
      fromHz,
      toHz,
    })),
  ];
}

/** Relative difference below which two written rates are the same. */
const SAME = 1e-9;

/** Expectations that compare a frequency of a mode with a number, on either side. */
function frequencyLimits(verdicts: readonly Verdict[]): ShownLimit[] {
  return verdicts.flatMap(({ name, value, limit, holds, expectation: { left, right, operator } }) => {
    const [call, hz, less] = isFrequency(left) ? [left, limit, "<"] : [right, value, ">"];
    if (!isFrequency(call) || hz === null || !(hz > 0)) return [];
    const [which] = call.positional;
    const side = operator.startsWith(less) ? "below" : "above";
    return [
      {
        id: `limit:${name}`,
        name,
        hz,
        side,
        mode: which?.kind === "number" ? which.value : null,
        holds,
        label: `${side === "below" ? "≤" : "≥"} ${hertz(hz)}`,
      },
    ];
  });
}

const FREQUENCIES: ReadonlySet<string> = new Set(["natural_frequency", "damped_frequency"]);

const isFrequency = (expression: Expression): expression is CallNode =>
  expression.kind === "call" && FREQUENCIES.has(expression.callee.text);

function rulerMode(
  { number, hz, damping, excitedBy }: ShownMode,
  drives: readonly ShownDrive[],
  band: number,
  at: (hz: number) => number,
): RulerMode {
  return {
    ...drop({ number, hz, damping }, at),
    bandLow: at(hz * (1 - band)),
    bandHigh: at(hz * (1 + band)),
    danger: drives.some(
      ({ name, asked, fromHz, toHz }) =>
        !asked && excitedBy.has(name) && separationFrom([fromHz, toHz], hz) <= band,
    ),
  };
}

const earlierMode = (mode: ShownMode, at: (hz: number) => number): Ruler["earlier"][number] => {
  const { id, says, ...rest } = drop(mode, at);
  return { ...rest, id: `earlier:${id}`, says: `earlier: ${says}` };
};

function drop(
  { number, hz, damping }: Omit<ShownMode, "excitedBy">,
  at: (hz: number) => number,
): Omit<RulerMode, "bandLow" | "bandHigh" | "danger"> {
  // Half-power points of the velocity of one oscillator, exact: their distance is twice the damping ratio.
  const middle = Math.hypot(1, damping);
  return {
    id: `mode:${number}`,
    number,
    at: at(hz),
    label: hertz(hz),
    low: at(hz * (middle - damping)),
    high: at(hz * (middle + damping)),
    says: `mode ${number}, ${hertz(hz)}, damping ratio ${percent(damping)}`,
  };
}

function rulerDrive({ fromHz, toHz, label, ...named }: ShownDrive, at: (hz: number) => number): RulerDrive {
  const rate = fromHz === toHz ? hertz(fromHz) : `${hertz(fromHz)} to ${hertz(toHz)}`;
  const why = named.asked ? `, to be kept clear of by ${named.name}` : "";
  return { ...named, from: at(fromHz), to: at(toHz), label, says: `${label}, ${rate}${why}` };
}

function separations(
  modes: readonly ShownMode[],
  drives: readonly ShownDrive[],
  limits: readonly ShownLimit[],
): Ruler["separations"] {
  return modes.flatMap((mode, i) => {
    const a = `mode:${mode.number}`;
    const name = `mode ${mode.number}`;
    const pair = (b: string, what: string, low: number, high: number) => ({
      a,
      b,
      text: apart(what, low, high, name, mode.hz),
    });
    return [
      ...drives.map(({ id, asked, name: drive, label, fromHz, toHz }) =>
        pair(id, asked ? label : drive, fromHz, toHz),
      ),
      ...limits.map(({ id, name: limit, hz }) => pair(id, limit, hz, hz)),
      ...modes.slice(i + 1).map(({ number, hz }) => pair(`mode:${number}`, `mode ${number}`, hz, hz)),
    ];
  });
}

/** `imbalance is 12 % above mode 1, ratio 1.12`. */
function apart(what: string, low: number, high: number, mode: string, hz: number): string {
  if (low <= hz && hz <= high) return `${what} ${low === high ? "is on" : "runs through"} ${mode}`;
  const nearest = low > hz ? low : high;
  const ratio = nearest / hz;
  if (ratio > 2 || ratio < 0.5) return `${what} is at ${formatNumber(ratio, 3)} times ${mode}`;
  return `${what} is ${percent(Math.abs(ratio - 1))} ${ratio > 1 ? "above" : "below"} ${mode}, ratio ${formatNumber(ratio, 3)}`;
}

function ends(all: readonly number[]): { fromHz: number; toHz: number } {
  let [fromHz, toHz] = [Math.min(...all) / ROOM, Math.max(...all) * ROOM];
  if (toHz / fromHz < SHORTEST) {
    const middle = Math.sqrt(fromHz * toHz);
    [fromHz, toHz] = [middle / Math.sqrt(SHORTEST), middle * Math.sqrt(SHORTEST)];
  }
  return { fromHz, toHz };
}

/** 1, 2, 5 of every decade are labelled on a long axis, every digit on a short one, decades on a very long one. */
function ticksBetween(fromHz: number, toHz: number): { hz: number; major: boolean }[] {
  const decades = Math.log10(toHz / fromHz);
  const labelled = decades < 1.2 ? [1, 2, 3, 4, 5, 6, 8] : decades < 4 ? [1, 2, 5] : [1];
  const ticks: { hz: number; major: boolean }[] = [];
  for (let power = Math.floor(Math.log10(fromHz)); power <= Math.log10(toHz); power++) {
    for (let digit = 1; digit <= 9; digit++) {
      const hz = Number(`${digit}e${power}`);
      if (fromHz <= hz && hz <= toHz) ticks.push({ hz, major: labelled.includes(digit) });
    }
  }
  return ticks;
}

function describe(
  modes: readonly ShownMode[],
  drives: readonly ShownDrive[],
  limits: readonly ShownLimit[],
): string {
  const parts = [
    ...modes.map(({ number, hz }) => `mode ${number} at ${hertz(hz)}`),
    ...drives.map(({ asked, label, name: drive, fromHz, toHz }) => {
      const name = asked ? label : drive;
      return fromHz === toHz
        ? `${name} at ${hertz(fromHz)}`
        : `${name} from ${hertz(fromHz)} to ${hertz(toHz)}`;
    }),
    ...limits.map(({ name, label }) => `limit ${name} ${label}`),
  ];
  return `${parts.join(", ")}.`;
}

const hertz = (hz: number): string => `${formatNumber(hz)} Hz`;
const percent = (share: number): string => `${formatNumber(share * 100, 3)} %`;
