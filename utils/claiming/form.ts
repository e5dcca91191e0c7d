import { plainIssues } from '~/utils/contracts/issues'
import { claim as claimSchema } from '~/utils/contracts/production'
import type { Claim } from '~/utils/contracts/production'
import { canRest } from '~/utils/motion/standstill'
import type { Law, Measure, PathKind, Roll, Shape, Subject, YAxis } from '~/utils/motion/types'
import { readNumber } from '~/utils/pasting'
import { isScaled, lawsOf, measuresOf, takesLine, takesPivot, takesSlope, takesZero, turns } from './needs'
import { divided, rowsOfSpans, spansOf } from './spans'
import type { SpanRow } from './spans'

export { turns } from './needs'

/** The claim form: every field as text, because half a number is no number yet. */
export interface ClaimForm {
  law: Law
  /** Several laws, one after the other: then `spans` says them, and `law` waits. */
  divided: boolean
  firstFrame: string
  spans: SpanRow[]
  measure: Measure
  yAxis: YAxis
  /** `found`: the judge finds the line that the points run along. */
  path: PathKind | 'found'
  /** Both left open: the judge finds where it turns about. */
  pivotX: string
  pivotY: string
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
/** The laws as a person looks for them. */
export const lawGroups: readonly { title: string; laws: readonly Law[] }[] = [
  { title: 'Along a path', laws: ['odd-rule', 'slow-in', 'steady', 'bounce'] },
  { title: 'Thrown', laws: ['flight'] },
  { title: 'Turning', laws: ['topple', 'over-edge', 'pendulum', 'swing-decay', 'spin'] },
]

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
  // A divided claim may name one thing for the laws that turn and another for those that run: each part of the form takes its own.
  const subjects = claim ? [claim.subject, ...(claim.spans ?? []).map((span) => span.subject)].filter((one) => one !== undefined) : []
  const body = subjects.find((one) => 'shape' in one)
  const path = subjects.find((one): one is Exclude<Subject, { shape: Shape }> => !('shape' in one))
  const gravity = subjects.find((one) => one.gravity !== undefined)?.gravity
  const sizes = noSizes()
  if (body && 'shape' in body) for (const field of shapeFields[body.shape]) sizes[field] = text((body as Partial<Record<SizeField, number>>)[field])
  return {
    law: claim?.law ?? 'topple',
    divided: claim?.spans !== undefined,
    firstFrame: text(claim?.spans?.[0]?.from),
    spans: rowsOfSpans(claim?.spans ?? []),
    measure: claim?.measure ?? 'angle',
    yAxis: claim?.yAxis ?? 'down',
    path: claim?.path ?? 'found',
    pivotX: text(claim?.pivot?.x),
    pivotY: text(claim?.pivot?.y),
    unit: claim && claim.measure !== 'angle' ? claim.unit : 'px',
    radius: text(claim?.radius),
    zeroAt: text(claim?.zeroAt),
    fromRest: claim?.start === 'rest',
    slop: text(claim?.slop ?? 0.3),
    tolerance: text(claim ? Number((claim.tolerance * 100).toPrecision(6)) : 10),
    body: body && 'shape' in body ? body.shape : 'none',
    sizes,
    unitsPerMetre: text(path?.unitsPerMetre),
    slope: text(path?.slope),
    roll: path?.roll ?? 'slide',
    gravity: gravity === undefined ? 'earth' : 'own',
    ownGravity: text(gravity),
  }
}

/** Other laws keep what still fits and drop what they can't take: a swing has no distance, a fall no block. */
function settled(form: ClaimForm): ClaimForm {
  const laws = lawsOf(form)
  const measures = measuresOf(laws)
  const measure = measures.includes(form.measure) ? form.measure : measures[0]!
  const shape = form.body
  const body = shape !== 'none' && !laws.some((law) => shapesFor[law].includes(shape)) ? 'none' : shape
  return { ...form, measure, body }
}
export const withLaw = (form: ClaimForm, law: Law): ClaimForm => settled({ ...form, law })
export const withSpans = (form: ClaimForm, spans: SpanRow[]): ClaimForm => settled({ ...form, spans })

/** From one law to several over these frames, and back to the first of them. Rows that were there before are there again. */
export function withDivision(form: ClaimForm, on: boolean, first: number, last: number): ClaimForm {
  if (!on) return settled({ ...form, divided: false, law: form.spans[0]?.law ?? form.law })
  if (form.spans.length > 0) return settled({ ...form, divided: true })
  return settled({ ...form, divided: true, firstFrame: String(first), spans: divided(first, last, form.law, form.fromRest) })
}

