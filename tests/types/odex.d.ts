/** odex ships TypeScript sources that do not compile under `strict`; these are the parts that the checks use. */
export type Derivative = (x: number, y: number[]) => number[]
export type Dense = (component: number, x: number) => number
export type OutputFunction = (step: number, from: number, to: number, y: number[], dense?: Dense) => boolean | undefined

export class Solver {
  constructor(dimensions: number)
  denseOutput: boolean
  maxSteps: number
  initialStepSize: number
  maxStepSize: number
  relativeTolerance: number | number[]
  absoluteTolerance: number | number[]
  grid(step: number, out: (x: number, y: number[]) => void): OutputFunction
  solve(
    derivative: Derivative,
    from: number,
    start: number[],
    to: number,
    output?: OutputFunction,
  ): { y: number[]; outcome: number; nStep: number; xEnd: number }
}
