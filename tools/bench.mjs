/**
 * Speed beside a NumPy and SciPy script, in one interleaved run: `npm run bench [-- PART OF A ROW'S NAME]`.
 * Prints a table with our time, the peer's (best of one and two threads), the ratio, the aim, the largest
 * difference of the answers and the peak memory of both. Only ratios of one run mean anything.
 */
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdirSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { join } from "node:path";
import { createInterface } from "node:readline";
import { benchModel, generator, modelText } from "./bench/model.mjs";
import { ROWS } from "./bench/rows.mjs";
import { build } from "./build.mjs";
import { root } from "./root.mjs";

const RUNS = 7;
/** What takes less is repeated inside each process, which gives the mean: waking it would be most of the time. */
const LEAST_SECONDS = 5e-3;
/** Each side's runs before those that count. */
const WARM_MS = 1000;
/** Debian's own, where it is: another Python on the path may carry another SciPy. */
const PYTHON = existsSync("/usr/bin/python3") ? "/usr/bin/python3" : "python3";
const cache = join(root, ".cache", "bench");

/** The peer runs on the kernels of its own choice. */
const peerEnvironment = (threads) => {
  const { OPENBLAS_CORETYPE: _, OPENBLAS_L2_SIZE: __, ...rest } = process.env;
  return { ...rest, OPENBLAS_NUM_THREADS: String(threads), OMP_NUM_THREADS: String(threads) };
};

const chosen = process.argv[2] ?? "";
await build();
mkdirSync(cache, { recursive: true });
await bundleOurs();
if (spawnSync(PYTHON, ["-c", "import scipy"]).status !== 0) {
  console.error("The peer needs SciPy: apt-get install -y python3-scipy");
  process.exit(2);
}
console.log(
  `${cpus()[0].model}, ${cpus().length} cores, Node ${process.version}; medians of ${RUNS} interleaved runs\n`,
);
console.log("| work | n | ours | peer | ratio | aim | difference | memory ours / peer |");
console.log("|---|---|---|---|---|---|---|---|");
for (const row of ROWS.filter((r) => `${r.name} ${r.n}`.includes(chosen))) {
  const measure = { process: processRow, alone: aloneRow, server: serverRow }[row.kind] ?? sideBySide;
  await measure(row);
}

async function bundleOurs() {
  const esbuild = await import("esbuild");
  await esbuild.build({
    absWorkingDir: root,
    entryPoints: ["tools/bench/ours.ts"],
    outfile: join(cache, "ours.mjs"),
    bundle: true,
    platform: "node",
    target: "node20",
    format: "esm",
    logLevel: "warning",
  });
}

/** One long-lived process that answers a line with a line. */
function talker(command, args, env) {
  const child = spawn(command, args, { env, stdio: ["pipe", "pipe", "inherit"] });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  return {
    async say(message) {
      child.stdin.write(`${JSON.stringify(message)}\n`);
      const { value, done } = await lines.next();
      if (done) throw new Error("the process ended");
      return JSON.parse(value);
    },
    end: () => child.kill(),
  };
}

function ourTalker() {
  return talker(process.execPath, [join(cache, "ours.mjs")], process.env);
}

async function sideBySide(row) {
  const model = benchModel(row.shape, row.n);
  const extra = extras(row, model);
  const ours = ourTalker();
  const peers = [1, 2].map((threads) =>
    talker(PYTHON, [join(root, "tools/bench/peer.py")], peerEnvironment(threads)),
  );
  const talkers = [ours, ...peers];
  try {
    await ours.say({ do: "load", row: row.row, ...extra.ours });
    for (const peer of peers) await peer.say({ do: "load", row: row.row, ...model, ...extra.peer });
    const repeats = [];
    for (const t of talkers) repeats.push(Math.ceil(LEAST_SECONDS / (await warm(t))));
    const times = talkers.map(() => []);
    let last = [];
    for (let i = 0; i < RUNS; i++) {
      last = [];
      for (const [j, t] of talkers.entries()) {
        const answer = await t.say({ do: "run", repeat: repeats[j] });
        times[j].push(answer.seconds);
        last.push(answer);
      }
    }
    const [mine, ...theirs] = times.map(median);
    const best = theirs[1] < theirs[0] ? 1 : 0;
    line(row, mine, theirs[best], difference(last[0].values, last[1 + best].values), [
      last[0].maxRssMb,
      last[1 + best].maxRssMb,
    ]);
  } catch (error) {
    console.log(`| ${row.name} | ${row.n} | failed: ${error.message} | | | ${row.aim} | | |`);
  } finally {
    for (const t of talkers) t.end();
  }
}

/**
 * Runs that do not count, for both sides alike: by the clock alone, so that a just-in-time compiler has had its
 * say. Gives the seconds of the last.
 */
async function warm(t) {
  const start = performance.now();
  let last = 0;
  do last = (await t.say({ do: "run", repeat: 1 })).seconds;
  while (performance.now() - start < WARM_MS);
  return last;
}

