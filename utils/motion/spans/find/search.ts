/** The cheapest division: from the best outlines, joint by joint and law by law, downhill. */
import { MISPLACED_CHARGE, mostMisplaced } from '../../hypotheses'
import { chargeOf, piecesOf } from './division'
import type { Division, Known, Rates } from './division'
import { outlines } from './outline'
import { dot } from './piece'
import type { Kind, Piece } from './piece'
import { without } from './scene'
import type { Scene } from './scene'
import { exactSwing } from './swing'
import type { ReadingCheck } from '../../types'

export interface Found {
  division: Division
  pieces: Piece[]
  /** Nats, and the squares left over that are part of it. */
  charge: number
  squares: number
  /** With the drawings that it sets aside. */
  scene: Scene
}

const KINDS: readonly Kind[] = ['even', 'curved', 'swing']

/**
 * The cheapest division for every number of spans from one up to `most` that can be had, fewest spans first. Drawings that the cheapest of
 * all calls misplaced have bent the others too: they get a second look without them.
 */
export function divisions(scene: Scene, most: number, rates: Rates): Found[] {
  const found = divisionsAtOnce(scene, most, rates)
  const best = cheapest(found)
  if (!best || aside(best.scene) === aside(scene)) return found
  const again = divisionsAtOnce(best.scene, most, rates)
  return found.map(first => [first, ...again.filter(({ pieces }) => pieces.length === first.pieces.length)].reduce((a, b) => (b.charge < a.charge ? b : a)))
}

/** The same division of a list that `thin` has only every so many drawings of (the last one too), moved to where it is cheapest there. */
export function carriedOver(scene: Scene, { division, scene: thin }: Found, rates: Rates): Found | null {
  const places = Array.from(thin.frames, frame => scene.frames.indexOf(frame))
  const calm = places.reduce((now, at, i) => (thin.weights[i] === 0 ? without(now, at) : now), scene)
  const known: Known = new Map()
  const from = looked(calm, { ...division, joints: division.joints.map(joint => places[joint] as number) }, rates, known)
  return from && downhill(calm, from, rates, known)
}

export function cheapest(found: readonly Found[]): Found | null {
  return found.reduce<Found | null>((best, one) => (best && best.charge <= one.charge ? best : one), null)
}

function divisionsAtOnce(scene: Scene, most: number, rates: Rates): Found[] {
  const known: Known = new Map()
  const found: Found[] = []
  for (const outline of outlines(scene, most, rates.sigma)) {
    const fewer = found[found.length - 1]
    let best: Found | null = null
    for (const { joints, kinds } of [outline, ...(fewer ? [split(scene, fewer.division)] : [])]) {
      for (const contact of joints.length > 0 ? [false, true] : [false]) {
        const from = looked(scene, { joints, kinds, contacts: joints.map(() => contact) }, rates, known)
        const down = from && downhill(scene, from, rates, known)
        if (down && (!best || down.charge < best.charge)) best = down
      }
    }
    if (!best) continue
    found.push(relieved(scene, best, rates))
    // Where fewer spans already leave no more than pencil, and one more is no gain, two more are none either.
    if (fewer && fewer.squares <= 2 * rates.sigma * rates.sigma * scene.n && best.charge >= fewer.charge) break
  }
  // What was found for more spans may be better with a joint less than what was found for fewer.
  for (let at = found.length - 1; at > 0; at--) {
    const { division, scene: calmer } = found[at] as Found
    const merged = division.joints.flatMap((_, j) => fewerByOne(division, j)).flatMap(each => looked(calmer, each, rates, new Map()) ?? [])
    const best = cheapest(merged)
    const fewer = found[at - 1] as Found
    if (best && best.pieces.length === fewer.pieces.length && best.charge < fewer.charge) found[at - 1] = relieved(calmer, downhill(calmer, best, rates, new Map()), rates)
  }
  return found
}

/** A division without its joint j: either span's law for both. */
function fewerByOne({ joints, kinds, contacts }: Division, j: number): Division[] {
  const drop = <T>(list: readonly T[], at: number) => list.filter((_, i) => i !== at)
  return [j, j + 1].map(s => ({ joints: drop(joints, j), kinds: drop(kinds, s), contacts: drop(contacts, j) }))
}

function looked(scene: Scene, division: Division, rates: Rates, known: Known): Found | null {
  const pieces = piecesOf(scene, division, known)
  return pieces && foundWith(scene, division, pieces, rates)
}

function foundWith(scene: Scene, division: Division, pieces: Piece[], rates: Rates): Found | null {
  const { charge, squares } = chargeOf(scene, division, pieces, rates)
  return Number.isFinite(charge) ? { division, pieces, scene, squares, charge: charge + MISPLACED_CHARGE * aside(scene) } : null
}

const aside = ({ weights }: Scene) => weights.reduce((count, weight) => count + (weight === 0 ? 1 : 0), 0)

/** The same with lone drawings set aside that cost more than calling them misplaced would, the dearest first. */
function relieved(scene: Scene, found: Found, rates: Rates): Found {
  let best = found
  for (let round = 0; round < mostMisplaced(scene.n); round++) {
    const worst = dearest(best)
    if (!worst || worst.gain <= 2 * rates.sigma * rates.sigma * MISPLACED_CHARGE) break
    const calmer = without(best.scene, worst.at)
    const known: Known = new Map()
    const from = looked(calmer, best.division, rates, known)
    const down = from && downhill(calmer, from, rates, known)
    if (!down || down.charge >= best.charge) break
    best = down
  }
  return best
}

