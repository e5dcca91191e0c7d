import { z } from 'zod'
import { LAW_WORDS, MEASURES } from '../motion/laws/words'
import { canRest } from '../motion/standstill'
import type { CheckRequest, CheckResult, Key, Law, Measure, PathKind, Place, PointKey, Span, Subject, YAxis } from '../motion/types'
import { frame, line } from './common'

export type { CheckRequest, CheckResult, Subject }

/** Bounds of what the judge takes: motion.md, "The check call". */
export const CHECK_LIMITS = { minKeys: 3, maxKeys: 2_000, minFps: 1, maxFps: 240, maxReading: 1e6, maxSpans: 4 } as const

export const laws = [
  'odd-rule', 'slow-in', 'steady', 'bounce', 'flight', 'topple', 'over-edge', 'pendulum', 'swing-decay', 'spin',
] as const
export const measures = ['angle', 'distance', 'arc', 'point'] as const
export const pathKinds = ['line', 'circle', 'parabola'] as const
export const yAxes = ['down', 'up'] as const
export const starts = ['rest', 'any'] as const
export const rolls = ['slide', 'ball', 'cylinder', 'shell', 'hoop'] as const

export const law = z.enum(laws)
export const measure = z.enum(measures)
export const fps = z.number().min(CHECK_LIMITS.minFps).max(CHECK_LIMITS.maxFps)
export const reading = z
  .number('A reading is a number.')
  .min(-CHECK_LIMITS.maxReading, 'A reading lies within ±1,000,000.')
  .max(CHECK_LIMITS.maxReading, 'A reading lies within ±1,000,000.')

const metres = z.number().positive('A size is above zero.').max(10_000, 'At most 10,000 m.').min(0.001, 'At least 1 mm.')
const kilograms = z.number().positive('A mass is above zero.').max(1e9, 'At most a billion kilograms.')
const gravity = z.number().min(0.01, 'At least 0.01 m/s².').max(1_000, 'At most 1000 m/s².').optional()

/** One discriminated union, so that a fault is told at the field of the body that was meant. What moves on a path has no shape. */
export const subject = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('rod'), height: metres, gravity }),
  z.strictObject({ shape: z.literal('block'), width: metres, height: metres, gravity }),
  z.strictObject({ shape: z.literal('cylinder'), radius: metres, height: metres, gravity }),
  z.strictObject({
    shape: z.literal('pole'),
    height: metres,
    mass: kilograms,
    headMass: kilograms,
    headHeight: metres,
    gravity,
  }),
  z.strictObject({ shape: z.literal('bob'), length: metres, gravity }),
  z.strictObject({ shape: z.literal('hung-rod'), length: metres, gravity }),
  z.strictObject({ shape: z.literal('custom'), equalLength: metres, gravity }),
  z.strictObject({
    shape: z.undefined().optional(),
    unitsPerMetre: z.number().positive('A scale is above zero.').max(1e6).optional(),
    slope: z.number().gt(0, 'A slope lies above 0° and up to 90°.').max(90, 'A slope lies above 0° and up to 90°.').optional(),
    roll: z.enum(rolls).optional(),
    gravity,
  }),
]) as unknown as z.ZodType<Subject>

const coordinate = z
  .number('A coordinate is a number.')
  .min(-CHECK_LIMITS.maxReading, 'A coordinate lies within ±1,000,000.')
  .max(CHECK_LIMITS.maxReading, 'A coordinate lies within ±1,000,000.')

/** As many keys as a list may have, frames upwards. */
const ordered = <Each extends z.ZodType<{ frame: number }>>(list: z.ZodArray<Each>) =>
  list
    .min(CHECK_LIMITS.minKeys, `A list has at least ${CHECK_LIMITS.minKeys} keys.`)
    .max(CHECK_LIMITS.maxKeys, `A list has at most ${CHECK_LIMITS.maxKeys} keys.`)
    .superRefine((entries, context) => {
      for (let i = 1; i < entries.length; i++) {
        const [before, here] = [entries[i - 1]!.frame, entries[i]!.frame]
        if (here > before) continue
        context.addIssue({
          code: 'custom',
          path: [i, 'frame'],
          message: here === before ? `Frame ${here} stands twice.` : `Frame ${here} comes after frame ${before}: frames go upwards.`,
        })
      }
    })

