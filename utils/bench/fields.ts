import { flatAngle } from '~/utils/bench/plans'
import { fieldsOf } from '~/utils/bench/address'
import type { BenchSetup, NumberField } from '~/utils/bench/setup'
import { sizeWords } from '~/utils/claiming/form'
import type { SizeField } from '~/utils/claiming/form'
import { roundFigure } from '~/utils/drawing/words'

/** The numbers that the form asks for under a law, in the order in which one would tell them. */
export interface AskedField { field: NumberField; label: string; unit: string; hint?: string }

type Words = Omit<AskedField, 'field'>
const words: Partial<Record<NumberField, Words>> = {
  amplitude: { label: 'Amplitude', unit: 'degrees' },
  swings: { label: 'Swings', unit: '', hint: 'One is there and back.' },
  lost: { label: 'Lost per swing', unit: '%', hint: 'Of the amplitude.' },
  slope: { label: 'Slope', unit: 'degrees', hint: '90 is a free fall.' },
  speed: { label: 'Speed', unit: 'm/s' },
  stopAfter: { label: 'Stops after', unit: 's' },
  startSpeed: { label: 'Starts with', unit: 'm/s' },
  throwSpeed: { label: 'Speed', unit: 'm/s' },
  throwAngle: { label: 'Angle', unit: 'degrees', hint: 'From level; a minus throws down.' },
  landing: { label: 'Drop', unit: 'm', hint: 'To where it lands; 0 is level.' },
  brink: { label: 'Brink', unit: 'm', hint: 'Above the ground.' },
  rate: { label: 'Turns per second', unit: '' },
  turns: { label: 'Turns', unit: '' },
  back: { label: 'Gives back', unit: '%', hint: 'Of the speed, each time.' },
  bounces: { label: 'Contacts', unit: '', hint: 'The last one ends it.' },
  scale: { label: 'Scale', unit: 'px per m' },
}

function wordsFor(field: NumberField, setup: BenchSetup): Words {
  if (field === 'way') return { label: setup.law === 'bounce' || (setup.law === 'odd-rule' && setup.slope >= 90) ? 'Drop' : 'Way', unit: 'm' }
  if (field === 'lean') return { label: 'Lean', unit: 'degrees', hint: setup.law === 'topple' ? `Lies flat at ${roundFigure(flatAngle(setup), 3)}°.` : 'Past balance, at rest.' }
  const known = words[field]
  if (known) return known
  // The claim form's words carry their unit behind a comma.
  const [label, unit] = sizeWords[field as SizeField].split(', ')
  return { label: label!, unit: unit! }
}

/** Gravity of one's own and the rate have places of their own on the form. */
export const askedFields = (setup: BenchSetup): AskedField[] =>
  fieldsOf(setup).filter((field) => field !== 'fps' && field !== 'ownGravity').map((field) => ({ field, ...wordsFor(field, setup) }))
