import { rulerOf } from "../drawing/ruler-of.ts";
import { shownValues } from "../drawing/shown-values.ts";
import { systemScene } from "../drawing/system-scene.ts";
import type { CaseReport, FileReport } from "../judgement/report.ts";
import type { UnitSystem } from "../units/show.ts";
import { answerCsv, modesCsv } from "./answer-csv.ts";
import { historyFigure, modesFigure, sweepFigure } from "./figure/answer-figures.ts";
import type { Figure } from "./figure/figure.ts";
import { rulerSvg } from "./figure/ruler-svg.ts";
import { sceneSvg } from "./figure/scene-svg.ts";
import { figureSvg } from "./figure/svg.ts";
import type { TextFile } from "./system-files.ts";
import { inUnit, type UnitView, unitView } from "./units/unit-view.ts";
import { writtenUnits } from "./units/written-units.ts";

export interface AnswerFilesOptions {
  readonly asks: readonly string[];
  readonly as: "csv" | "svg";
  readonly units: UnitSystem;
}

const MODE_HEIGHT = 110;
const PICTURE = { width: 720, height: 460 };

/**
 * One file for each answered ask and case: `run_up.csv`, `run_up.winter.csv`. CSV is SI; pictures are in `units`, and
 * with them come the system (`drawing.svg`) and its frequencies (`ruler.svg`).
 */
export function answerFiles(report: FileReport, options: AnswerFilesOptions): TextFile[] {
  const units = unitView(options.units, writtenUnits(report.model));
  return report.cases.flatMap((each) => {
    const suffix = each.name === report.model.cases[0].name ? "" : `.${each.name}`;
    const answers = contents(each, options, units);
    const pictures = options.as === "svg" ? systemPictures(report, each, options.units, units) : new Map();
    // An ask may be called like a picture; the answer keeps its name.
    const free = [...pictures].map(([name, text]) => [answers.has(name) ? `${name}_` : name, text]);
    return [...free, ...answers].map(([name, text]) => ({ name: `${name}${suffix}.${options.as}`, text }));
  });
}

/** The drawing, where the system is small enough to be drawn, and the frequency ruler, where there are modes. */
function systemPictures(
  { model }: FileReport,
  each: CaseReport,
  system: UnitSystem,
  units: UnitView,
): Map<string, string> {
  const show = (si: string, value: number): string => inUnit(value, units.unitFor(si, Math.abs(value)));
  const { assembly } = each.instance;
  const scene = systemScene(model, assembly, shownValues(each.instance, system, show));
  const ruler = rulerOf(each);
  const title = model.title ?? model.file;
  return new Map([
    ...(scene.kind === "system" ? [["drawing", sceneSvg(scene, title)] as const] : []),
    ...(ruler === null ? [] : [["ruler", rulerSvg(ruler, title, PICTURE.width)] as const]),
  ]);
}

/** As high as its shapes need. */
const modesSvg = (figure: Figure): string =>
  figureSvg(figure, { ...PICTURE, height: 70 + MODE_HEIGHT * Math.max(1, figure.panels.length) });

function contents(each: CaseReport, { asks, as }: AnswerFilesOptions, units: UnitView): Map<string, string> {
  const texts = new Map<string, string>();
  const names = each.instance.assembly.coordinates.map((coordinate) => coordinate.name);
  if (asks.includes("modes") && each.modes.ok) {
    const { table } = each.modes;
    texts.set("modes", as === "csv" ? modesCsv(table, names) : modesSvg(modesFigure(table, names, units)));
  }
  for (const [name, result] of each.answers) {
    if (!result.ok || !asks.includes(name)) continue;
    const answer = result.value;
    if (as === "csv") texts.set(name, answerCsv(answer));
    else {
      const figure =
        answer.kind === "sweep" ? sweepFigure(name, answer, units) : historyFigure(name, answer, units);
      texts.set(name, figureSvg(figure, PICTURE));
    }
  }
  return texts;
}

/** The report with only these answers in it. */
export function withAsks(report: FileReport, asks: readonly string[]): FileReport {
  const cases = report.cases.map((each) => ({
    ...each,
    answers: new Map([...each.answers].filter(([name]) => asks.includes(name))),
  }));
  return { ...report, cases };
}
