import { randomUUID } from 'node:crypto'
import { expect, it } from 'vitest'
import type { Letter as WireLetter, LettersAnswer } from '~/utils/contracts/letter'
import type { Wall } from '~/utils/contracts/production'
import type { ShotPage } from '~/utils/contracts/take'
import { signInDemo } from '../helpers/client'
import { startMailServer } from '../helpers/mail'
import { startServer } from '../helpers/server'

/** A ruling made over the routes, and the letters that come of it, in the demo production. */
it('a ruling reaches everyone concerned by mail, once, with the flagged frames and a link to each', async () => {
  const mail = await startMailServer()
  const server = await startServer({ env: { MAIL_URL: mail.url } })
  const supervisor = await signInDemo(server.url, 'supervisor')
  const keeper = await signInDemo(server.url, 'keeper')
  const slug = supervisor.me!.memberships[0]!.production
  const place = `/api/productions/${slug}`
  const { sheets } = (await supervisor.get<Wall>(`${place}/wall`)).body
  const candidates = sheets.filter((sheet) => sheet.desk === 'supervisor' && sheet.sketch)
  const pages = await Promise.all(candidates.map(async ({ code }) => (await supervisor.get<ShotPage>(`${place}/shots/${code}`)).body))
  const shot = pages.find(({ take }) => take !== null && take.by.id !== supervisor.me!.id && take.answer.findings.some(({ frames }) => frames.length > 0))!
  const take = shot.take!
  const finding = take.answer.findings.find(({ frames }) => frames.length > 0)!
  const frame = finding.frames[0]!

  const under = `${place}/shots/${shot.code}/takes/${take.number}`
  const flagged = await supervisor.post(`${under}/flags`, {
    clientId: randomUUID(), fromFrame: frame, toFrame: frame, reason: 'Is this the bell <b>breaking loose</b>?', finding: { kind: finding.kind, frames: finding.frames },
  })
  expect(flagged.status).toBe(201)
  const { version, letterCount } = (await supervisor.get<ShotPage>(`${place}/shots/${shot.code}?take=${take.number}`)).body
  expect(letterCount).toBeGreaterThanOrEqual(2)
  const ruling = { clientId: randomUUID(), decision: 'goes-back', note: 'Give it\nthe time.', version }
  const ruled = await supervisor.post(`${under}/rulings`, ruling)
  expect(ruled.status).toBe(201)

  // The demo's own rulings have letters too.
  const subject = `${shot.code} take ${take.number} goes back`
  const ours = () => mail.received.filter((one) => one.mail.subject === subject)
  await expect.poll(() => ours().length, { timeout: 20_000 }).toBe(letterCount)
  const received = ours()
  const readers = received.map(({ to }) => to[0])
  expect(new Set(readers).size).toBe(letterCount)
  expect(readers).not.toContain('supervisor@quayside.example')
  for (const { mail: letter } of received) {
    expect(letter.text).toContain(finding.text)
    expect(letter.text).toContain('Give it\nthe time.')
    expect(letter.text).toContain(`${server.url}/p/${slug}/shots/${shot.code}?take=${take.number}&frame=${frame}`)
    expect(letter.html).toContain('Is this the bell &lt;b&gt;breaking loose&lt;/b&gt;?')
  }

  // The mail room tells the same. The last mark may still be on its way.
  const inMailRoom = async () => (await keeper.get<LettersAnswer>('/api/letters?state=sent')).body.letters.filter((one) => one.subject === subject)
  await expect.poll(async () => (await inMailRoom()).length, { timeout: 10_000 }).toBe(letterCount)
  const [line] = await inMailRoom()
  const { body: one } = await keeper.get<WireLetter>(`/api/letters/${line!.id}`)
  expect(received.map(({ mail: { messageId } }) => messageId)).toContain(one.messageId)
  expect((await inMailRoom()).map(({ to }) => to).sort()).toEqual(readers.sort())

  // Ruling once more with the same client's id is the same ruling: nothing is owed twice.
  expect((await supervisor.post(`${under}/rulings`, ruling)).status).toBeLessThan(300)
  await new Promise((resolve) => setTimeout(resolve, 500))
  expect(ours()).toHaveLength(letterCount)
}, 90_000)
