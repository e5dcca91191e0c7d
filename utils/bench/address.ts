import { gravityNames } from '~/utils/bench/gravities'
import { benchLaws, exposures, freshSetup, MOST_BESIDE, ranges, within } from '~/utils/bench/setup'
import type { BenchSetup, NumberField } from '~/utils/bench/setup'
import { shapeFields, shapesFor, turns } from '~/utils/claiming/form'
import { rolls } from '~/utils/contracts/check'

/** The bench in the address bar: plain words and numbers, so that it can be read, sent and typed. */

type Query = Record<string, string | null | undefined | (string | null)[]>

/** The names in the address, where they are shorter than the field's own. */
const NAMES: Partial<Record<NumberField, string>> = { ownGravity: 'g' }
const nameOf = (field: NumberField) => NAMES[field] ?? field

const textIn = (query: Query, name: string) => {
  const value = query[name]
  return (Array.isArray(value) ? value[0] : value) ?? ''
}
function oneOf<T extends string>(all: readonly T[], text: string, usual: T): T {
  return all.find((each) => each === text) ?? usual
}
function numberIn(text: string, field: NumberField): number | null {
  if (!/^\d{1,9}(\.\d{1,12})?$/.test(text)) return null
  const value = Number(text)
  return within(field, value) ? value : null
}

/** Numbers that a setup of this law and body is made of: the others are not worth a place in the address. */
function fieldsOf(setup: BenchSetup): NumberField[] {
  const gravity: NumberField[] = setup.gravity === 'own' ? ['ownGravity'] : []
  if (setup.law === 'topple') return [...shapeFields[setup.body], 'lean', ...gravity, 'fps']
  if (setup.law === 'pendulum') return [...shapeFields[setup.body], 'amplitude', 'swings', ...gravity, 'fps']
  if (setup.law === 'odd-rule') return ['way', 'slope', 'scale', ...gravity, 'fps']
  return ['way', 'speed', 'scale', 'fps']
}

/** Reads an address. Whatever can't be read, or lies out of range, is as on a fresh bench. */
export function readBench(query: Query): BenchSetup {
  const fresh = freshSetup()
  const law = oneOf(benchLaws, textIn(query, 'law'), fresh.law)
  const shapes = shapesFor[law]
  const setup: BenchSetup = {
    ...fresh,
    law,
    body: turns(law) ? oneOf(shapes, textIn(query, 'body'), shapes[0]!) : fresh.body,
    roll: law === 'odd-rule' ? oneOf(rolls, textIn(query, 'roll'), fresh.roll) : fresh.roll,
    gravity: law === 'steady' ? fresh.gravity : oneOf(gravityNames, textIn(query, 'gravity'), fresh.gravity),
    on: exposures.find((each) => String(each) === textIn(query, 'on')) ?? fresh.on,
    have: numberIn(textIn(query, 'have'), 'have'),
  }
  for (const field of fieldsOf(setup)) setup[field as 'lean'] = numberIn(textIn(query, nameOf(field)), field) ?? ranges[field].usual
  const sizes = textIn(query, 'beside').split(/[\s,]+/).map((text) => numberIn(text, 'height'))
  setup.beside = [...new Set(sizes.filter((size) => size !== null))].slice(0, MOST_BESIDE)
  return setup
}

/** The address of a setup: law always, the rest where it differs from a fresh bench. */
export function writeBench(setup: BenchSetup): Record<string, string> {
  const fresh = freshSetup()
  const query: Record<string, string> = { law: setup.law }
  if (turns(setup.law)) query.body = setup.body
  for (const field of fieldsOf(setup)) {
    // What the size is called by is always said, so that an address can be understood without the page.
    const telling = shapeFields[setup.body].includes(field as never) || field === 'way' || field === 'lean' || field === 'amplitude'
    if (telling || setup[field] !== fresh[field]) query[nameOf(field)] = plain(setup[field]!)
  }
  if (setup.law === 'odd-rule' && setup.roll !== fresh.roll) query.roll = setup.roll
  if (setup.law !== 'steady' && setup.gravity !== fresh.gravity) query.gravity = setup.gravity
  if (setup.on !== fresh.on) query.on = String(setup.on)
  if (setup.have !== null) query.have = plain(setup.have)
  if (setup.beside.length > 0) query.beside = setup.beside.map(plain).join(',')
  return query
}

/** No exponents: an address is read by people. */
const plain = (value: number) => String(Number(value.toFixed(12)))

export const sameBench = (a: BenchSetup, b: BenchSetup) => JSON.stringify(writeBench(a)) === JSON.stringify(writeBench(b))
