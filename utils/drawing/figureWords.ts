import { figure, roundFigure } from '~/utils/drawing/words'
import type { Figure } from '~/utils/motion/types'

/** What else the timing tells, one plain line each: "Each bounce gives back 62 % of its speed (60–64)." */

/** "62 (60–64)"; the ends are left out where they say nothing that the value doesn't. */
function between({ value, low, high }: Pick<Figure, 'value' | 'low' | 'high'>, write: (value: number, finer: boolean) => string): string {
  const ends = (finer: boolean) => [write(low, finer), write(high, finer)] as const
  const [from, to] = [false, true].map(ends).find(([a, b]) => a !== b) ?? ['', '']
  return from ? `${write(value, false)} (${from}–${to})` : write(value, false)
}

const rounded = (value: number, finer: boolean) => roundFigure(value, finer ? 3 : 2)
const tenths = (value: number, finer: boolean) => (Number.isInteger(value) && !finer ? String(value) : figure(value, finer ? 2 : 1))
/** Shares come as percent or as parts of one. */
const percent = ({ value, low, high, unit }: Figure) => {
  const times = unit === '%' ? 1 : 100
  return { value: value * times, low: low * times, high: high * times }
}
const shared = (one: Figure) => {
  const [value, ends] = between(percent(one), rounded).split(' (')
  return `${value} %`.concat(ends ? ` (${ends}` : '')
}

export function figureInWords(one: Figure): string {
  switch (one.kind) {
    case 'restitution': return `Each bounce gives back ${shared(one)} of its speed.`
    case 'share-lost': return `Each full swing loses ${shared(one)} of its reach.`
    case 'turns': return `Turns ${between(one, rounded)} times a second.`
    case 'stop': return `Comes to rest at frame ${between(one, tenths)}.`
    case 'contact': return `Touches at frame ${between(one, tenths)}.`
    case 'release': return `Leaves the edge at frame ${between(one, tenths)}.`
    case 'release-angle': return `Leaves the edge ${between(one, tenths).replace(/^(\S+)/, '$1°')} from upright.`
    case 'gravity':
      return one.unit === 'm/s²' ? `Reads as a gravity of ${between(one, rounded)} m/s².` : `Reads as ${between(one, rounded)} ${one.unit}.`
  }
}
