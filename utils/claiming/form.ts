import { plainIssues } from '~/utils/contracts/issues'
import { claim as claimSchema } from '~/utils/contracts/production'
import type { Claim } from '~/utils/contracts/production'
import { MEASURES } from '~/utils/motion/laws/words'
import { canRest } from '~/utils/motion/standstill'
import type { Law, Measure, Roll, Shape, Subject } from '~/utils/motion/types'
import { readNumber } from '~/utils/pasting'

/** The claim form: every field as text, because half a number is no number yet. */
export interface ClaimForm {
  law: Law
  measure: Measure
  unit: string
  radius: string
  zeroAt: string
  /** The motion starts from rest at the first key; kept, and left unsaid, under a law that never rests. */
  fromRest: boolean
  slop: string
  /** Percent of a gap. */
  tolerance: string
  /** `none`: the size is left open, so the judge only says what the timing reads as. */
  body: Shape | 'none'
  sizes: Record<SizeField, string>
  unitsPerMetre: string
  slope: string
  roll: Roll
  gravity: 'earth' | 'own'
  ownGravity: string
}
export const sizeFields = ['height', 'width', 'radius', 'mass', 'headMass', 'headHeight', 'length', 'equalLength'] as const
export type SizeField = (typeof sizeFields)[number]

export const shapeFields: Record<Shape, readonly SizeField[]> = {
  rod: ['height'],
  block: ['width', 'height'],
  cylinder: ['radius', 'height'],
  pole: ['height', 'headHeight', 'mass', 'headMass'],
  bob: ['length'],
  'hung-rod': ['length'],
  custom: ['equalLength'],
}
/** Bodies that a law can be about. What goes over stands; what swings hangs. */
export const shapesFor: Record<Law, readonly Shape[]> = {
  topple: ['rod', 'block', 'cylinder', 'pole', 'custom'],
  pendulum: ['bob', 'hung-rod', 'custom'],
  'over-edge': ['rod', 'block', 'cylinder', 'pole'],
  'swing-decay': ['bob', 'hung-rod', 'custom'],
  'odd-rule': [],
  'slow-in': [],
  steady: [],
  spin: [],
  bounce: [],
  flight: [],
}
export { MEASURES as measuresFor } from '~/utils/motion/laws/words'

export const lawSentences: Record<Law, string> = {
  'odd-rule': 'Falls, throws and ramps: gaps grow 1 : 3 : 5 : 7 from the apex.',
  topple: 'Stands, leans and goes over: hardly moves at first, then all at once. The taller, the slower.',
  pendulum: 'Swings from a pivot: slow in and slow out at the ends, fastest at the bottom.',
  steady: 'The same gap on every drawing: nothing pushes, nothing brakes.',
  'slow-in': 'Slides or rolls to a stop: the odd rule backwards, with the stop in the list.',
  'swing-decay': 'Swings that die away: every swing loses the same share of the one before.',
  spin: 'Turns at a constant rate; readings may count on past a full turn or begin again.',
  bounce: 'Drops and comes back: every bounce gives back the same share of the speed.',
  flight: 'Thrown: steady sideways, odd rule downward, one gravity for both.',
  'over-edge': 'Tips off a brink: turns on the arc, lets go, then flies and turns on evenly.',
}
export const shapeWords: Record<Shape, string> = {
  rod: 'Thin rod on its foot',
  block: 'Block over its edge',
  cylinder: 'Upright cylinder',
  pole: 'Pole with a head',
  bob: 'Bob on a cord',
  'hung-rod': 'Rod hung by its end',
  custom: 'Equal length is known',
}
export const sizeWords: Record<SizeField, string> = {
  height: 'Height, m',
  width: 'Width, m',
  radius: 'Radius, m',
  mass: 'Mass of the pole, kg',
  headMass: 'Mass of the head, kg',
  headHeight: 'Head at, m',
  length: 'Length, m',
  equalLength: 'Equal-pendulum length, m',
}

const text = (value: number | undefined) => (value === undefined ? '' : String(value))
const noSizes = () => Object.fromEntries(sizeFields.map((field) => [field, ''])) as Record<SizeField, string>

