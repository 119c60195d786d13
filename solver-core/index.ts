/**
 * The only door of the solver core. Everything outside imports from here.
 */
export type {
  ReadonlyFloat64Array,
  ReadonlyInt32Array,
  ReadonlyUint8Array,
} from './numerics/typed-array-views';
export { BrokenInvariantError, InvalidProblemError, type InvalidProblemCode } from './control/solver-errors';
export type { Progress } from './control/progress-event';
export { nonzeroCount, type SparseMatrix } from './sparse/sparse-matrix';
export type { LinearProgram, Sense } from './linear-program/linear-program';
export { LinearProgramBuilder } from './linear-program/linear-program-builder';
export { VariableStatus, type Basis } from './linear-program/basis';
export type { SolveOptions } from './linear-program/solve-options';
export type {
  ImpreciseResult,
  InfeasibleResult,
  OptimalResult,
  Residuals,
  SolutionValues,
  SolveResult,
  StoppedResult,
  UnboundedResult,
} from './linear-program/solve-result';
export { readMps, readMpsWithWarnings, type MpsReading } from './formats/mps-reader';
export {
  MpsSyntaxError,
  type MpsErrorCode,
  type MpsWarning,
  type MpsWarningCode,
} from './formats/mps-errors';
export { writeMps } from './formats/mps-writer';
export { solve, SolveSession, type SessionState } from './solve/solve-session';
