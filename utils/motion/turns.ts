/** Readings of a turn that begin again every full turn: joined up for the fit, told in their own turn afterwards. */
import type { Judgement } from './readings'
import { RADIAN } from './series'
import type { Key, ReadingCheck } from './types'

/** Reading units in a full turn; 0 where the measure is no angle. */
export function fullTurn({ measure, radius }: Pick<ReadingCheck, 'measure' | 'radius'>): number {
  return measure === 'angle' ? 360 : measure === 'arc' ? 360 * RADIAN * (radius ?? 0) : 0
}

/**
 * Whole turns to add to each reading so that the list runs on. The pace is that of the middle one of the posted gaps, which holds as long
 * as fewer than half of them begin again; each gap is then read as the one nearest to that pace. Null where nothing begins again.
 */
export function turnsToAdd(request: ReadingCheck): Int32Array | null {
  const { keys } = request
  const turn = fullTurn(request)
  if (!(turn > 0)) return null
  const frames = keys.map((key, i) => key.frame - (keys[i - 1]?.frame ?? 0))
  const gaps = keys.map((key, i) => key.reading - (keys[i - 1]?.reading ?? 0))
  const paces = gaps.map((gap, i) => gap / (frames[i] as number)).slice(1).sort((a, b) => a - b)
  const pace = paces[paces.length >> 1] ?? 0
  const turns = new Int32Array(keys.length)
  let begun = false
  for (let i = 1; i < keys.length; i++) {
    const more = Math.round((pace * (frames[i] as number) - (gaps[i] as number)) / turn)
    turns[i] = (turns[i - 1] as number) + more
    begun ||= more !== 0
  }
  return begun ? turns : null
}

/** The same list running on past its full turns. */
export function joined(request: ReadingCheck, turns: Int32Array): ReadingCheck {
  const turn = fullTurn(request)
  return { ...request, keys: request.keys.map((key, i) => ({ frame: key.frame, reading: key.reading + (turns[i] as number) * turn })) }
}

/** Readings of the joined list at `frames`, each told in the turn of the key at or before it. */
export function inPostedTurns(readings: readonly number[], request: ReadingCheck, turns: Int32Array, frames: readonly number[]): number[] {
  const turn = fullTurn(request)
  return readings.map((reading, at) => {
    const after = request.keys.findIndex(key => key.frame > (frames[at] as number))
    const key = after < 0 ? request.keys.length - 1 : Math.max(0, after - 1)
    return reading - (turns[key] as number) * turn
  })
}

/** A judgement of the joined list, with readings as they were posted and the law's in the same turn. Gaps and offsets stay the joined ones. */
export function toldInTheirTurn(judgement: Judgement, request: ReadingCheck, turns: Int32Array): Judgement {
  const turn = fullTurn(request)
  const { result } = judgement
  const back = (reading: number, i: number) => reading - (turns[i] as number) * turn
  const list = (keys: Key[]) => keys.map((key, i) => ({ ...key, reading: back(key.reading, i) }))
  return {
    ...judgement,
    result: {
      ...result,
      keys: result.keys.map((key, i) => ({
        ...key, reading: request.keys[i]?.reading ?? key.reading, law: key.law === null ? null : back(key.law, i),
      })),
      ruled: { fit: list(result.ruled.fit), claim: result.ruled.claim && list(result.ruled.claim) },
    },
  }
}
