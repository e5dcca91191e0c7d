import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { simpleParser } from 'mailparser'
import { afterAll, describe, expect, it } from 'vitest'
import type { Letter } from '~/server/models'
import { fileCarrier } from '~/server/services/letters/carriers'
import { domainOf, headerLine, isPlainAddress, messageIdOf, shotThreadId } from '~/server/services/letters/headers'
import { messageOf } from '~/server/services/letters/message'

const folder = mkdtempSync(join(tmpdir(), 'tiltyard-headers-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const FROM = 'Tiltyard <board@board.example>'
const never = new AbortController().signal

async function sourceOf(changes: Partial<Letter>, name = 'Ines Duarte'): Promise<string> {
  const letter = {
    id: 'one',
    subject: 'CLK-110 take 1 goes back',
    messageId: messageIdOf('one', FROM),
    threadMessageId: shotThreadId('shot', FROM),
    createdAt: '2026-12-01T11:14:56.000Z',
    ...changes,
  } as Letter
  const addressed = { from: FROM, to: { name, address: 'ines@board.example' }, listId: 'quayside.rulings', baseUrl: 'https://board.example', text: 't', html: '<p>t</p>' }
  await fileCarrier(folder).carry('one', messageOf(letter, addressed), never)
  return readFileSync(join(folder, 'mail', 'one.eml'), 'utf8')
}
const headersOf = (source: string) => source.slice(0, source.indexOf('\r\n\r\n'))

describe('headers of a letter', () => {
  it('identify it, thread it by shot and say that a machine wrote it', async () => {
    const mail = await simpleParser(await sourceOf({}))
    expect(mail.messageId).toBe('<letter.one@board.example>')
    expect(mail.inReplyTo).toBe('<shot.shot@board.example>')
    expect(mail.references).toEqual('<shot.shot@board.example>')
    expect(mail.headers.get('auto-submitted')).toBe('auto-generated')
    expect(mail.date?.toISOString()).toBe('2026-12-01T11:14:56.000Z')
    expect(headersOf(await sourceOf({}))).toContain('List-ID: <quayside.rulings.board.example>')
  })

  it.each(['\r\n', '\n', '\r', '\u2028', '\u0085', '\u0000\r\n', '\r\n\r\n', '\r\n\t'])('keep %j out, whoever wrote it (1.3.11)', async (breaker) => {
    const attack = `a${breaker}Bcc: everyone@evil.example${breaker}X-Evil: 1`
    const source = await sourceOf({ subject: `Title ${attack}` }, `Name ${attack}`)
    const mail = await simpleParser(source)
    expect(mail.bcc).toBeUndefined()
    expect(mail.headers.has('x-evil')).toBe(false)
    const to = Array.isArray(mail.to) ? mail.to[0] : mail.to
    expect(to?.value).toEqual([{ address: 'ines@board.example', name: 'Name a Bcc: everyone@evil.example X-Evil: 1' }])
    expect(mail.subject).toBe('Title a Bcc: everyone@evil.example X-Evil: 1')
    // As raw lines: nothing but folded headers.
    for (const line of headersOf(source).split('\r\n')) expect(line).toMatch(/^(?:[A-Za-z-]+: |\s)/)
    expect(headersOf(source)).not.toMatch(/^(?:bcc|x-evil):/im)
  })

  it('carry names in any script', async () => {
    const mail = await simpleParser(await sourceOf({ subject: '灯台が倒れる CLK-110' }, 'Žofie "Zo" Nováková, 山田'))
    const to = Array.isArray(mail.to) ? mail.to[0] : mail.to
    expect(to?.value).toEqual([{ address: 'ines@board.example', name: 'Žofie "Zo" Nováková, 山田' }])
    expect(mail.subject).toBe('灯台が倒れる CLK-110')
  })
})

describe('a letter kept as a file', () => {
  it('is one whole file under a name of ours, readable by the server alone, even when sent twice', async () => {
    await sourceOf({})
    await sourceOf({})
    expect(readdirSync(join(folder, 'mail'))).toEqual(['one.eml'])
    expect(statSync(join(folder, 'mail', 'one.eml')).mode & 0o777).toBe(0o600)
  })
})

describe('what may stand in a header', () => {
  it('is one line, without marks that turn the reading direction', () => {
    expect(headerLine(' a\r\n b\u202Ec\u2066d\u0007 ')).toBe('a b c d')
  })
  it.each(['ana@board.example', "o'neil+x@sub.board.example"])('%s is an address', (address) => expect(isPlainAddress(address)).toBe(true))
  it.each(['', 'ana', 'a@b, c@d', 'a@b\r\nBcc: c@d', '<a@b>', 'a b@c', '"x" a@b', `${'a'.repeat(250)}@b.example`, 'a@b@c'])('%j is none', (address) =>
    expect(isPlainAddress(address)).toBe(false),
  )
  it('reads the domain of the sender', () => {
    expect(domainOf(FROM)).toBe('board.example')
    expect(domainOf('board@board.example')).toBe('board.example')
    expect(domainOf('nobody')).toBe('tiltyard.invalid')
  })
})
