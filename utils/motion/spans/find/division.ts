/** A division of the list as a whole: its pieces bound together at the joints, and what it costs. */
import { solveInto } from '../../solve'
import { SIZES, dot, fitPiece } from './piece'
import type { Kind, Piece } from './piece'
import type { Scene } from './scene'

export interface Division {
  /** Last key of every span but the last. */
  joints: number[]
  kinds: Kind[]
  contacts: boolean[]
}

/** Charges, nats. Like everywhere in the judge, one more assumption must explain the list e^charge times better. */
export interface Rates {
  /** The pencil's spread. */
  sigma: number
  slop: number
  tolerance: number
}

/** For saying that there is a joint at all, to which the choice among n places is added. */
const JOINT_CHARGE = 1
/** For saying that a span curves: even spacing has the name until it plainly fails. */
const CURVE_CHARGE = 2.5
/** For saying that speed doesn't carry over there. */
const CONTACT_CHARGE = 5

/** Pieces by what they cover: neighbouring divisions share most of theirs. */
export type Known = Map<string, Piece | null>

/** Pieces of a division: every key belongs to one of them, a joint's to the span before. Null where one of them can't be had. */
export function piecesOf(scene: Scene, { joints, kinds }: Division, known: Known): Piece[] | null {
  const pieces: Piece[] = []
  for (let s = 0; s < kinds.length; s++) {
    const from = s === 0 ? 0 : (joints[s - 1] as number) + 1
    const to = s === kinds.length - 1 ? scene.n - 1 : joints[s] as number
    const kind = kinds[s] as Kind
    if (to - from + 1 < SIZES[kind] + (s === 0 ? 2 : 1)) return null
    const name = `${kind} ${from} ${to}`
    let piece = known.get(name)
    if (piece === undefined) known.set(name, piece = fitPiece(scene, kind, from, to))
    if (!piece) return null
    pieces.push(piece)
  }
  return pieces
}

/**
 * What a division costs, nats: squares left over with the joints' conditions kept, free numbers, joints and contacts. Holding a line to
 * a condition d = 0 adds dᵀS⁻¹d to its squares, S the covariance of d per unit variance (common algebra of restricted least squares).
 * An infinite charge where lines don't meet at a contact.
 */
export function chargeOf(scene: Scene, { joints, kinds, contacts }: Division, pieces: readonly Piece[], rates: Rates): { charge: number, squares: number } {
  const { n, rows } = scene
  const conditions: { joint: number, ofSpeed: boolean }[] = []
  let loose = 0
  for (let j = 0; j < joints.length; j++) {
    if (contacts[j]) {
      const atKey = meetsAt(scene, joints[j] as number, pieces[j] as Piece, pieces[j + 1] as Piece, rates)
      if (atKey === 'never') return { charge: Infinity, squares: Infinity }
      // Between two drawings the lines meet by themselves, but when is one more number.
      if (atKey === 'between') loose++
      else conditions.push({ joint: j, ofSpeed: false })
    } else {
      conditions.push({ joint: j, ofSpeed: false }, { joint: j, ofSpeed: true })
    }
  }
  let cost = 0
  let numbers = 0
  for (const piece of pieces) {
    cost += piece.cost
    numbers += piece.size
  }
  cost += heldTogether(joints, pieces, conditions, rows.length)
  const free = rows.length * (numbers - conditions.length) - loose * (rows.length - 1)
  const charge = cost / (2 * rates.sigma * rates.sigma) + 0.5 * Math.log(n) * free
    + joints.length * (JOINT_CHARGE + Math.log(n)) + contacts.filter(Boolean).length * CONTACT_CHARGE
    + kinds.filter(kind => kind !== 'even').length * CURVE_CHARGE
  return { charge, squares: cost }
}

/** Where the lines of two spans meet at a contact: at the joint's drawing, before the next one on either side, or nowhere near. */
function meetsAt(
  { n, frames }: Pick<Scene, 'n' | 'frames'>, joint: number, before: Piece, after: Piece, { sigma, slop, tolerance }: Rates,
): 'key' | 'between' | 'never' {
  const here = before.at(joint)
  const there = after.at(joint)
  const exposure = Math.max(
    (frames[joint + 1] as number) - (frames[joint] as number), (frames[joint] as number) - (frames[Math.max(0, joint - 1)] as number),
  )
  const apart = distance(here.values, there.values)
  const allowance = slop + tolerance * exposure * Math.hypot(...here.speeds)
  if (apart > allowance + exposure * distance(here.speeds, there.speeds)) return 'never'
  const spread = dot(here.byValue, here.solvedValue) + dot(there.byValue, there.solvedValue)
  // Held to the drawing where that costs less than one more number.
  return apart <= allowance && apart * apart <= Math.log(n) * sigma * sigma * spread ? 'key' : 'between'
}

function distance(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(...a.map((value, r) => value - (b[r] as number)))
}

/** Squares that the conditions add, all rows together. */
function heldTogether(
  joints: readonly number[], pieces: readonly Piece[], conditions: readonly { joint: number, ofSpeed: boolean }[], rows: number,
): number {
  const m = conditions.length
  if (m === 0) return 0
  // Each condition moves with the numbers of the piece before (−) and of the piece after (+).
  const sides = conditions.map(({ joint, ofSpeed }) => {
    const at = joints[joint] as number
    const before = pieces[joint] as Piece
    const after = pieces[joint + 1] as Piece
    const here = before.at(at)
    const there = after.at(at)
    return {
      joint,
      before: ofSpeed ? here.bySpeed : here.byValue, solvedBefore: ofSpeed ? here.solvedSpeed : here.solvedValue,
      after: ofSpeed ? there.bySpeed : there.byValue, solvedAfter: ofSpeed ? there.solvedSpeed : there.solvedValue,
      off: ofSpeed ? there.speeds.map((value, r) => value - (here.speeds[r] as number)) : there.values.map((value, r) => value - (here.values[r] as number)),
    }
  })
  const spread = new Float64Array(m * m)
  sides.forEach((one, p) => sides.forEach((other, q) => {
    let sum = 0
    if (one.joint === other.joint) sum = dot(one.before, other.solvedBefore) + dot(one.after, other.solvedAfter)
    else if (one.joint + 1 === other.joint) sum = -dot(one.after, other.solvedBefore)
    else if (one.joint - 1 === other.joint) sum = -dot(one.before, other.solvedAfter)
    spread[m * p + q] = sum
  }))
  const out = new Float64Array(m)
  let added = 0
  for (let r = 0; r < rows; r++) {
    const off = Float64Array.from(sides, side => side.off[r] as number)
    // Where the pieces don't settle the condition it can be kept for nothing.
    if (!solveInto(spread, off, m, out)) continue
    added += Math.max(0, dot(off, out))
  }
  return added
}
