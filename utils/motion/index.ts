/** The judge and what the screens need around it. */
export { judge, judgeInDepth } from './judge'
export type { Judgement } from './readings'
export { lawCurve } from './line'
export type { Line } from './line'
export { canRest } from './standstill'
export { allowanceAt, allowances } from './allowance'
export {
  STANDARD_GRAVITY, brinkRatio, describeBody, edgeRatio, equalLength, isBody, namedSize, pathAcceleration, sizeForLength, uprightLean,
} from './bodies'
export { LAW_WORDS, MEASURES, lawsFor } from './laws/index'
export { leavesEdgeAt, paceOf, swingPeriod, toppleMeasure, toppleTime } from './times'
export { framesFor, plannedList, secondsFor } from './plan'
export type { Plan, PlannedList } from './plan'
export { flightSeconds, plannedFlight } from './planFlight'
export type { FlightEvent, FlightPlan, PlannedPoints, Throw } from './planFlight'
export { edgeMotion, plannedEdge } from './planEdge'
export type { EdgeEvent, EdgeMoment, EdgeMotion, EdgePlan, PlannedEdge } from './planEdge'
export * from './types'
