/**
 * The desk's colours, by day and by night. Graphite is what was drawn, blue is construction (the law),
 * red is correction (what breaks); nothing else may wear blue or red.
 */
export const tokens = {
  paper: { day: '#F3EFE4', night: '#15171B' },
  sheet: { day: '#FFFDF7', night: '#1E2126' },
  rule: { day: '#D8D0BE', night: '#353A42' },
  graphite: { day: '#22262B', night: '#ECE7DA' },
  lead: { day: '#5A606A', night: '#A9AFB9' },
  blue: { day: '#1B5A96', night: '#86B8E8' },
  red: { day: '#B02A1C', night: '#FF8E7E' },
  ochre: { day: '#7A5200', night: '#E2B45C' },
  seal: { day: '#2C6450', night: '#7FC7A8' },
} as const

export type Token = keyof typeof tokens
export type Theme = 'day' | 'night'

/** `#1B5A96` → `27 90 150`, so that Tailwind can add an opacity. */
export function channels(hex: string): string {
  return [1, 3, 5].map((at) => Number.parseInt(hex.slice(at, at + 2), 16)).join(' ')
}

/** The theme as CSS custom properties: `--paper: 243 239 228`. */
export function themeVariables(theme: Theme): Record<string, string> {
  return Object.fromEntries(Object.entries(tokens).map(([name, pair]) => [`--${name}`, channels(pair[theme])]))
}
