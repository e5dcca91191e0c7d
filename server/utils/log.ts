/** One JSON line per thing worth knowing; never a password, token, cookie or letter's text. */
type Fact = string | number | boolean | null | undefined

function write(level: 'info' | 'warn' | 'error', what: string, facts: Record<string, Fact>): void {
  // Line breaks inside a value are escaped by JSON: nobody can forge a second line.
  const text = JSON.stringify({ at: new Date().toISOString(), level, what, ...facts })
  if (level === 'info') console.log(text)
  else console.error(text)
}

export const log = {
  info: (what: string, facts: Record<string, Fact> = {}) => write('info', what, facts),
  warn: (what: string, facts: Record<string, Fact> = {}) => write('warn', what, facts),
  error: (what: string, facts: Record<string, Fact> = {}) => write('error', what, facts),
}
