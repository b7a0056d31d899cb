import type { SparseMatrix } from "../numerics/sparse.ts";

/**
 * A sparse matrix in Matrix Market form (NIST, "The Matrix Market Exchange Formats", coordinate real), rows and
 * columns counted from 1. `symmetric` writes the lower triangle only; the matrix must then be exactly symmetric.
 */
export function matrixMarket(
  matrix: SparseMatrix,
  symmetry: "general" | "symmetric",
  comments: readonly string[] = [],
): string {
  const entries: string[] = [];
  for (let row = 0; row < matrix.rows; row++) {
    for (let p = matrix.rowStart[row]; p < matrix.rowStart[row + 1]; p++) {
      const column = matrix.column[p];
      if (matrix.value[p] === 0 || (symmetry === "symmetric" && column > row)) continue;
      entries.push(`${row + 1} ${column + 1} ${matrix.value[p]}`);
    }
  }
  return [
    `%%MatrixMarket matrix coordinate real ${symmetry}`,
    ...comments.map((comment) => `% ${comment}`),
    `${matrix.rows} ${matrix.columns} ${entries.length}`,
    ...entries,
    "",
  ].join("\n");
}

/** True when every entry equals its mirror image to the last bit. */
export function isSymmetric(matrix: SparseMatrix): boolean {
  const at = (row: number, column: number): number => {
    for (let p = matrix.rowStart[row]; p < matrix.rowStart[row + 1]; p++) {
      if (matrix.column[p] === column) return matrix.value[p];
    }
    return 0;
  };
  for (let row = 0; row < matrix.rows; row++) {
    for (let p = matrix.rowStart[row]; p < matrix.rowStart[row + 1]; p++) {
      if (at(matrix.column[p], row) !== matrix.value[p]) return false;
    }
  }
  return matrix.rows === matrix.columns;
}
