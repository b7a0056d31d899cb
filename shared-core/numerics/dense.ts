/** The door to the dense basics: products, real and complex LU, Cholesky. */
export {
  type Cholesky,
  factorCholesky,
  solveCholesky,
  solveLower,
  solveLowerTransposed,
} from "./cholesky.ts";
export { type ComplexLu, complexLuWorkspace, factorComplexLu, solveComplexLu } from "./complex-lu.ts";
export {
  factorLu,
  type RealLu,
  realLuWorkspace,
  reciprocalCondition,
  solveLu,
  solveLuTransposed,
} from "./lu.ts";
export {
  allFinite,
  asymmetry,
  identity,
  maxAbs,
  multiply,
  multiplyVector,
  norm1,
  transpose,
} from "./products.ts";
