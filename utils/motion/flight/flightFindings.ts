/** What is to be said of a flight, in words. */
import { misplacedFinding } from '../findings'
import { offPathFinding } from '../path/offPath'
import type { Finding, JudgedKey } from '../types'
import type { FlightFault } from './flightRivals'

const FAULTS: Record<Exclude<FlightFault, 'sideways'>, string> = {
  'steady': 'This is not a flight; it reads as even spacing along a straight line: nothing pulls it down.',
  'odd-rule': 'This is not a flight; it reads as the odd rule along a straight line: it gathers speed sideways too.',
  'down': 'This is not a flight: it goes evenly sideways, but what it falls keeps no odd rule.',
  'upward': 'This is not a flight: it falls upward. If y counts the other way on this drawing, say so in the claim.',
  'neither': 'This is not a flight: it neither goes evenly sideways nor falls by the odd rule.',
}

/** `misfit`: of the flight, 1 is at the edge of notice. `slows`: it is slower sideways at the end than at the start. */
export function notFlightFinding(fault: FlightFault, misfit: number, slows: boolean): Finding {
  const text = fault === 'sideways'
    ? `This is not a flight: sideways it ${slows ? 'slows down' : 'gathers speed'}, and nothing in the air makes it.`
    : FAULTS[fault]
  return { kind: 'wrong-law', frames: [], amount: misfit, text }
}

/**
 * A drawing of a flight that is off: too early or late on the parabola, or off the parabola, whichever is more of it.
 * `ahead`: drawing units along the way it goes.
 */
export function flightDrawingFinding(key: JudgedKey, ahead: number, unit: string): Finding {
  return Math.abs(key.offPath ?? 0) > Math.abs(ahead)
    ? offPathFinding(key, 'parabola', unit)
    : misplacedFinding({ ...key, offset: ahead }, unit)
}
