/**
 * Lists of points of two and three spans with their truth: pieces by school algebra (and a swing by integration) on the plane, put
 * together so that place and velocity carry over, or at a contact the place alone; then at most one fault. Shares no code with the judge.
 */
import { swung } from './motion'
import { Chance } from './random'

type Law = 'steady' | 'slow-in' | 'odd-rule' | 'flight' | 'pendulum'
interface Place { x: number, y: number }

export interface MadePointSpans {
  family: string
  request: {
    law: Law, fps: number, measure: 'point', unit: string, slop: number, tolerance: number, yAxis: 'up' | 'down'
    keys: { frame: number, x: number, y: number }[]
  }
  spans: { from: number, to: number, law: Law, contact?: boolean }[]
  truth: { kind: 'clean' | 'broken-joint', frames: number[] }
}

/** Place and velocity at an exposure counted from the piece's own beginning; height counts up. */
interface Piece { law: Law, exposures: number, contact: boolean, at: (t: number) => Place, ends: Place }

/** Constant acceleration from a place and a velocity. */
function even(law: Law, from: Place, v: Place, a: Place, exposures: number, contact = false): Piece {
  return {
    law, exposures, contact,
    at: t => ({ x: from.x + v.x * t + a.x * t * t / 2, y: from.y + v.y * t + a.y * t * t / 2 }),
    ends: { x: v.x + a.x * exposures, y: v.y + a.y * exposures },
  }
}

type Motion = 'table-flight' | 'flight-contact-flight' | 'fall-contact-rise' | 'flight-contact-slide' | 'slope-steady-in' | 'swing-flight'
export const POINT_MOTIONS: readonly Motion[] = [
  'table-flight', 'flight-contact-flight', 'fall-contact-rise', 'flight-contact-slide', 'slope-steady-in', 'swing-flight',
]

function piecesFor(chance: Chance, motion: Motion): Piece[] | null {
  const n = () => chance.whole(8, 14)
  const [n1, n2, n3] = [n(), n(), n()]
  const way = chance.one([1, -1])
  const speed = way * chance.spread(8, 50)
  const g = -chance.spread(2, 12)
  const down = { x: 0, y: g }
  const none = { x: 0, y: 0 }
  switch (motion) {
    case 'table-flight': {
      const roll = even('steady', none, { x: speed, y: 0 }, none, n1)
      return [roll, even('flight', roll.at(n1), roll.ends, down, n2)]
    }
    case 'flight-contact-flight': {
      const first = even('flight', none, { x: speed, y: -g * n1 * chance.between(0, 0.5) }, down, n1, true)
      return [first, even('flight', first.at(n1), { x: speed, y: -first.ends.y * chance.between(0.5, 0.85) }, down, n2)]
    }
    case 'fall-contact-rise': {
      const fall = even('odd-rule', none, none, down, n1, true)
      return [fall, even('odd-rule', fall.at(n1), { x: 0, y: -fall.ends.y * chance.between(0.5, 0.85) }, down, n2)]
    }
    case 'flight-contact-slide': {
      const thrown = even('flight', none, { x: speed, y: -g * n1 * chance.between(0.1, 0.4) }, down, n1, true)
      return [thrown, even('slow-in', thrown.at(n1), { x: speed, y: 0 }, { x: -speed / n2, y: 0 }, n2)]
    }
    case 'slope-steady-in': {
      const tilt = chance.between(10, 50) * Math.PI / 180
      const along = (size: number): Place => ({ x: size * Math.cos(tilt), y: -Math.abs(size) * Math.sin(tilt) })
      const [v, a] = [along(speed), along(speed / n1)]
      const out = even('odd-rule', none, none, a, n1)
      const on = even('steady', out.at(n1), v, none, n2)
      return [out, on, even('slow-in', on.at(n2), v, { x: -v.x / n3, y: -v.y / n3 }, n3)]
    }
    case 'swing-flight': {
      // Let go of in mid-swing: what flies has the swing's own velocity.
      const length = chance.spread(200, 700)
      const k = chance.between(0.12, 0.25)
      const exposures = Math.round(chance.between(0.32, 0.45) * 2 * Math.PI / k)
      const angles = swung(-1, (k / 8) ** 2, -way * chance.between(40, 70) * Math.PI / 180, 0, 1, exposures * 8 + 8)
      const at = (t: number): Place => {
        const angle = angles[Math.round(t * 8)] ?? NaN
        return { x: length * Math.sin(angle), y: -length * Math.cos(angle) }
      }
      const [p, q] = [at(exposures - 1 / 8), at(exposures + 1 / 8)]
      const swing: Piece = { law: 'pendulum', exposures, contact: false, at, ends: { x: 4 * (q.x - p.x), y: 4 * (q.y - p.y) } }
      return [swing, even('flight', at(exposures), swing.ends, { x: 0, y: -length * k * k }, n2)]
    }
  }
}

type Family = 'clean' | 'speed-jump' | 'position-jump'

