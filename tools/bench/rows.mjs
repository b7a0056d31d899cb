/** The rows of the benchmark table with their aims: ours / peer, or seconds where there is no peer. */
import { benchModel, modelText } from "./model.mjs";
import { SERVER_ROWS } from "./server.mjs";

const row = (name, rowName, shape, n, aim) => ({ name, row: rowName, shape, n, aim });

/** Most coordinates of a long text: more would be too large to compute, and an error. */
const MOST_MASSES = 1990;

/** A text of about so many lines, of every kind of statement that computes: further springs beside the first. */
function longText(lines) {
  const masses = Math.min(Math.floor(lines / 3), MOST_MASSES);
  const model = benchModel("chain", masses);
  for (let i = 1; model.springs.length < lines - 2 * masses; i = (i % (masses - 1)) + 1) {
    model.springs.push([i, i - 1, 1e4 + i]);
  }
  return modelText(model);
}

export const ROWS = [
  { kind: "process", name: "whole process: frequencies", n: 10, aim: 0.5 },
  { kind: "process", name: "whole process: frequencies", n: 200, aim: 0.5 },
  row("undamped modes, general", "undamped-general", "general", 10, 0.6),
  row("undamped modes, general", "undamped-general", "general", 50, 1),
  row("undamped modes, general", "undamped-general", "general", 200, 2),
  row("undamped modes, general", "undamped-general", "general", 500, 2.5),
  row("undamped modes, general", "undamped-general", "general", 1000, 3),
  row("undamped modes, chain", "undamped-chain", "chain", 200, 0.8),
  row("undamped modes, chain", "undamped-chain", "chain", 1000, 1),
  row("damped modes, general", "damped-general", "general", 10, 1),
  row("damped modes, general", "damped-general", "general", 50, 1.5),
  row("damped modes, general", "damped-general", "general", 200, 4),
  row("damped modes, general", "damped-general", "general", 500, 7),
  row("damped modes, chain", "damped-chain", "chain", 200, 0.2),
  row("damped modes, chain", "damped-chain", "chain", 500, 0.3),
  row("damped modes, chain", "damped-chain", "chain", 1000, 0.4),
  row("sweep, 2,000 frequencies, chain", "sweep-chain", "chain", 50, 0.3),
  row("sweep, 2,000 frequencies, chain", "sweep-chain", "chain", 200, 0.3),
  row("sweep, 2,000 frequencies, chain", "sweep-chain", "chain", 1000, 0.3),
  row("sweep, 2,000 frequencies, general", "sweep-general", "general", 10, 1),
  row("sweep, 2,000 frequencies, general", "sweep-general", "general", 50, 1.5),
  row("sweep, 2,000 frequencies, general", "sweep-general", "general", 200, 4),
  row("history, 100,000 steps, one output", "history-one", "general", 2, 0.5),
  row("history, 100,000 steps, one output", "history-one", "general", 10, 0.5),
  row("history, 100,000 steps, one output", "history-one", "general", 50, 0.5),
  row("history, 100,000 steps, all outputs", "history-all", "general", 10, 1),
  row("history, 100,000 steps, all outputs", "history-all", "general", 50, 1.2),
  row("history, 100,000 steps, all outputs", "history-all", "general", 200, 3),
  {
    kind: "alone",
    name: "text, names and units, lines",
    row: "text",
    n: 1000,
    text: () => longText(1000),
    aimSeconds: 0.01,
  },
  {
    kind: "alone",
    name: "text, names and units, lines",
    row: "text",
    n: 10000,
    text: () => longText(10000),
    aimSeconds: 0.1,
  },
  {
    kind: "alone",
    name: "parse and check, lines",
    row: "check",
    n: 1000,
    text: () => longText(1000),
    aimSeconds: 1,
  },
  ...SERVER_ROWS,
];
