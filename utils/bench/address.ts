import { gravityNames } from '~/utils/bench/gravities'
import { benchLaws, hasBody, hasScale, hasSize, weighs } from '~/utils/bench/laws'
import type { BenchLaw } from '~/utils/bench/laws'
import { exposures, freshSetup, MOST_BESIDE, ranges, within } from '~/utils/bench/setup'
import type { BenchSetup, NumberField } from '~/utils/bench/setup'
import { shapeFields, shapesFor } from '~/utils/claiming/form'
import { rolls } from '~/utils/contracts/check'

/** The bench in the address bar: plain words and numbers, so that it can be read, sent and typed. */

type Query = Record<string, string | null | undefined | (string | null)[]>

/** The names in the address, where the page calls a number by fewer letters than the code does. No law has two of one name. */
const NAMES: Partial<Record<NumberField, string>> = {
  ownGravity: 'g', startSpeed: 'speed', throwSpeed: 'speed', stopAfter: 'seconds', throwAngle: 'angle',
}
const nameOf = (field: NumberField) => NAMES[field] ?? field

const textIn = (query: Query, name: string) => {
  const value = query[name]
  return (Array.isArray(value) ? value[0] : value) ?? ''
}
function oneOf<T extends string>(all: readonly T[], text: string, usual: T): T {
  return all.find((each) => each === text) ?? usual
}
function numberIn(text: string, field: NumberField): number | null {
  if (!/^-?\d{1,9}(\.\d{1,12})?$/.test(text)) return null
  const value = Number(text)
  return within(field, value) ? value : null
}

/** What a law's motion is told by, besides its body, its scale and gravity. */
const own: Record<BenchLaw, readonly NumberField[]> = {
  'odd-rule': ['way', 'slope'],
  'slow-in': ['way'],
  steady: ['way', 'speed'],
  bounce: ['way', 'back', 'bounces'],
  flight: ['throwSpeed', 'throwAngle', 'landing'],
  topple: ['lean'],
  'over-edge': ['lean', 'brink'],
  pendulum: ['amplitude', 'swings'],
  'swing-decay': ['amplitude', 'swings', 'lost'],
  spin: ['rate', 'turns'],
}

/** Numbers that a setup of this law and body is made of: the others are not worth a place in the address. */
export function fieldsOf(setup: BenchSetup): NumberField[] {
  const { law } = setup
  return [
    ...(hasBody(law) ? shapeFields[setup.body] : []),
    ...own[law],
    ...(law === 'slow-in' ? [setup.by === 'seconds' ? 'stopAfter' : 'startSpeed'] as const : []),
    ...(hasScale(law) ? ['scale'] as const : []),
    ...(weighs(law) && setup.gravity === 'own' ? ['ownGravity'] as const : []),
    'fps',
  ]
}

/** What the motion is called by is always said, so that an address can be understood without the page. */
const hushed: readonly NumberField[] = ['scale', 'ownGravity', 'fps', 'slope', 'swings', 'speed']

/** Reads an address. Whatever can't be read, or lies out of range, is as on a fresh bench. */
export function readBench(query: Query): BenchSetup {
  const fresh = freshSetup()
  const law = oneOf(benchLaws, textIn(query, 'law'), fresh.law)
  const shapes = shapesFor[law]
  const setup: BenchSetup = {
    ...fresh,
    law,
    body: hasBody(law) ? oneOf(shapes, textIn(query, 'body'), shapes[0]!) : fresh.body,
    roll: law === 'odd-rule' ? oneOf(rolls, textIn(query, 'roll'), fresh.roll) : fresh.roll,
    by: law === 'slow-in' && textIn(query, 'seconds') === '' && textIn(query, 'speed') !== '' ? 'speed' : fresh.by,
    gravity: weighs(law) ? oneOf(gravityNames, textIn(query, 'gravity'), fresh.gravity) : fresh.gravity,
    on: exposures.find((each) => String(each) === textIn(query, 'on')) ?? fresh.on,
    have: numberIn(textIn(query, 'have'), 'have'),
  }
  for (const field of fieldsOf(setup)) setup[field as 'lean'] = numberIn(textIn(query, nameOf(field)), field) ?? ranges[field].usual
  const sizes = textIn(query, 'beside').split(/[\s,]+/).map((text) => numberIn(text, 'height'))
  if (hasSize(law)) setup.beside = [...new Set(sizes.filter((size) => size !== null))].slice(0, MOST_BESIDE)
  return setup
}

/** The address of a setup: law always, the rest where it differs from a fresh bench. */
export function writeBench(setup: BenchSetup): Record<string, string> {
  const fresh = freshSetup()
  const query: Record<string, string> = { law: setup.law }
  if (hasBody(setup.law)) query.body = setup.body
  for (const field of fieldsOf(setup)) {
    if (!hushed.includes(field) || setup[field] !== fresh[field]) query[nameOf(field)] = plain(setup[field]!)
  }
  if (setup.law === 'odd-rule' && setup.roll !== fresh.roll) query.roll = setup.roll
  if (weighs(setup.law) && setup.gravity !== fresh.gravity) query.gravity = setup.gravity
  if (setup.on !== fresh.on) query.on = String(setup.on)
  if (setup.have !== null) query.have = plain(setup.have)
  if (hasSize(setup.law) && setup.beside.length > 0) query.beside = setup.beside.map(plain).join(',')
  return query
}

/** No exponents, and no minus before nothing: an address is read by people. */
const plain = (value: number) => value.toFixed(12).replace(/\.?0+$/, '').replace(/^-0$/, '0')

export const sameBench = (a: BenchSetup, b: BenchSetup) => JSON.stringify(writeBench(a)) === JSON.stringify(writeBench(b))
