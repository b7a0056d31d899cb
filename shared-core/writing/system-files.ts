import { freeCoordinates } from "../judgement/shapes.ts";
import type { Assembly } from "../mechanics/assembly.ts";
import { systemMatrices } from "../mechanics/matrices.ts";
import { type SparseMatrix, sparseFromTriplets } from "../numerics/sparse.ts";
import { csvText } from "./csv.ts";
import { isSymmetric, matrixMarket } from "./matrix-market.ts";

/** A file to be written: its name without folder, and its text. */
export interface TextFile {
  readonly name: string;
  readonly text: string;
}

const UNIT: Readonly<Record<Assembly["coordinates"][number]["motion"], string>> = {
  sliding: "m",
  turning: "rad",
  charge: "C",
};

/**
 * The equations of motion M q'' + C q' + K q = D f - M_s u'' - C_s u' - K_s u as files, SI: mass, damping and stiffness
 * (free x free), the same for given support motions u (free x supports), the drive matrix D (free x forces), and
 * lists that name rows and columns. Modal damping is not in C (it needs the modes); the loss factors stand in
 * `hysteretic`: K + iH in a steady response.
 */
export function systemFiles(assembly: Assembly): TextFile[] {
  const matrices = systemMatrices(assembly);
  const square: readonly (readonly [string, SparseMatrix])[] = [
    ["mass", matrices.mass],
    ["damping", matrices.damping],
    ["stiffness", matrices.stiffness],
    ["hysteretic", matrices.hysteretic],
  ];
  const supports: readonly (readonly [string, SparseMatrix])[] = [
    ["mass-support", matrices.massSupport],
    ["damping-support", matrices.dampingSupport],
    ["stiffness-support", matrices.stiffnessSupport],
    ["hysteretic-support", matrices.hystereticSupport],
  ];
  const always = new Set(["mass", "damping", "stiffness"]);
  const files = [...square, ...supports].flatMap(([name, matrix]) =>
    always.has(name) || matrix.value.some((value) => value !== 0) ? [matrixFile(name, matrix)] : [],
  );
  return [
    ...files,
    matrixFile("drive", driveMatrix(assembly)),
    coordinateList(assembly),
    columnList(assembly),
  ];
}

function matrixFile(name: string, matrix: SparseMatrix): TextFile {
  const symmetry = isSymmetric(matrix) ? "symmetric" : "general";
  return {
    name: `${name}.mtx`,
    text: matrixMarket(matrix, symmetry, ["SI units; rows as in coordinates.csv"]),
  };
}

/** Columns: forces and torques in the order of the file. */
function driveMatrix(assembly: Assembly): SparseMatrix {
  const forms = forces(assembly).map((drive) => drive.form);
  const entries = forms.flatMap((form, column) =>
    form.coordinates.map((row, i) => ({ row, column, value: form.factors[i] })),
  );
  return sparseFromTriplets(assembly.free, forms.length, {
    row: entries.map((entry) => entry.row),
    column: entries.map((entry) => entry.column),
    value: entries.map((entry) => entry.value),
  });
}

function forces(assembly: Assembly) {
  return assembly.drives.flatMap((drive) =>
    drive.on.kind === "form" ? [{ name: drive.name, unit: drive.unit, form: drive.on.form }] : [],
  );
}

function coordinateList(assembly: Assembly): TextFile {
  const named = Array.from(freeCoordinates(assembly), (index) => assembly.coordinates[index]);
  const text = csvText([
    { head: "row", values: named.map((_, i) => i + 1) },
    { head: "coordinate", values: named.map((coordinate) => coordinate?.name ?? "") },
    { head: "unit", values: named.map((coordinate) => (coordinate ? UNIT[coordinate.motion] : "")) },
  ]);
  return { name: "coordinates.csv", text };
}

/** What the columns of the drive and of the support matrices are. */
function columnList(assembly: Assembly): TextFile {
  const columns = [
    ...forces(assembly).map((drive, i) => ({
      matrix: "drive",
      column: i + 1,
      name: drive.name,
      unit: drive.unit,
    })),
    ...assembly.supports.map((support, i) => ({
      matrix: "support",
      column: i + 1,
      name: support.name,
      unit: UNIT[support.motion],
    })),
  ];
  const text = csvText([
    { head: "matrix", values: columns.map((column) => column.matrix) },
    { head: "column", values: columns.map((column) => column.column) },
    { head: "name", values: columns.map((column) => column.name) },
    { head: "unit", values: columns.map((column) => column.unit) },
  ]);
  return { name: "columns.csv", text };
}
