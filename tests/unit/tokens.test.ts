import { describe, expect, it } from 'vitest'
import { tokens } from '~/utils/tokens'
import type { Theme, Token } from '~/utils/tokens'

/** Relative luminance: WCAG 2.2, "relative luminance" (sRGB, threshold 0.04045). */
function luminance(hex: string): number {
  const [red, green, blue] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(hex.slice(at, at + 2), 16) / 255
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4
  }) as [number, number, number]
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}

/** Contrast ratio: WCAG 2.2, "contrast ratio". */
function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number]
  return (light + 0.05) / (dark + 0.05)
}

const themes: Theme[] = ['day', 'night']
const grounds: Token[] = ['paper', 'sheet']
const inks: Token[] = ['graphite', 'lead', 'blue', 'red', 'ochre', 'seal']
/** Words that stand on a filled ground: buttons, chosen filters. */
const reversed: [Token, Token][] = [
  ['sheet', 'blue'],
  ['sheet', 'graphite'],
  ['paper', 'graphite'],
  ['graphite', 'rule'],
]

describe('the formula', () => {
  it('gives the published ends: 21 for black on white, 1 for a colour on itself', () => {
    expect(contrast('#000000', '#FFFFFF')).toBeCloseTo(21, 6)
    expect(contrast('#1B5A96', '#1B5A96')).toBe(1)
  })
  it('puts #767676 on white just over 4.5 and #777777 just under', () => {
    expect(contrast('#767676', '#FFFFFF')).toBeGreaterThan(4.5)
    expect(contrast('#777777', '#FFFFFF')).toBeLessThan(4.5)
  })
})

describe.each(themes)('by %s', (theme) => {
  it.each(inks.flatMap((ink) => grounds.map((ground) => [ink, ground] as const)))('%s reads on %s', (ink, ground) => {
    expect(contrast(tokens[ink][theme], tokens[ground][theme])).toBeGreaterThanOrEqual(4.5)
  })
  it.each(reversed)('%s reads on a ground of %s', (ink, ground) => {
    expect(contrast(tokens[ink][theme], tokens[ground][theme])).toBeGreaterThanOrEqual(4.5)
  })
})

/** A colour laid over a ground at some opacity, as the drawings do. */
function over(ink: string, ground: string, opacity: number): string {
  const at = (hex: string, i: number) => Number.parseInt(hex.slice(i, i + 2), 16)
  const mix = [1, 3, 5].map((i) => Math.round(at(ink, i) * opacity + at(ground, i) * (1 - opacity)))
  return `#${mix.map((channel) => channel.toString(16).padStart(2, '0')).join('')}`
}

describe.each(themes)('marks of the drawings by %s', (theme) => {
  const sheet = tokens.sheet[theme]
  it.each(['graphite', 'blue', 'red', 'ochre'] as const)('%s marks stand out from the sheet', (ink) => {
    expect(contrast(tokens[ink][theme], sheet)).toBeGreaterThanOrEqual(3)
  })
  it('the words of the cursor row read on its tinted ground', () => {
    const row = over(tokens.ochre[theme], sheet, 0.12)
    for (const ink of ['graphite', 'lead', 'red'] as const)
      expect(contrast(tokens[ink][theme], row)).toBeGreaterThanOrEqual(4.5)
  })
})
