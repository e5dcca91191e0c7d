const choices = ['system', 'day', 'night'] as const
export type ThemeChoice = (typeof choices)[number]

/**
 * The reader's theme, kept in the cookie `theme` so that the server's page already wears it. Call it once in the root of
 * every page (app.vue, error.vue): it sets `data-theme` on <html>; `system` sets none.
 */
export function useTheme() {
  const cookie = useCookie<ThemeChoice>('theme', {
    path: '/',
    sameSite: 'lax',
    maxAge: 60 * 60 * 24 * 365,
    default: () => 'system',
  })
  const choice = computed<ThemeChoice>({
    get: () => (choices.includes(cookie.value) ? cookie.value : 'system'),
    set: (value) => (cookie.value = value),
  })
  useHead({ htmlAttrs: { 'data-theme': () => (choice.value === 'system' ? undefined : choice.value) } })
  return { choice, choices }
}
