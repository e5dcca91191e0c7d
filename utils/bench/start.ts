import { courseIn } from '~/utils/bench/course'
import type { Course } from '~/utils/bench/course'
import { hasPoints, measureFor } from '~/utils/bench/laws'
import { listIn, pointListIn } from '~/utils/bench/planning'
import type { BenchSetup } from '~/utils/bench/setup'
import type { Claim, Sheet } from '~/utils/contracts/production'
import type { Key, Measure, Place, PointKey } from '~/utils/motion/types'
import { readDraft } from '~/utils/posting/draft'
import type { TakeDraft } from '~/utils/posting/draft'
import { roundedKeys, rowsFromKeys } from '~/utils/posting/rows'

/** From the bench to a shot's posting form. */

/** What each of the bench's lists can be told in: angles also along their arc, ways also as points on their line. */
export function measuresOf(setup: Pick<BenchSetup, 'law'>): readonly Measure[] {
  if (measureFor(setup.law) === 'distance') return ['distance', 'point']
  const angles: Measure[] = setup.law === 'flight' ? [] : ['angle', 'arc']
  return hasPoints(setup.law) ? [...angles, 'point'] : angles
}
export const fitsClaim = (setup: Pick<BenchSetup, 'law'>, claim: Pick<Claim, 'measure'> | null) =>
  claim !== null && measuresOf(setup).includes(claim.measure)

/** Shots that could take the list. `mayPost` asks the table of permissions. */
export const shotsFor = (setup: BenchSetup, sheets: readonly Sheet[], mayPost: (sheet: Sheet) => boolean): Sheet[] =>
  sheets.filter((sheet) => sheet.desk !== 'settled' && mayPost(sheet) && fitsClaim(setup, sheet.claim))

export interface StartShot {
  claim: Claim
  fps: number
  firstFrame: number
}

/** The setup as the shot will have it: at its own rate, and at its own drawing scale where it claims one. */
export function setupFor(setup: BenchSetup, shot: Pick<StartShot, 'claim' | 'fps'>): BenchSetup {
  const subject = shot.claim.subject
  const scale = subject && !('shape' in subject && subject.shape) && 'unitsPerMetre' in subject ? subject.unitsPerMetre : undefined
  return { ...setup, fps: shot.fps, scale: scale ?? setup.scale }
}

/** The planned list as the shot's claim reads it, from the shot's own first frame. */
export function keysFor(setup: BenchSetup, shot: StartShot): Key[] | PointKey[] {
  const here = setupFor(setup, shot)
  const course = courseIn(here)
  const frameAt = (frame: number) => frame - 1 + shot.firstFrame
  const { measure, radius, zeroAt = 0, slop } = shot.claim
  if (measure === 'point')
    return roundedKeys(pointsOf(here, course, shot.claim).map(({ frame, x, y }) => ({ frame: frameAt(frame), x, y })), slop)
  const read = (reading: number) => {
    if (measure === 'distance') return reading
    const angle = reading - zeroAt
    return measure === 'arc' && radius ? (angle * Math.PI / 180) * radius : angle
  }
  return roundedKeys(listIn(here, course).map(({ frame, reading }) => ({ frame: frameAt(frame), reading: read(reading) })), slop)
}

/** Points from the hand or the brink, or along the line that the way runs on: down its slope, level where nothing falls. */
function pointsOf(setup: BenchSetup, course: Course, claim: Pick<Claim, 'yAxis' | 'pivot'>): PointKey[] {
  const up = claim.yAxis === 'up' ? -1 : 1
  const from: Place = setup.law === 'over-edge' && claim.pivot ? claim.pivot : { x: 0, y: 0 }
  const placed = ({ frame, x, y }: PointKey): PointKey => ({ frame, x: from.x + x, y: from.y + up * y })
  const points = pointListIn(setup, course)
  if (points) return points.map(placed)
  const slope = setup.law === 'bounce' ? 90 : setup.law === 'odd-rule' ? setup.slope : 0
  // A free fall runs straight down: cos 90° leaves a hair of sideways.
  const way = { x: slope === 90 ? 0 : Math.cos((slope * Math.PI) / 180), y: Math.sin((slope * Math.PI) / 180) }
  return course.keys.map(({ frame, reading }) => placed({ frame, x: reading * way.x, y: reading * way.y }))
}

/** A draft that starts from the planned list. */
export const draftFrom = (keys: readonly Key[] | readonly PointKey[], clientId: string, savedAt: string): TakeDraft => ({
  v: 1, clientId, rows: rowsFromKeys(keys), note: '', savedAt,
})

/** How much somebody has already written there: rows with anything in them, and a note counts as one. */
export function writtenIn(stored: string | null): number {
  const draft = readDraft(stored)
  if (!draft) return 0
  return draft.rows.filter((row) => Object.entries(row).some(([column, cell]) => column !== 'id' && String(cell).trim() !== '')).length + (draft.note.trim() ? 1 : 0)
}
