import { listIn } from '~/utils/bench/planning'
import type { BenchSetup } from '~/utils/bench/setup'
import { turns } from '~/utils/claiming/form'
import type { Claim, Sheet } from '~/utils/contracts/production'
import { readDraft } from '~/utils/posting/draft'
import type { TakeDraft } from '~/utils/posting/draft'
import { roundedKeys, rowsFromKeys } from '~/utils/posting/rows'
import type { Key } from '~/utils/motion/types'

/** From the bench to a shot's posting form. */

/** A turning body is told in angles or along its arc, a way in distances: the rest can't be translated. */
export const fitsClaim = (setup: BenchSetup, claim: Pick<Claim, 'measure'> | null) =>
  claim !== null && turns(setup.law) === (claim.measure !== 'distance')

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

/** The planned list in the shot's own readings, from its own first frame. */
export function keysFor(setup: BenchSetup, shot: StartShot): Key[] {
  const { measure, radius, zeroAt = 0, slop } = shot.claim
  const read = (reading: number) => {
    if (measure === 'distance') return reading
    const angle = reading - zeroAt
    return measure === 'arc' && radius ? (angle * Math.PI / 180) * radius : angle
  }
  const keys = listIn(setupFor(setup, shot)).map(({ frame, reading }) => ({ frame: frame - 1 + shot.firstFrame, reading: read(reading) }))
  return roundedKeys(keys, slop)
}

/** A draft that starts from the planned list. */
export const draftFrom = (keys: readonly Key[], clientId: string, savedAt: string): TakeDraft => ({
  v: 1, clientId, rows: rowsFromKeys(keys), note: '', savedAt,
})

/** How much somebody has already written there: rows with anything in them, and a note counts as one. */
export function writtenIn(stored: string | null): number {
  const draft = readDraft(stored)
  if (!draft) return 0
  return draft.rows.filter(({ frame, reading }) => (frame + reading).trim() !== '').length + (draft.note.trim() ? 1 : 0)
}