export const keys = ordered(z.array(z.strictObject({ frame, reading })))

/** Points as keys: drawing units from wherever the drawing counts them. */
export const pointKeys = ordered(z.array(z.strictObject({ frame, x: coordinate, y: coordinate })))

type ListKind = 'point' | 'reading'
/** What a list of the other kind is told, once and at its first key, instead of a complaint about every cell. */
export const keysWanted: Record<ListKind, string> = {
  point: 'This is judged by points: every key has a frame, x and y.',
  reading: 'This is judged by readings: every key has a frame and a reading.',
}
/** What kind of list its first key begins; undefined where that is neither. */
function kindOf(list: unknown): ListKind | undefined {
  const first: unknown = Array.isArray(list) ? list[0] : undefined
  if (typeof first !== 'object' || first === null) return undefined
  return 'x' in first || 'y' in first ? 'point' : 'reading' in first ? 'reading' : undefined
}
const listOf = <List extends Key[] | PointKey[]>(wanted?: ListKind) =>
  z.unknown().transform((value, context): List => {
    const kind = kindOf(value)
    if (wanted && kind && kind !== wanted) {
      context.addIssue({ code: 'custom', path: [0], message: keysWanted[wanted] })
      return z.NEVER
    }
    return passOn<Key[] | PointKey[]>((wanted ?? kind) === 'point' ? pointKeys : keys, value, context) as List
  })
/** Reads by a schema that was only chosen now; its faults keep their paths, which a plain union would swallow. */
function passOn<T>(schema: z.ZodType<T>, value: unknown, context: z.RefinementCtx): T {
  const read = schema.safeParse(value)
  if (read.success) return read.data
  for (const issue of read.error.issues) context.addIssue({ ...issue } as Parameters<typeof context.addIssue>[0])
  return z.NEVER
}

/** Either kind of list, told apart by its first key: the claim says later which one it wants. */
export const anyKeys = listOf<Key[] | PointKey[]>()

const span = z.strictObject({
  from: frame, to: frame, law, contact: z.boolean().optional(), start: z.enum(starts).optional(), subject: subject.optional(),
})
/** Two to four stretches, end to end. */
export const spans = z
  .array(span)
  .min(2, 'One law needs no spans: at least two.')
  .max(CHECK_LIMITS.maxSpans, `At most ${CHECK_LIMITS.maxSpans} spans.`)
  .superRefine((list, context) => {
    list.forEach(({ from, to }, i) => {
      const before = list[i - 1]
      if (to <= from) context.addIssue({ code: 'custom', path: [i, 'to'], message: 'The span ends before it begins.' })
      if (before && before.to !== from)
        context.addIssue({ code: 'custom', path: [i, 'from'], message: `A span begins where the one before it ends: at frame ${before.to}.` })
    })
  })

/** How closely drawings are held, and what moves: shared by every claim and check. */
const rules = {
  law,
  unit: line(16),
  start: z.enum(starts).optional(),
  slop: z.number().min(0, 'Slop is zero or more.').max(1e6),
  tolerance: z.number().min(0).max(1, 'Tolerance is a share between 0 and 1.'),
  subject: subject.optional(),
}
/** A field of the other kind of list: told at its own place, in a sentence. */
const notHere = (message: string) => z.undefined(message).optional()
const onlyOfPoints = notHere('Only points on the drawing have a y axis, a path and a pivot.')
const onlyOfReadings = notHere('Points need neither a radius nor a zero: both are found on the drawing.')
const ofReadings = {
  ...rules,
  measure: z.enum(['angle', 'distance', 'arc']),
  radius: z.number().positive().max(1e6).optional(),
  zeroAt: z.number().min(-360).max(360).optional(),
  yAxis: onlyOfPoints,
  path: onlyOfPoints,
  pivot: onlyOfPoints,
}
const ofPoints = {
  ...rules,
  measure: z.literal('point'),
  radius: onlyOfReadings,
  zeroAt: onlyOfReadings,
  yAxis: z.enum(yAxes).optional(),
  path: z.enum(pathKinds).optional(),
  pivot: z.strictObject({ x: coordinate, y: coordinate }).optional(),
}
const unknownMeasure = {
  error: (issue: { code?: string }) => (issue.code === 'invalid_union' ? `One of: ${measures.join(', ')}.` : undefined),
}

