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

/** Either kind of list, told apart by its first key: the claim says later which one it wants. */
export const anyKeys = z.unknown().transform((value, context): Key[] | PointKey[] => {
  const first: unknown = Array.isArray(value) ? value[0] : undefined
  const points = typeof first === 'object' && first !== null && ('x' in first || 'y' in first)
  const read = (points ? pointKeys : keys).safeParse(value)
  if (read.success) return read.data
  for (const issue of read.error.issues) context.addIssue({ ...issue } as Parameters<typeof context.addIssue>[0])
  return z.NEVER
})

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
const ofReadings = {
  ...rules,
  measure: z.enum(['angle', 'distance', 'arc']),
  radius: z.number().positive().max(1e6).optional(),
  zeroAt: z.number().min(-360).max(360).optional(),
}
const ofPoints = {
  ...rules,
  measure: z.literal('point'),
  yAxis: z.enum(yAxes).optional(),
  path: z.enum(pathKinds).optional(),
  pivot: z.strictObject({ x: coordinate, y: coordinate }).optional(),
}

type Measured = Pick<CheckRequest, 'law' | 'measure' | 'start' | 'subject' | 'spans'> & { radius?: number; path?: string; pivot?: object }

/** A law takes only some measures; an arc needs its radius; a body that turns is no use to a distance; only what can rest starts from rest. */
function refineMeasure(value: Measured, context: z.RefinementCtx): void {
  const refuse = (path: (string | number)[], message: string) => context.addIssue({ code: 'custom', path, message })
  refineLaw(value, value.measure, refuse)
  if (value.measure === 'arc' && value.radius === undefined)
    refuse(['radius'], 'Readings along an arc need the radius of the arc.')
  if (value.measure !== 'arc' && value.radius !== undefined)
    refuse(['radius'], 'Only readings along an arc have a radius.')
  if (!Array.isArray(value.spans)) return
  if (value.spans[0] && value.spans[0].law !== value.law) refuse(['law'], 'The law is that of the first span.')
  value.spans.forEach((each, i) => refineLaw(each, value.measure, (path, message) => refuse(['spans', i, ...path], message)))
}

function refineLaw(
  { law, start, subject: body }: Pick<Measured, 'law' | 'start' | 'subject'>, measure: Measure,
  refuse: (path: (string | number)[], message: string) => void,
): void {
  const turning = turningLaws.includes(law)
  if (!MEASURES[law].includes(measure)) refuse(['measure'], `${capital(LAW_WORDS[law])} is read as ${MEASURES[law].map(one => measureNames[one]).join(', or ')}.`)
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
  ])
  .superRefine(refineMeasure) as unknown as z.ZodType<Claim>

/** True where the list is of the kind that the claim judges. */
export const keysSuit = (claim: Pick<Claim, 'measure'>, list: readonly (Key | PointKey)[]) =>
  (claim.measure === 'point') === (list[0] !== undefined && 'x' in list[0])

/** A claim with a list of its own kind (see `keysSuit`), as the judge takes it. */
export const requestFor = (claim: Claim, fps: number, list: readonly Key[] | readonly PointKey[]) =>
  ({ ...claim, fps, keys: [...list] }) as CheckRequest


const checkSpans = z.union([z.literal('find'), spans]).optional()
export const checkRequest = z
  .discriminatedUnion('measure', [
    z.strictObject({ fps, ...ofReadings, spans: checkSpans, keys }),
    z.strictObject({ fps, ...ofPoints, spans: checkSpans, keys: pointKeys }),
  ])
  .superRefine(refineMeasure)
/** Keeps the schema and the judge's own types from drifting apart: fails to compile when they do. */
type Agrees<A extends B, B> = A
export type CheckBody = Agrees<z.infer<typeof checkRequest>, CheckRequest>