/** The drawing whose going would save most: r²/(1 − h), h its leverage (common least-squares algebra). */
function dearest({ division: { joints }, pieces, scene: { n, rows, weights } }: Found): { at: number, gain: number } | null {
  let worst: { at: number, gain: number } | null = null
  pieces.forEach((piece, s) => {
    const from = s === 0 ? 0 : (joints[s - 1] as number) + 1
    const to = joints[s] ?? n - 1
    for (let i = from; i <= to; i++) {
      if (weights[i] === 0) continue
      const { values, byValue, solvedValue } = piece.at(i)
      const room = 1 - dot(byValue, solvedValue)
      if (room < 0.02) continue
      let off = 0
      rows.forEach((row, r) => { off += ((row[i] as number) - (values[r] as number)) ** 2 })
      if (!worst || off / room > worst.gain) worst = { at: i, gain: off / room }
    }
  })
  return worst
}

/** A division with its longest span cut in half: another place to begin. */
function split({ n }: Scene, { joints, kinds }: Division): { joints: number[], kinds: Kind[] } {
  const ends = [0, ...joints, n - 1]
  let longest = 0
  for (let s = 1; s + 1 < ends.length; s++) {
    if ((ends[s + 1] as number) - (ends[s] as number) > (ends[longest + 1] as number) - (ends[longest] as number)) longest = s
  }
  const cut = ((ends[longest] as number) + (ends[longest + 1] as number)) >> 1
  const kind = kinds[longest] as Kind
  return { joints: [...joints.slice(0, longest), cut, ...joints.slice(longest)], kinds: [...kinds.slice(0, longest), kind, ...kinds.slice(longest)] }
}

/** Moves one joint, changes one span's law or one contact at a time for as long as that is cheaper. */
function downhill(scene: Scene, from: Found, rates: Rates, known: Known): Found {
  const kinds = KINDS.filter(kind => kind !== 'swing' || scene.pull)
  let best = from
  const steps = scene.n > 300 ? [1, 4, 16] : [1, 2, 4]
  for (let round = 0; round < 40; round++) {
    const { division: { joints, kinds: of, contacts } } = best
    const next: Division[] = []
    joints.forEach((at, j) => {
      for (const step of steps) {
        for (const to of [at - step, at + step]) {
          next.push({ joints: joints.with(j, to), kinds: of, contacts })
          // A contact one drawing off fits better than none there.
          if (step === 1) next.push({ joints: joints.with(j, to), kinds: of, contacts: contacts.with(j, !contacts[j]) })
        }
      }
      next.push({ joints, kinds: of, contacts: contacts.with(j, !contacts[j]) })
    })
    of.forEach((kind, s) => {
      for (const other of kinds) if (other !== kind) next.push({ joints, kinds: of.with(s, other), contacts })
    })
    const before = best
    for (const division of next) {
      if (!inOrder(division.joints, scene.n)) continue
      const tried = looked(scene, division, rates, known)
      if (tried && tried.charge < best.charge - 1e-9) best = tried
    }
    if (best === before) break
  }
  return best
}

function inOrder(joints: readonly number[], n: number): boolean {
  return joints.every((at, j) => at > (joints[j - 1] ?? 0) && at < n - 1)
}

/**
 * The same with every swing in it exact, its joints moved, its laws and contacts changed for as long as that is cheaper: summed up from the drawings
 * themselves, a swing carries their pencil along.
 */
export function exactly(request: ReadingCheck, found: Found, rates: Rates): Found {
  if (!found.division.kinds.includes('swing')) return found
  const { scene } = found
  const known: Known = new Map()
  const exact: Known = new Map()
  const look = (division: Division): Found | null => {
    const rough = piecesOf(scene, division, known)
    const pieces = rough?.map((piece, s) => {
      if (piece.kind !== 'swing') return piece
      const from = s === 0 ? 0 : (division.joints[s - 1] as number) + 1
      const to = division.joints[s] ?? scene.n - 1
      const name = `${piece.pull} ${from} ${to}`
      const swing = exact.get(name) ?? exactSwing(request, scene, piece, from, to) ?? piece
      exact.set(name, swing)
      return swing
    })
    return pieces ? foundWith(scene, division, pieces, rates) : null
  }
  let best = look(found.division) ?? found
  for (let round = 0; round < 5; round++) {
    const { joints, kinds, contacts } = best.division
    const moved = joints.flatMap((at, j) => [at - 1, at + 1].map(to => joints.with(j, to))).filter(places => inOrder(places, scene.n))
    const nearer = [
      ...moved.map(places => ({ ...best.division, joints: places })),
      ...contacts.map((contact, j) => ({ ...best.division, contacts: contacts.with(j, !contact) })),
      ...kinds.flatMap((kind, s) => KINDS.filter(other => other !== kind).map(other => ({ ...best.division, kinds: kinds.with(s, other) }))),
    ].flatMap(division => look(division) ?? [])
    const next = cheapest(nearer)
    if (!next || next.charge >= best.charge) break
    best = next
  }
  return best
}
