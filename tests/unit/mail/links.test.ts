import { describe, expect, it } from 'vitest'
import { fillLink, hideLink, linkLetter } from '~/server/services/letters/linkLetter'
import { openLink, sealLink } from '~/server/services/letters/seal'

const SECRET = 'one secret that is long enough for it'
const URL_OF_LINK = 'https://board.example/invitation#kZ3v_-a&b=$&c'

describe('a sealed one-use link (11.5.1)', () => {
  it('opens with the same secret for the same letter', () => {
    const sealed = sealLink(URL_OF_LINK, 'letter-1', SECRET)
    expect(sealed).toMatch(/^[A-Za-z0-9_-]+$/)
    expect(Buffer.from(sealed, 'base64url').toString('latin1')).not.toContain('board.example')
    expect(openLink(sealed, 'letter-1', SECRET)).toBe(URL_OF_LINK)
  })

  it('is sealed differently each time', () => {
    expect(sealLink(URL_OF_LINK, 'letter-1', SECRET)).not.toBe(sealLink(URL_OF_LINK, 'letter-1', SECRET))
  })

  it('opens for no other letter, with no other secret, and not when a bit was changed', () => {
    const sealed = sealLink(URL_OF_LINK, 'letter-1', SECRET)
    expect(openLink(sealed, 'letter-2', SECRET)).toBeNull()
    expect(openLink(sealed, 'letter-1', `${SECRET}!`)).toBeNull()
    for (const place of [0, 15, 40]) {
      const bytes = Buffer.from(sealed, 'base64url')
      bytes[place]! ^= 1
      expect(openLink(bytes.toString('base64url'), 'letter-1', SECRET)).toBeNull()
    }
    expect(openLink('', 'letter-1', SECRET)).toBeNull()
    expect(openLink('AAAA', 'letter-1', SECRET)).toBeNull()
  })

  it('is not sealed with a secret that is none', () => {
    expect(() => sealLink(URL_OF_LINK, 'letter-1', '')).toThrow('session secret')
  })
})

describe.each(['invitation', 'reset'] as const)('the letter with a one-use link: %s', (kind) => {
  const letter = linkLetter({ kind, toName: '<b>Ada</b> & Co', baseUrl: 'https://board.example' })

  it('is stored without the link and filled in for its reader alone', () => {
    const filled = fillLink(letter, URL_OF_LINK)
    expect(filled.text).toContain(`\n${URL_OF_LINK}\n`)
    expect(filled.html).toContain('href="https://board.example/invitation#kZ3v_-a&amp;b=$&amp;c"')
    expect(filled.html + filled.text).not.toContain('[[')
  })

  it('shows anyone else that there is a link, and nothing to click', () => {
    const shown = hideLink(letter)
    for (const part of [shown.text, shown.html]) {
      expect(part).toContain('(one-use link, shown only to its reader)')
      expect(part).not.toContain('[[')
    }
    expect(shown.html).not.toContain('href="(')
  })

  it('escapes the name', () => {
    expect(letter.html).toContain('Dear &lt;b&gt;Ada&lt;/b&gt; &amp; Co')
  })
})
