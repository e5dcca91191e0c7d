import { describe, expect, it } from 'vitest'
import { line, password, prose } from '~/utils/contracts/common'

const said = (schema: { safeParse: (value: unknown) => { success: boolean; error?: { issues: { message: string }[] } } }, text: string) =>
  schema.safeParse(text).error?.issues[0]?.message ?? 'taken'

const overrides = ['\u202A', '\u202B', '\u202C', '\u202D', '\u202E', '\u2066', '\u2067', '\u2068', '\u2069']
const halves = ['\uD83D', 'a\uDC00b', '\uDC00\uD83D', '👩'.slice(0, 1)]
const unseen = ['\u200B', '\u2060\u200D', '\u00AD', '\u3164', ' \uFEFF ', '\uFE0F']

describe('2.2.1: one line of text', () => {
  it.each(overrides)('refuses a mark that would turn whatever is shown after it: %j', (mark) => {
    expect(said(line(80), `invoice${mark}gpj.exe`)).toBe('Marks that turn the reading direction are not allowed here.')
  })
  it.each(halves)('refuses half a character, which would come back as another: %j', (half) => {
    expect(said(line(80), `x${half}`)).toMatch(/^Half a character/)
  })
  it.each(unseen)('refuses a name that nobody can see: %j', (text) => {
    expect(said(line(80), text)).toBe('Write something here.')
  })
  it.each(['王小明', 'שלום', 'مريم\u200Fب', '👩‍👩‍👧‍👦', 'Zoë', '…', '𝔸'])('takes %s as it is', (name) => {
    expect(line(80).parse(name)).toBe(name)
  })
})

describe('2.2.1: several lines', () => {
  it.each(halves)('refuse half a character: %j', (half) => expect(said(prose(80), `x${half}`)).toMatch(/^Half a character/))
  it.each(unseen)('are not there when nothing of them can be seen: %j', (text) => expect(['Write something here.']).toContain(said(prose(80, 1), text)))
  it('may be empty where nothing is asked for, and turn as their writer wants', () => {
    expect(prose(80).parse('  ')).toBe('')
    expect(prose(80).parse('שלום \u202Eabc\u202C\n👩‍👩‍👧‍👦')).toBe('שלום \u202Eabc\u202C\n👩‍👩‍👧‍👦')
  })
})

describe('6.2.8: a password', () => {
  it.each(halves)('cannot hold half a character: all of them hash alike (%j)', (half) => {
    expect(said(password, `lanterns over ${half}`)).toMatch(/^Half a character/)
  })
  it('may hold anything else', () => expect(password.parse('\u202E 👩‍👩‍👧‍👦 \u0007 \u200B')).toBe('\u202E 👩‍👩‍👧‍👦 \u0007 \u200B'))
})
