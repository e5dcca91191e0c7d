/**
 * odex, typed here: the package carries its own TypeScript source, which a strict type check of this project would read and refuse.
 */
import { createRequire } from 'node:module'

export interface OdexSolver {
  absoluteTolerance: number
  relativeTolerance: number
  initialStepSize: number
  /** Integrates y′ = field(t, y) from t₀ to t₁ and answers with the last y. */
  solve(field: (t: number, y: number[]) => number[], from: number, start: number[], to: number): { y: number[] }
}

const { Solver } = createRequire(import.meta.url)('odex') as { Solver: new (size: number) => OdexSolver }

export { Solver }
