import { MEASURES } from '~/utils/motion/laws/words'
import type { Law, Measure } from '~/utils/motion/types'
import type { ClaimForm } from './form'

/** Which parts of the claim form mean something under the law, or laws, that it names. What means nothing is neither shown nor said. */

type Chosen = Pick<ClaimForm, 'law' | 'measure' | 'divided' | 'spans'>

/** Where a body turns about a pivot under gravity, and so has a size. */
const turning: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay']
export const turns = (law: Law) => turning.includes(law)

/** Every law that the form names, in order, each once. */
export const lawsOf = ({ law, divided, spans }: Chosen): Law[] => (divided ? [...new Set(spans.map((span) => span.law))] : [law])

/** How the list can be read under all of these laws at once; points always can be. */
export const measuresOf = (laws: readonly Law[]): Measure[] =>
  (['angle', 'distance', 'arc', 'point'] as const).filter((measure) => laws.every((law) => MEASURES[law].includes(measure)))

/** A law whose size is that of a body. */
export const needsBody = (form: Chosen) => lawsOf(form).some(turns)

/** Where gravity shows in drawing units, so that a drawing scale means something. */
const scaled: readonly Law[] = ['odd-rule', 'bounce', 'flight']
export const isScaled = (law: Law, measure: Measure) => scaled.includes(law) && measure !== 'angle'
export const takesPath = (form: Chosen) => lawsOf(form).some((law) => isScaled(law, form.measure))
/** A fall may go down a slope, sliding or rolling; what flies or bounces goes straight down. */
export const takesSlope = (form: Chosen) => lawsOf(form).includes('odd-rule') && form.measure !== 'angle'
export const takesGravity = (form: Chosen) => needsBody(form) || takesPath(form)

/** Where an angle stands for something: bodies that turn, read in degrees or along an arc. */
export const takesZero = (form: Chosen) => needsBody(form) && form.measure !== 'point'

/** The laws that may run along any line: those about a pivot have their circle, a flight and a fall over the edge their own path. */
const anyLine: readonly Law[] = ['odd-rule', 'slow-in', 'steady', 'bounce']
export const takesLine = (form: Chosen) => form.measure === 'point' && lawsOf(form).every((law) => anyLine.includes(law))
const pivoted: readonly Law[] = [...turning, 'spin']
export const takesPivot = (form: Chosen & Pick<ClaimForm, 'path'>) =>
  form.measure === 'point' && (lawsOf(form).some((law) => pivoted.includes(law)) || (takesLine(form) && form.path === 'circle'))
