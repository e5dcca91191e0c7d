import { z } from 'zod'
import { canRest } from '../motion/standstill'
import type { CheckRequest, CheckResult, Subject } from '../motion/types'
import { frame, line } from './common'

export type { CheckRequest, CheckResult, Subject }

/** Bounds of what the judge takes: motion.md, "The check call". */
export const CHECK_LIMITS = { minKeys: 3, maxKeys: 2_000, minFps: 1, maxFps: 240, maxReading: 1e6 } as const

export const laws = ['odd-rule', 'topple', 'pendulum', 'steady'] as const
export const measures = ['angle', 'distance', 'arc'] as const
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

export const keys = z
  .array(z.strictObject({ frame, reading }))
  .min(CHECK_LIMITS.minKeys, `A list has at least ${CHECK_LIMITS.minKeys} keys.`)
  .max(CHECK_LIMITS.maxKeys, `A list has at most ${CHECK_LIMITS.maxKeys} keys.`)
  .superRefine((list, context) => {
    for (let i = 1; i < list.length; i++) {
      if (list[i]!.frame > list[i - 1]!.frame) continue
      context.addIssue({
        code: 'custom',
        path: [i, 'frame'],
        message:
          list[i]!.frame === list[i - 1]!.frame
            ? `Frame ${list[i]!.frame} stands twice.`
            : `Frame ${list[i]!.frame} comes after frame ${list[i - 1]!.frame}: frames go upwards.`,
      })
    }
  })

/** How readings are taken and how closely they are held: shared by a claim and a check. */
export const readingRules = {
  law,
  measure,
  unit: line(16),
  radius: z.number().positive().max(1e6).optional(),
  zeroAt: z.number().min(-360).max(360).optional(),
  start: z.enum(starts).optional(),
  slop: z.number().min(0, 'Slop is zero or more.').max(1e6),
  tolerance: z.number().min(0).max(1, 'Tolerance is a share between 0 and 1.'),
  subject: subject.optional(),
}

interface Measured {
  law: (typeof laws)[number]
  measure: (typeof measures)[number]
  radius?: number
  start?: (typeof starts)[number]
  subject?: z.infer<typeof subject>
}

/** A law that turns needs an angle; an arc needs its radius; a body that turns is no use to a distance; only what can rest starts from rest. */
export function refineMeasure(value: Measured, context: z.RefinementCtx): void {
  const turning = value.law === 'topple' || value.law === 'pendulum'
  const refuse = (path: string[], message: string) => context.addIssue({ code: 'custom', path, message })
  if (turning && value.measure === 'distance')
    refuse(['measure'], `A ${value.law} is read as an angle, or as an arc with its radius.`)
  if (value.measure === 'arc' && value.radius === undefined)
    refuse(['radius'], 'Readings along an arc need the radius of the arc.')
  if (value.measure !== 'arc' && value.radius !== undefined)
    refuse(['radius'], 'Only readings along an arc have a radius.')
  if (value.start === 'rest' && !canRest(value.law))
    refuse(['start'], 'Even spacing never stands still: it can’t start from rest.')
  const body = value.subject
  if (!body) return
  if ('shape' in body && value.measure === 'distance')
    refuse(['subject', 'shape'], 'Distances take a drawing scale or a slope, not a turning body.')
  if (!('shape' in body) && turning && (body.unitsPerMetre !== undefined || body.roll !== undefined || body.slope !== undefined))
    refuse(['subject'], `A ${value.law} takes a body: rod, block, cylinder, pole, bob, hung rod or an equal length.`)
  if ('shape' in body && body.shape === 'pole' && body.headHeight > body.height * 2)
    refuse(['subject', 'headHeight'], 'The head sits on the pole, not far above it.')
}

export const checkRequest = z.strictObject({ fps, ...readingRules, keys }).superRefine(refineMeasure)
/** Keeps the schema and the judge's own types from drifting apart: fails to compile when they do. */
type Agrees<A extends B, B> = A
export type CheckBody = Agrees<z.infer<typeof checkRequest>, CheckRequest>
