import { JSDOM } from 'jsdom'
import { describe, expect, it } from 'vitest'
import { escapeText, html } from '~/server/services/letters/html'
import { rulingLetter, takeLink } from '~/server/services/letters/rulingLetter'
import type { RulingFacts } from '~/server/services/letters/rulingLetter'

const facts: RulingFacts = {
  baseUrl: 'https://board.example',
  production: { slug: 'quayside-giants', title: 'Quayside Giants' },
  shot: { code: 'CLK-110', title: 'The clock tower goes over' },
  take: 1,
  decision: 'goes-back',
  ruledBy: 'Sefa Tuala',
  at: '2026-12-01T11:14:56.000Z',
  note: 'The top half holds.\nThe settle does not.',
  animator: 'Ines Duarte',
  flags: [
    { fromFrame: 61, toFrame: 61, reason: 'Move it back.', by: 'Sefa Tuala', sentences: ['Frame 61 lands 0.8 frame early.'] },
    { fromFrame: 70, toFrame: 78, reason: 'Too even.', by: 'Sefa Tuala', sentences: [] },
  ],
  findings: [{ frame: null, text: 'Reads as 8.2 m; 38 m needs 187 frames, not 89.' }],
  more: { flags: 0, findings: 0 },
}

const ATTACKS = [
  '<script>alert(1)</script>',
  '"><img src=x onerror=alert(1)>',
  "' onmouseover='alert(1)",
  '</title><svg onload=alert(1)>',
  '<!--', '-->', ']]>', '&lt;b&gt;', '<a href="javascript:alert(1)">x</a>',
  '<style>@import "https://evil.example/x.css"</style>',
  '<base href="https://evil.example/">', '<meta http-equiv="refresh" content="0;url=https://evil.example/">',
  '[x](javascript:alert(1)) ![y](https://evil.example/p.png)',
]

describe('the letter of a ruling', () => {
  it('says in the subject which take it is and how it ended', () => {
    expect(rulingLetter(facts).subject).toBe('CLK-110 take 1 goes back')
    expect(rulingLetter({ ...facts, decision: 'stands-with-notes', take: 12 }).subject).toBe('CLK-110 take 12 stands with notes')
    expect(rulingLetter({ ...facts, decision: 'stands' }).subject).toBe('CLK-110 take 1 stands')
  })

  it('lists every flagged frame with the finding, the reason and its own link, in both parts', () => {
    const letter = rulingLetter(facts)
    const document = new JSDOM(letter.html).window.document
    const rows = [...document.querySelectorAll('table tr')]
    expect(rows.map((row) => row.querySelector('a')?.getAttribute('href'))).toEqual([
      'https://board.example/p/quayside-giants/shots/CLK-110?take=1&frame=61',
      'https://board.example/p/quayside-giants/shots/CLK-110?take=1&frame=70',
    ])
    expect(rows[0]!.textContent).toContain('Frame 61 lands 0.8 frame early.')
    expect(rows[0]!.textContent).toContain('Sefa Tuala: Move it back.')
    expect(rows[1]!.querySelector('th')!.textContent).toBe('Frames 70–78')
    for (const frame of [61, 70]) expect(letter.text).toContain(`https://board.example/p/quayside-giants/shots/CLK-110?take=1&frame=${frame}\n`)
    expect(letter.text).toContain('Frame 61 lands 0.8 frame early.')
    expect(letter.text).toContain('Reads as 8.2 m')
  })

  it('keeps the line breaks of the note', () => {
    const { html: source, text } = rulingLetter(facts)
    expect(text).toContain('The top half holds.\nThe settle does not.')
    expect(source).toMatch(/The top half holds\.<br>\s*The settle does not\./)
  })

  it('says who ruled, when, and what happens next', () => {
    const { text } = rulingLetter(facts)
    expect(text).toContain('Ruled by Sefa Tuala, 1 December 2026, 11:14 UTC.')
    expect(text).toContain('CLK-110 is on Ines Duarte’s desk.')
    expect(rulingLetter({ ...facts, decision: 'stands' }).text).toContain('CLK-110 is settled.')
  })

  it('does not hide what it leaves out', () => {
    const { text, html: source } = rulingLetter({ ...facts, more: { flags: 3, findings: 1 } })
    for (const part of [text, source]) {
      expect(part).toContain('3 more flags')
      expect(part).toContain('1 more finding')
    }
  })

  it('fetches nothing and styles with attributes only', () => {
    const document = new JSDOM(rulingLetter(facts).html).window.document
    expect(document.querySelectorAll('img, script, style, link, iframe, object, embed, form, svg, base')).toHaveLength(0)
    expect(document.documentElement.outerHTML).not.toMatch(/url\(|@import|\bsrc=/i)
    expect(document.querySelector('meta[name="color-scheme"]')?.getAttribute('content')).toBe('light dark')
  })
})

describe('attack strings in a letter (1.3.1)', () => {
  it.each(ATTACKS)('%s stays text wherever it stands', (attack) => {
    const plain = new JSDOM(rulingLetter({ ...facts, note: 'One line.' }).html).window.document
    const letter = rulingLetter({
      ...facts,
      production: { ...facts.production, title: attack },
      shot: { ...facts.shot, title: attack },
      ruledBy: attack,
      animator: attack,
      note: attack,
      flags: facts.flags.map((flag) => ({ ...flag, reason: attack, by: attack, sentences: flag.sentences.map(() => attack) })),
      findings: [{ frame: 61, text: attack }, { frame: null, text: attack }],
    })
    const document = new JSDOM(letter.html).window.document
    const kinds = (page: Document) => [...new Set([...page.querySelectorAll('*')].map((element) => element.tagName))].sort()
    expect(kinds(document)).toEqual(kinds(plain))
    for (const element of document.querySelectorAll('*'))
      for (const { name, value } of element.attributes) {
        expect(name).not.toMatch(/^on/i)
        if (name === 'href') expect(value).toMatch(/^https:\/\/board\.example\//)
      }
    expect(document.body.textContent!.split(attack).length - 1).toBeGreaterThanOrEqual(9)
    expect(letter.text).toContain(attack)
  })

  it('slugs and codes cannot leave their place in a link', () => {
    const link = takeLink({ ...facts, production: { slug: '../x?y#z', title: '' }, shot: { code: 'A/B&c="', title: '' } }, 7)
    expect(link).toBe('https://board.example/p/..%2Fx%3Fy%23z/shots/A%2FB%26c%3D%22?take=1&frame=7')
  })
})

describe('html that is put together from text', () => {
  it('escapes what is filled in and nothing twice', () => {
    expect(html`<p title="${'"&\''}">${'<b>'}${html`<i>${'&'}</i>`}${[html`<u>1</u>`, html`<u>2</u>`]}</p>`.source).toBe(
      '<p title="&quot;&amp;&#39;">&lt;b&gt;<i>&amp;</i><u>1</u><u>2</u></p>',
    )
  })
  it('drops control characters that no page may hold', () => {
    expect(escapeText('a\u0000b\u0007c\u009Fd\te\nf')).toBe('abcd\te\nf')
  })
})