function attempt(chance: Chance, family: Family, motion: Motion): MadePointSpans | null {
  const pieces = piecesFor(chance, motion)
  if (!pieces) return null
  const step = chance.one([0.5, 1])
  const slop = step === 0.5 ? 1 : 1.5
  const every = chance.one([1, 2, 2])
  const first = chance.one([0, 1, 101])
  const up = chance.one([1, -1])
  const ends = pieces.reduce<number[]>((all, { exposures }) => [...all, (all[all.length - 1] as number) + exposures], [0])
  const frameAt = (place: number) => first + place * every
  const broken = family === 'clean' ? -1 : chance.whole(0, pieces.length - 2)
  // A contact falls where it falls: at a drawing, or anywhere before the next one.
  const late = pieces[0]?.contact && broken < 0 ? chance.one([0, chance.between(0, 1)]) : 0
  const [ended, bounced] = [pieces[0]?.at((ends[1] as number) + late), pieces[1]?.at(0)] as [Place, Place]
  const exact = pieces.flatMap((piece, i) => Array.from({ length: piece.exposures + (i === 0 ? 1 : 0) }, (_, t) => {
    if (i === 0 || late === 0) return piece.at(i === 0 ? t : t + 1)
    const { x, y } = piece.at(t + 1 - late)
    return { x: x + ended.x - bounced.x, y: y + ended.y - bounced.y }
  }))
  if (broken >= 0 && !breakJoint(chance, exact, pieces, broken, ends[broken + 1] as number, family, slop)) return null
  const corner = { x: chance.between(0, 1500), y: chance.between(0, 1500) }
  const part = chance.between(0.2, 0.6)
  const rounded = (value: number) => Number((Math.round(value / step) * step).toFixed(3))
  const keys = exact.map(({ x, y }, place) => {
    const reach = Math.min(slop - step * 0.71, Math.abs(chance.bell()) * slop * part)
    const turn = chance.between(0, 2 * Math.PI)
    return { frame: frameAt(place), x: rounded(corner.x + x + reach * Math.cos(turn)), y: rounded(corner.y + up * (y + reach * Math.sin(turn))) }
  })
  return {
    family: `points: ${motion}: ${family}`,
    request: {
      law: (pieces[0] as Piece).law, fps: 24, measure: 'point', unit: 'px', slop, tolerance: 0.1, yAxis: up > 0 ? 'up' : 'down', keys,
    },
    spans: pieces.map(({ law, contact }, i) =>
      ({ from: frameAt(ends[i] as number), to: frameAt(ends[i + 1] as number), law, ...(contact ? { contact: true } : {}) })),
    truth: broken < 0 ? { kind: 'clean', frames: [] } : { kind: 'broken-joint', frames: [frameAt(ends[broken + 1] as number)] },
  }
}

/**
 * Shifts what comes after the joint, at once or more and more, by several times what is noticed: along the way that the body goes, so that
 * both spans stay of their laws and on their paths.
 */
function breakJoint(chance: Chance, exact: Place[], pieces: Piece[], which: number, at: number, family: Family, slop: number): boolean {
  const before = pieces[which] as Piece
  const after = pieces[which + 1] as Piece
  if (before.contact && family === 'speed-jump') return false
  const speed = Math.hypot(before.ends.x, before.ends.y)
  const [p, q] = [after.at(0), after.at(0.125)]
  const change = Math.hypot(8 * (q.x - p.x) - before.ends.x, 8 * (q.y - p.y) - before.ends.y)
  const jump = chance.between(5, 9) * (slop + 0.1 * speed) + (before.contact ? 1.3 * change : 0)
  const way = { x: before.ends.x / speed, y: before.ends.y / speed }
  for (let place = at + 1; place < exact.length; place++) {
    // An easing's end must stay a stop: only what runs evenly or flies takes another speed.
    if (family === 'speed-jump' && pieces.slice(which + 1).some(({ law }) => law === 'slow-in')) return false
    const by = jump * (family === 'speed-jump' ? place - at : 1)
    const { x, y } = exact[place] as Place
    exact[place] = { x: x + by * way.x, y: y + by * way.y }
  }
  return true
}

const PLAN = POINT_MOTIONS.flatMap(motion => (['clean', 'clean', 'speed-jump', 'position-jump'] as const).map(family => ({ motion, family })))
  .filter(({ motion, family }) => family !== 'speed-jump' || motion === 'table-flight' || motion === 'swing-flight')

/** How many lists make one round of all families. */
export const POINT_SPAN_ROUND = PLAN.length

/** `count` lists, every family in turn, from one seed. */
export function makePointSpans(count: number, seed: number): MadePointSpans[] {
  const lists: MadePointSpans[] = []
  for (let i = 0; lists.length < count; i++) {
    const { motion, family } = PLAN[lists.length % PLAN.length] as (typeof PLAN)[number]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, motion)
    if (made) lists.push(made)
  }
  return lists
}
