/** Where to go after signing in: a path of this very application, or the start. Nobody's link leads anywhere else. */
export function insideOnly(wanted: unknown): string {
  if (typeof wanted !== 'string' || !wanted.startsWith('/')) return '/'
  // A browser reads `//host`, `/\host` and what is left of `/<tab>/host` as another site's address.
  const base = 'http://inside.invalid'
  if (!URL.canParse(wanted, base)) return '/'
  const url = new URL(wanted, base)
  // …and so it does with what stands here once dots in the path are resolved.
  if (url.origin !== base || url.pathname.startsWith('//') || url.pathname === '/sign-in') return '/'
  return url.pathname + url.search + url.hash
}