/** What a sweep or a history needs beside the matrices. */
function extras(row, model) {
  const plain = { damped: row.row !== "undamped-general" && row.row !== "undamped-chain" };
  const all = model.mass.map((_, i) => `m${i + 1}.displacement`).join(", ");
  const last = `m${model.watch + 1}.displacement`;
  if (row.row.startsWith("sweep")) {
    const band = [0.5, 60];
    const ask = `force shake on m1\nask sweep run\n    of = ${all}\n    by = shake\n    from = 0.5 Hz\n    to = 60 Hz\n    points = 2000\n`;
    return { ours: { text: modelText(model, { ask }) }, peer: { band } };
  }
  if (row.row.startsWith("history")) {
    const dt = 1e-3;
    const random = generator(11);
    const forceTable = Array.from({ length: 1000 }, () => random() - 0.5);
    const csv = Array.from({ length: 100_001 }, (_, i) => `${(i * dt).toFixed(3)},${forceTable[i % 1000]}`);
    const of = row.row === "history-all" ? all : last;
    const ask = `force shake on m1\n    record = "shake.csv"\n    column = "force"\n    time_column = "time"\n    unit = N\nask history run\n    of = ${of}\n    by = shake\n    lasting = 100 s\n    step = 1 ms\n`;
    return {
      ours: { text: modelText(model, { ask }), csv: `time,force\n${csv.join("\n")}\n` },
      peer: { dt, forceTable },
    };
  }
  return { ours: { text: modelText(model, plain) }, peer: {} };
}

/** Whole processes: ours reads the model text, the peer a JSON file of the same numbers. */
async function processRow(row) {
  const model = benchModel("general", row.n);
  const [textFile, jsonFile] = [join(cache, "process.thrum"), join(cache, "process.json")];
  writeFileSync(textFile, modelText(model, { damped: false, ask: "ask modes\n" }));
  writeFileSync(jsonFile, JSON.stringify(model));
  const ours = () =>
    timed(process.execPath, [join(root, "dist/terminal/thrum.js"), "answer", textFile, "modes"]);
  const peer = (threads) => () =>
    timed(PYTHON, [join(root, "tools/bench/peer-process.py"), jsonFile], peerEnvironment(threads));
  const all = [ours, peer(1), peer(2)];
  const times = all.map(() => []);
  for (let i = 0; i <= RUNS; i++) {
    for (const [j, run] of all.entries()) times[j].push(run());
  }
  const [mine, one, two] = times.map((t) => median(t.slice(1)));
  line(row, mine, Math.min(one, two), Number.NaN, []);
}

function timed(command, args, env = process.env) {
  const start = performance.now();
  const run = spawnSync(command, args, { env, encoding: "utf8" });
  if (run.status !== 0) throw new Error(`${command} ${args.join(" ")}\n${run.stderr}`);
  return (performance.now() - start) / 1e3;
}

/** Rows without a peer: the aim is a time. */
async function aloneRow(row) {
  const ours = ourTalker();
  try {
    await ours.say({ do: "load", row: row.row, text: row.text() });
    await warm(ours);
    const times = [];
    let memory = 0;
    for (let i = 0; i < RUNS; i++) {
      const answer = await ours.say({ do: "run", repeat: 1 });
      times.push(answer.seconds);
      memory = answer.maxRssMb;
    }
    const mine = median(times);
    const met = mine <= row.aimSeconds ? "met" : "MISSED";
    console.log(
      `| ${row.name} | ${row.n} | ${show(mine)} | – | – | ${show(row.aimSeconds)} ${met} | – | ${memory.toFixed(0)} MB |`,
    );
  } catch (error) {
    console.log(`| ${row.name} | ${row.n} | failed: ${error.message} | | | | | |`);
  } finally {
    ours.end();
  }
}

/** What an editor sees of the language server; the aims are those of a user. */
async function serverRow(row) {
  const amount = (value) => (row.unit === "s" ? show(value) : `${value.toFixed(0)} ${row.unit}`);
  try {
    const mine = await row.run();
    const met = mine <= row.aim ? "met" : "MISSED";
    console.log(`| ${row.name} | ${row.n} | ${amount(mine)} | – | – | ${amount(row.aim)} ${met} | – | – |`);
  } catch (error) {
    console.log(`| ${row.name} | ${row.n} | failed: ${error.message} | | | | | |`);
  }
}

function line(row, mine, theirs, off, memory) {
  const ratio = mine / theirs;
  const verdict = ratio <= row.aim ? "met" : "MISSED";
  const cells = [row.name, row.n, show(mine), show(theirs), ratio.toFixed(2), `${row.aim} ${verdict}`];
  cells.push(Number.isNaN(off) ? "–" : off.toExponential(1));
  cells.push(memory.length ? `${memory.map((mb) => mb.toFixed(0)).join(" / ")} MB` : "–");
  console.log(`| ${cells.join(" | ")} |`);
}

function difference(a, b) {
  if (a.length !== b.length) return Number.POSITIVE_INFINITY;
  const scale = Math.max(...b.map(Math.abs));
  return a.reduce(
    (worst, x, i) => Math.max(worst, Math.abs(x - b[i]) / Math.max(Math.abs(b[i]), 1e-6 * scale)),
    0,
  );
}

function median(values) {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)];
}

function show(seconds) {
  return seconds < 1 ? `${(seconds * 1e3).toPrecision(3)} ms` : `${seconds.toPrecision(3)} s`;
}