type Measured = Pick<CheckRequest, 'law' | 'measure' | 'start' | 'subject' | 'spans'> & { radius?: number; path?: string; pivot?: object }

/** A law takes only some measures; an arc needs its radius; a body that turns is no use to a distance; only what can rest starts from rest. */
function refineMeasure(value: Measured, context: z.RefinementCtx): void {
  const refuse: Refuse = (path, message) => context.addIssue({ code: 'custom', path, message })
  if (value.measure === 'arc' && value.radius === undefined)
    refuse(['radius'], 'Readings along an arc need the radius of the arc.')
  if (value.measure !== 'arc' && value.radius !== undefined)
    refuse(['radius'], 'Only readings along an arc have a radius.')
  if (!Array.isArray(value.spans)) return refineLaw(value, value.measure, 'measure', refuse)
  if (value.spans[0] && value.spans[0].law !== value.law) refuse(['law'], 'With spans, the law is that of the first one.')
  value.spans.forEach((each, i) =>
    refineLaw(each, value.measure, 'law', (path, message) => refuse(['spans', i, ...path], message)))
}

type Refuse = (path: (string | number)[], message: string) => void
/** `atFault`: the field that is blamed where law and measure don't go together; spans share one measure, so there it is the law. */
function refineLaw(
  { law, start, subject: body }: Pick<Measured, 'law' | 'start' | 'subject'>, measure: Measure, atFault: 'law' | 'measure', refuse: Refuse,
): void {
  const turning = turningLaws.includes(law)
  if (!MEASURES[law].includes(measure)) refuse([atFault], `${capital(LAW_WORDS[law])} is read as ${MEASURES[law].map(one => measureNames[one]).join(', or ')}.`)
  if (start === 'rest' && !canRest(law)) refuse(['start'], `${capital(LAW_WORDS[law])} never stands still at its first key: it can’t start from rest.`)
  if (!body) return
  if ('shape' in body && !turning) refuse(['subject', 'shape'], 'Distances take a drawing scale or a slope, not a turning body.')
  if (!('shape' in body) && turning && (body.unitsPerMetre !== undefined || body.roll !== undefined || body.slope !== undefined) && measure !== 'point')
    refuse(['subject'], `${capital(LAW_WORDS[law])} takes a body: rod, block, cylinder, pole, bob, hung rod or an equal length.`)
  if ('shape' in body && body.shape === 'pole' && body.headHeight > body.height * 2)
    refuse(['subject', 'headHeight'], 'The head sits on the pole, not far above it.')
}

const turningLaws: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay', 'spin']
const measureNames: Record<Measure, string> = { angle: 'an angle', distance: 'a distance', arc: 'an arc with its radius', point: 'points' }
const capital = (words: string) => words[0]!.toUpperCase() + words.slice(1)

/** What a shot claims: a check without its list and rate. Radius and zeroAt belong to readings; yAxis, path and pivot to points. */
export interface Claim extends Pick<CheckRequest, 'law' | 'unit' | 'slop' | 'tolerance' | 'start' | 'subject'> {
  measure: Measure
  radius?: number
  zeroAt?: number
  yAxis?: YAxis
  path?: PathKind
  pivot?: Place
  spans?: Span[]
}

export const claim = z
  .discriminatedUnion('measure', [
    z.strictObject({ ...ofReadings, spans: spans.optional() }),
    z.strictObject({ ...ofPoints, spans: spans.optional() }),
  ], unknownMeasure)
  .superRefine(refineMeasure) as unknown as z.ZodType<Claim>

