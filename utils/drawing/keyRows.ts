import { earlyOrLate, figure, findingWords, readingDecimals, signedFigure, tellingFrames } from '~/utils/drawing/words'
import type { CheckResult, FindingKind } from '~/utils/motion/types'

/** The key table's cells: figures already written out, so that a row is nothing but words. */

export interface KeyRow {
  frame: number
  posted: string
  law: string
  offset: string
  offsetFrames: string
  gap: string
  lawGap: string
  allowance: string
  words: string
  breaks: boolean
}

/** Rows of a judged list, in the list's order. */
export function keyRows(answer: Pick<CheckResult, 'keys' | 'findings'>): KeyRow[] {
  const decimals = readingDecimals(answer.keys)
  const told = new Map<number, FindingKind>()
  for (const { kind, frames } of answer.findings) for (const frame of frames) if (!told.has(frame)) told.set(frame, kind)
  return answer.keys.map((key) => {
    const kind = told.get(key.frame)
    const name = kind ? findingWords[kind] : key.breaks ? 'breaks' : ''
    const off = key.breaks ? earlyOrLate(key.offsetFrames) : ''
    return {
      frame: key.frame,
      posted: figure(key.reading, decimals),
      law: figure(key.law, decimals),
      offset: signedFigure(key.offset, decimals),
      offsetFrames: signedFigure(tellingFrames(key, decimals)),
      gap: figure(key.gap, decimals),
      lawGap: figure(key.lawGap, decimals),
      allowance: figure(key.allowance, decimals),
      words: name && `${key.breaks ? '✕ ' : ''}${[name, off].filter(Boolean).join(', ')}`,
      breaks: key.breaks,
    }
  })
}
