import { gravities } from '~/utils/bench/gravities'

/** Sizes that everyone has stood beside, the most useful first, each with a small outline that stands on 0, 0. Pixels. */
export interface Landmark {
  /** Metres; m/s² of a gravity. */
  size: number
  name: string
  outline: string
}

export const landmarks: readonly Landmark[] = [
  { size: 0.05, name: 'matchbox 5 cm', outline: 'M-6 0v-6h12v6zM-6 -3h12' },
  { size: 100, name: 'tower 100 m', outline: 'M-4 0v-15h8v15zM-4 -15l4 -6l4 6M0 -8v3' },
  { size: 1.7, name: 'person', outline: 'M-2.5 0l2.5 -7l2.5 7M0 -7v-5M-3 -10h6M0 -12a2.4 2.4 0 1 0 -0.1 0' },
  { size: 10, name: 'house 10 m', outline: 'M-7 0v-8h14v8zM-9 -8l9 -7l9 7M-2 0v-4h4v4' },
  { size: 0.45, name: 'chair', outline: 'M-4 0v-12M-4 -5h8v5' },
  { size: 1_000, name: '1 km', outline: '' },
  { size: 0.001, name: '1 mm', outline: '' },
]

/** Gravities that a fall may read as. */
export const pulls: readonly Landmark[] = [
  { size: gravities.earth, name: 'Earth 9.8', outline: '' },
  { size: gravities.moon, name: 'Moon 1.6', outline: '' },
  { size: gravities.mars, name: 'Mars 3.7', outline: '' },
]