/** True where the list is of the kind that the claim judges. */
export const keysSuit = (claim: Pick<Claim, 'measure'>, list: readonly (Key | PointKey)[]) =>
  (claim.measure === 'point') === (kindOf(list) === 'point')

/** The frames where one span hands over to the next. */
export const jointsOf = (spans: readonly Span[] | undefined): number[] => (spans ?? []).slice(1).map(({ from }) => from)

/** The first joint of the claim on which the list has no drawing, or null. Spans meet on a drawing. */
export function missingJoint(claim: Pick<Claim, 'spans'>, list: readonly (Key | PointKey)[]): number | null {
  const [first, last] = [list[0]?.frame ?? 0, list.at(-1)?.frame ?? 0]
  // A joint on an end would leave a span without a gap to judge.
  const drawn = new Set(list.map(({ frame }) => frame).filter(frame => frame > first && frame < last))
  return jointsOf(claim.spans).find(frame => !drawn.has(frame)) ?? null
}

export const jointWanted = (frame: number) => `The claim’s laws meet at frame ${frame}: the list needs a drawing there, between its first and its last.`

/**
 * A claim with a list of its own kind (see `keysSuit`) that has a drawing on every joint (see `missingJoint`), as the judge takes
 * it. The first span begins where the list does, and the last one ends with it: a claim fixes the joints, not the length.
 */
export function requestFor(claim: Claim, fps: number, list: readonly Key[] | readonly PointKey[]): CheckRequest {
  const request = { ...claim, fps, keys: [...list] } as CheckRequest
  const [first, last] = [list[0], list.at(-1)]
  if (!claim.spans || !first || !last) return request
  const end = claim.spans.length - 1
  const spans = claim.spans.map((span, i) => ({
    ...span,
    ...(i === 0 ? { from: first.frame } : {}),
    ...(i === end ? { to: last.frame } : {}),
  }))
  return { ...request, spans }
}

/** The spans of a check cover the very list that comes with them: ends on its ends, joints on its drawings. */
function refineCover({ spans, keys }: Pick<CheckRequest, 'spans' | 'keys'>, context: z.RefinementCtx): void {
  if (!Array.isArray(spans)) return
  const refuse = (path: (string | number)[], message: string) => context.addIssue({ code: 'custom', path: ['spans', ...path], message })
  const frames = keys.map(({ frame }) => frame)
  const [first, last] = [frames[0]!, frames.at(-1)!]
  const end = spans.length - 1
  if (spans[0]!.from !== first) refuse([0, 'from'], `The first span begins on the first key: at frame ${first}.`)
  if (spans[end]!.to !== last) refuse([end, 'to'], `The last span ends on the last key: at frame ${last}.`)
  const drawn = new Set(frames)
  spans.slice(0, end).forEach(({ to }, i) => {
    if (!drawn.has(to)) refuse([i, 'to'], `Spans meet on a drawing: there is no key at frame ${to}.`)
  })
}

const checkSpans = z.unknown().transform((value, context): Span[] | 'find' => {
  if (typeof value !== 'string') return passOn(spans, value, context)
  if (value !== 'find') context.addIssue({ code: 'custom', message: 'Spans are a list of two to four, or the word “find”.' })
  return 'find'
}).optional()
export const checkRequest = z
  .discriminatedUnion('measure', [
    z.strictObject({ fps, ...ofReadings, spans: checkSpans, keys: listOf<Key[]>('reading') }),
    z.strictObject({ fps, ...ofPoints, spans: checkSpans, keys: listOf<PointKey[]>('point') }),
  ], unknownMeasure)
  .superRefine(refineMeasure)
  .superRefine(refineCover)
/** Keeps the schema and the judge's own types from drifting apart: fails to compile when they do. */
type Agrees<A extends B, B> = A
export type CheckBody = Agrees<z.infer<typeof checkRequest>, CheckRequest>
