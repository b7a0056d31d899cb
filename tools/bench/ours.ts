/** Our side of the benchmark: the same protocol as peer.py, bundled and started by tools/bench.mjs. */
import { createInterface } from "node:readline";
import {
  analyse,
  type FileReader,
  type HistoryAsk,
  type Instance,
  instantiate,
  judge,
  type SweepAsk,
  understand,
} from "../../shared-core/index.ts";

type Command =
  | { readonly do: "load"; readonly row: string; readonly text: string; readonly csv?: string }
  | { readonly do: "run"; readonly repeat: number };

let row = "";
let text = "";
let reader: FileReader = { read: () => ({ ok: false, why: "missing", detail: "" }) };
let instance: Instance | undefined;

const need = <T>(outcome: { ok: true; value: T } | { ok: false; reason: string }): T => {
  if (!outcome.ok) throw new Error(outcome.reason);
  return outcome.value;
};

const undamped = (i: Instance): number[] =>
  need(analyse(i).modes()).modes.flatMap((m) => (m.frequencyHz === null ? [] : [m.frequencyHz]));
const damped = (i: Instance): number[] =>
  need(analyse(i).modes())
    .modes.map((m) => m.dampedFrequencyHz)
    .filter((f) => f > 0)
    .sort((a, b) => a - b);

function sweep(i: Instance): number[] {
  const ask = i.asks.find((a): a is SweepAsk => a.kind === "sweep");
  if (!ask) throw new Error("no sweep");
  const answer = need(analyse(i).sweep(ask));
  const name = ask.of[ask.of.length - 1].text;
  const series = answer.series.get(name);
  if (!series) throw new Error(name);
  const wanted = Array.from(
    { length: 10 },
    (_, k) => ask.fromHz * (ask.toHz / ask.fromHz) ** ((200 * k) / 1999),
  );
  return wanted.map((hz) => {
    const at = nearest(answer.frequencyHz, hz);
    return Math.hypot(series.re[at], series.im[at]);
  });
}

/** Place of the value nearest to `x` in an ascending list. */
function nearest(list: Float64Array, x: number): number {
  let lo = 0;
  let hi = list.length - 1;
  while (hi - lo > 1) {
    const middle = (lo + hi) >> 1;
    if (list[middle] <= x) lo = middle;
    else hi = middle;
  }
  return x - list[lo] <= list[hi] - x ? lo : hi;
}

function history(i: Instance): number[] {
  const ask = i.asks.find((a): a is HistoryAsk => a.kind === "history");
  if (!ask) throw new Error("no history");
  const answer = need(analyse(i).history(ask));
  const series = answer.series.get(ask.of[ask.of.length - 1].text);
  return Array.from({ length: 11 }, (_, k) => series?.values[10_000 * k] ?? Number.NaN);
}

const ROWS: Readonly<Record<string, (i: Instance) => number[]>> = {
  "undamped-general": undamped,
  "undamped-chain": undamped,
  "damped-general": damped,
  "damped-chain": damped,
  "sweep-chain": sweep,
  "sweep-general": sweep,
  "history-one": history,
  "history-all": history,
};

/** Mean seconds of a run, and what the last one gave. */
function run(repeat: number): { seconds: number; values: number[] } {
  const start = process.hrtime.bigint();
  let values: number[] = [];
  for (let k = 0; k < repeat; k++) {
    if (row === "text") values = [understand("bench.thrum", text, reader).diagnostics.length];
    else if (row === "check") values = [judge(understand("bench.thrum", text, reader)).diagnostics.length];
    else if (instance) values = ROWS[row](instance);
  }
  return { seconds: Number(process.hrtime.bigint() - start) / 1e9 / repeat, values };
}

for await (const line of createInterface({ input: process.stdin })) {
  const command: Command = JSON.parse(line);
  if (command.do === "load") {
    ({ row, text } = command);
    const { csv } = command;
    if (csv !== undefined) reader = { read: () => ({ ok: true, text: csv }) };
    const model = understand("bench.thrum", text, reader);
    const faults = model.diagnostics.filter((d) => d.severity === "error");
    if (faults.length > 0) throw new Error(faults[0].message);
    instance = instantiate(model, 0);
    process.stdout.write('{"loaded":true}\n');
  } else {
    const { seconds, values } = run(command.repeat);
    const maxRssMb = process.resourceUsage().maxRSS / 1024;
    process.stdout.write(`${JSON.stringify({ seconds, values, maxRssMb })}\n`);
  }
}
