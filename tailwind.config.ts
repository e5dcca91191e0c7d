import type { Config } from 'tailwindcss'
import plugin from 'tailwindcss/plugin'
import { themeVariables, tokens } from './utils/tokens'

const colours = Object.fromEntries(Object.keys(tokens).map((name) => [name, `rgb(var(--${name}) / <alpha-value>)`]))

export default {
  content: ['./app.vue', './error.vue', './{components,layouts,pages,composables,utils}/**/*.{vue,ts}'],
  theme: {
    // Only the desk's own colours exist: a stray one would be a class that does nothing.
    colors: { transparent: 'transparent', current: 'currentColor', ...colours },
    // Three sizes of heading, one of body, one of small: look.md.
    fontSize: {
      small: ['0.8125rem', { lineHeight: '1.25rem' }],
      body: ['0.9375rem', { lineHeight: '1.5rem' }],
      h3: ['1.0625rem', { lineHeight: '1.5rem', fontWeight: '700' }],
      h2: ['1.3125rem', { lineHeight: '1.75rem', fontWeight: '800' }],
      h1: ['1.75rem', { lineHeight: '2.125rem', fontWeight: '800' }],
    },
    fontFamily: {
      sans: ['"Nunito Sans Variable"', 'system-ui', 'sans-serif'],
    },
    extend: {
      screens: { xs: '400px' },
      borderRadius: { DEFAULT: '4px' },
      maxWidth: { desk: '1440px' },
    },
  },
  plugins: [
    plugin(({ addBase }) => {
      addBase({
        ':root': { ...themeVariables('day'), 'color-scheme': 'light' },
        '@media (prefers-color-scheme: dark)': {
          ':root:not([data-theme="day"])': { ...themeVariables('night'), 'color-scheme': 'dark' },
        },
        ':root[data-theme="night"]': { ...themeVariables('night'), 'color-scheme': 'dark' },
        // Paper is white whatever the screen was set to.
        '@media print': { ':root, :root[data-theme="night"]': { ...themeVariables('day'), 'color-scheme': 'light' } },
      })
    }),
  ],
} satisfies Config
