import { z } from 'zod'
import { CHECK_LIMITS } from '~/utils/contracts/check'
import { LIMITS } from '~/utils/contracts/common'

const cell = z.string().max(40)
/** A take that is not posted yet, as this browser keeps it. Cells are text: see rows.ts. */
const draft = z.object({
  /** 1 had readings only; what it kept still opens. 2 keeps points as well. */
  v: z.literal([1, 2]),
  /** Made once per draft, so that a send repeated after a lost answer posts one take. */
  clientId: z.uuid(),
  rows: z.array(z.object({ id: z.number(), frame: cell, reading: cell, x: cell.optional(), y: cell.optional() })).max(CHECK_LIMITS.maxKeys * 2),
  note: z.string().max(LIMITS.noteChars * 2),
  savedAt: z.string(),
})
export type TakeDraft = z.infer<typeof draft>

/** One draft per shot and person, so that two people at one machine never see each other's. */
export const draftKey = (production: string, code: string, person: string) => `tiltyard:take:${production}:${code}:${person}`

/** A stored draft, or null where there is none or it can't be read any more. */
export function readDraft(text: string | null): TakeDraft | null {
  if (!text) return null
  try {
    return draft.parse(JSON.parse(text))
  } catch {
    return null
  }
}
