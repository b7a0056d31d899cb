import type { HistoryAnswer, ModeTable, SweepAnswer } from "../answers/answer.ts";
import { type CsvColumn, csvText } from "./csv.ts";

/** An answer as a CSV file, SI, one row a frequency or an instant; the unit stands in the head. */
export function answerCsv(answer: SweepAnswer | HistoryAnswer): string {
  return csvText(answer.kind === "sweep" ? sweepColumns(answer) : historyColumns(answer));
}

function sweepColumns(answer: SweepAnswer): CsvColumn[] {
  const columns: CsvColumn[] = [{ head: "frequency [Hz]", values: answer.frequencyHz }];
  for (const [quantity, { unit, re, im }] of answer.series) {
    columns.push(
      { head: `${quantity} amplitude [${unit}]`, values: re.map((part, i) => Math.hypot(part, im[i])) },
      {
        head: `${quantity} phase [deg]`,
        values: re.map((part, i) => (Math.atan2(im[i], part) * 180) / Math.PI),
      },
      { head: `${quantity} real [${unit}]`, values: re },
      { head: `${quantity} imaginary [${unit}]`, values: im },
    );
  }
  return columns;
}

function historyColumns(answer: HistoryAnswer): CsvColumn[] {
  const series = [...answer.series].map(([quantity, { unit, values }]) => ({
    head: `${quantity} [${unit}]`,
    values,
  }));
  return [{ head: "time [s]", values: answer.timeS }, ...series];
}

/** The mode table as a CSV file; shapes by coordinate, real and imaginary part. */
export function modesCsv(table: ModeTable, coordinates: readonly string[]): string {
  const { modes } = table;
  const shapes = coordinates.flatMap((name, i) => [
    { head: `${name} real`, values: modes.map((mode) => mode.shape.re[i]) },
    { head: `${name} imaginary`, values: modes.map((mode) => mode.shape.im[i]) },
  ]);
  return csvText([
    { head: "mode", values: modes.map((mode) => mode.number) },
    { head: "frequency [Hz]", values: modes.map((mode) => mode.frequencyHz) },
    { head: "damped frequency [Hz]", values: modes.map((mode) => mode.dampedFrequencyHz) },
    { head: "damping ratio", values: modes.map((mode) => mode.dampingRatio) },
    { head: "eigenvalue real [1/s]", values: modes.map((mode) => mode.eigenvalue[0]) },
    { head: "eigenvalue imaginary [1/s]", values: modes.map((mode) => mode.eigenvalue[1]) },
    ...shapes,
  ]);
}