/** The form as it opens: on the claim that stands, or on a topple with the trade's usual slop. */
export function formOf(claim: Claim | null): ClaimForm {
  const subject: Subject | undefined = claim?.subject
  const body = subject && 'shape' in subject ? subject : null
  const path = subject && !('shape' in subject) ? subject : null
  const sizes = noSizes()
  if (body) for (const field of shapeFields[body.shape]) sizes[field] = text((body as Partial<Record<SizeField, number>>)[field])
  return {
    law: claim?.law ?? 'topple',
    measure: claim?.measure ?? 'angle',
    unit: claim && claim.measure !== 'angle' ? claim.unit : 'px',
    radius: text(claim?.radius),
    zeroAt: text(claim?.zeroAt),
    fromRest: claim?.start === 'rest',
    slop: text(claim?.slop ?? 0.3),
    tolerance: text(claim ? Number((claim.tolerance * 100).toPrecision(6)) : 10),
    body: body?.shape ?? 'none',
    sizes,
    unitsPerMetre: text(path?.unitsPerMetre),
    slope: text(path?.slope),
    roll: path?.roll ?? 'slide',
    gravity: subject?.gravity === undefined ? 'earth' : 'own',
    ownGravity: text(subject?.gravity),
  }
}

/** Another law keeps what still fits and drops what it can't take: a swing has no distance, a fall no block. */
export function withLaw(form: ClaimForm, law: Law): ClaimForm {
  const measure = MEASURES[law].includes(form.measure) ? form.measure : MEASURES[law][0]!
  const body = form.body !== 'none' && !shapesFor[law].includes(form.body) ? 'none' : form.body
  return { ...form, law, measure, body }
}

const turning: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay']
/** Where a body turns about a pivot under gravity, and so has a size. */
export const turns = (law: Law) => turning.includes(law)
/** Where a drawing scale, a slope and a way of rolling mean something. */
export const takesPath = (form: Pick<ClaimForm, 'law' | 'measure'>) => form.law === 'odd-rule' && form.measure !== 'angle'

export type ClaimReading = { claim: Claim; complaints: Record<string, string> } | { claim: null; complaints: Record<string, string> }

/** The claim that the form says, or what is wrong with it, by field path. */
export function readForm(form: ClaimForm): ClaimReading {
  const complaints: Record<string, string> = {}
  const number = (path: string, value: string, needed = false): number | undefined => {
    const read = readNumber(value)
    if (read !== null) return read
    if (value.trim() !== '' || needed) complaints[path] = value.trim() === '' ? 'Write a number here.' : 'This is not a number.'
    return undefined
  }
  const angle = form.measure === 'angle'
  const draft: Record<string, unknown> = {
    law: form.law,
    measure: form.measure,
    unit: angle ? 'deg' : form.unit,
    slop: number('slop', form.slop, true),
    tolerance: percent(number('tolerance', form.tolerance, true)),
  }
  if (form.measure === 'arc') draft.radius = number('radius', form.radius, true)
  // Where nothing turns, no angle stands for anything.
  const zeroAt = turns(form.law) ? number('zeroAt', form.zeroAt) : undefined
  if (zeroAt) draft.zeroAt = zeroAt
  if (form.fromRest && canRest(form.law)) draft.start = 'rest'
  const subject = subjectOf(form, number)
  if (subject) draft.subject = subject
  const read = claimSchema.safeParse(draft)
  if (!read.success)
    for (const { path, message } of plainIssues(read.error.issues)) complaints[path] ??= message
  return read.success && Object.keys(complaints).length === 0 ? { claim: read.data, complaints } : { claim: null, complaints }
}

const percent = (value: number | undefined) => (value === undefined ? undefined : Number((value / 100).toPrecision(12)))

function subjectOf(form: ClaimForm, number: (path: string, value: string, needed?: boolean) => number | undefined) {
  const gravity = form.gravity === 'own' ? number('subject.gravity', form.ownGravity, true) : undefined
  const withGravity = gravity === undefined ? {} : { gravity }
  if (turns(form.law)) {
    if (form.body === 'none') return form.gravity === 'own' ? withGravity : undefined
    const sizes = shapeFields[form.body].map((field) => [field, number(`subject.${field}`, form.sizes[field], true)])
    return { shape: form.body, ...Object.fromEntries(sizes), ...withGravity }
  }
  if (!takesPath(form)) return undefined
  const path: Record<string, unknown> = { ...withGravity }
  const scale = number('subject.unitsPerMetre', form.unitsPerMetre)
  const slope = number('subject.slope', form.slope)
  if (scale !== undefined) path.unitsPerMetre = scale
  if (slope !== undefined) path.slope = slope
  if (form.roll !== 'slide') path.roll = form.roll
  return Object.keys(path).length > 0 ? path : undefined
}