export type ClaimReading = { claim: Claim; complaints: Record<string, string> } | { claim: null; complaints: Record<string, string> }
type ReadField = (path: string, value: string, needed?: boolean) => number | undefined

/** The claim that the form says, or what is wrong with it, by field path. */
export function readForm(form: ClaimForm): ClaimReading {
  const complaints: Record<string, string> = {}
  const number: ReadField = (path, value, needed = false) => {
    const read = readNumber(value)
    if (read !== null) return read
    if (value.trim() !== '' || needed) complaints[path] = value.trim() === '' ? 'Write a number here.' : 'This is not a number.'
    return undefined
  }
  const angle = form.measure === 'angle'
  const law = form.divided ? (form.spans[0]?.law ?? form.law) : form.law
  const draft: Record<string, unknown> = {
    law,
    measure: form.measure,
    unit: angle ? 'deg' : form.unit,
    slop: number('slop', form.slop, true),
    tolerance: percent(number('tolerance', form.tolerance, true)),
  }
  if (form.measure === 'arc') draft.radius = number('radius', form.radius, true)
  const zeroAt = takesZero(form) ? number('zeroAt', form.zeroAt) : undefined
  if (zeroAt) draft.zeroAt = zeroAt
  if (form.measure === 'point') Object.assign(draft, onDrawing(form, number))
  if (!form.divided && form.fromRest && canRest(form.law)) draft.start = 'rest'
  const subjects = subjectsOf(form, number)
  const owner = lawsOf(form).find((each) => subjects(each) !== undefined)
  if (owner) draft.subject = subjects(owner)
  if (form.divided) {
    number('spans[0].from', form.firstFrame, true)
    form.spans.forEach((row, i) => number(`spans[${i}].to`, row.to, true))
    draft.spans = spansOf(form.firstFrame, form.spans, (each) => (owner === undefined || turns(each) === turns(owner) ? undefined : subjects(each)))
  }
  const read = claimSchema.safeParse(draft)
  if (!read.success)
    for (const { path, message } of plainIssues(read.error.issues)) complaints[fieldOf(path)] ??= message
  return read.success && Object.keys(complaints).length === 0 ? { claim: read.data, complaints } : { claim: null, complaints }
}

/** The field of the form that a fault of the claim belongs to: there is one body and one scale, whichever span they went into. */
export const fieldOf = (path: string) => path.replace(/^claim\.?/, '').replace(/^spans\[\d+\]\.subject/, 'subject')

const percent = (value: number | undefined) => (value === undefined ? undefined : Number((value / 100).toPrecision(12)))

/** Where the points are and what they run along. A pivot has both its numbers or none. */
function onDrawing(form: ClaimForm, number: ReadField) {
  const said: Record<string, unknown> = {}
  if (form.yAxis === 'up') said.yAxis = 'up'
  if (takesLine(form) && form.path !== 'found') said.path = form.path
  const hasPivot = form.pivotX.trim() !== '' || form.pivotY.trim() !== ''
  if (takesPivot(form) && hasPivot) said.pivot = { x: number('pivot.x', form.pivotX, true), y: number('pivot.y', form.pivotY, true) }
  return said
}

/** What moves, for each of the laws; fields are read once, so that each fault is told once. */
function subjectsOf(form: ClaimForm, number: ReadField): (law: Law) => Subject | undefined {
  const laws = lawsOf(form)
  const gravity = form.gravity === 'own' && laws.some((law) => turns(law) || isScaled(law, form.measure)) ? number('subject.gravity', form.ownGravity, true) : undefined
  const withGravity = gravity === undefined ? {} : { gravity }
  const said = (subject: object) => (Object.keys(subject).length > 0 ? (subject as Subject) : undefined)
  const body = laws.some(turns) && form.body !== 'none'
    ? { shape: form.body, ...Object.fromEntries(shapeFields[form.body].map((field) => [field, number(`subject.${field}`, form.sizes[field], true)])), ...withGravity }
    : withGravity
  const path: Record<string, unknown> = { ...withGravity }
  if (laws.some((law) => isScaled(law, form.measure))) {
    const scale = number('subject.unitsPerMetre', form.unitsPerMetre)
    if (scale !== undefined) path.unitsPerMetre = scale
  }
  if (takesSlope(form)) {
    const slope = number('subject.slope', form.slope)
    if (slope !== undefined) path.slope = slope
    if (form.roll !== 'slide') path.roll = form.roll
  }
  return (law) => (turns(law) ? said(body) : isScaled(law, form.measure) ? said(path) : undefined)
}
