import { v7 as uuid } from 'uuid'
import { Membership, Person, Production, Sequence, Setting } from '~/server/models'
import { run, write } from '~/server/models/database'
import { hashPassword } from '#sealed-password'
import { demoPeople, DEMO_PASSWORD } from './people'
import { demoSequences } from './shots'
import { DemoWriter } from './writer'

/** Decides once, at the first start, whether this is a demo installation. Later starts change nothing. */
export async function openAsDemo(wanted: boolean): Promise<void> {
  if ((await Setting.count({ where: { key: 'demo' } })) > 0) return
  if (wanted && (await Person.count()) === 0) await seedDemo()
  else await write(() => Setting.create({ key: 'demo', value: '0' }))
}

/**
 * The demo production, Quayside Giants: a seven-minute short in which harbour cranes walk at night. One transaction.
 */
async function seedDemo(): Promise<void> {
  // One hash for the five of them: hashing takes half a second each, and nobody is fooled about the demo's password.
  const passwordHash = await hashPassword(DEMO_PASSWORD)
  await write(async () => {
    const made = new Date(Date.now() - 21 * 24 * 60 * 60 * 1000).toISOString()
    await Setting.create({ key: 'demo', value: '1' })
    const production = await Production.create({ id: uuid(), slug: 'quayside-giants', title: 'Quayside Giants', createdAt: made })
    const people = new Map<string, string>()
    for (const { key, email, name, role, signsIn } of demoPeople) {
      const id = uuid()
      people.set(key, id)
      await Person.create({ id, email, name, keeper: key === 'keeper', passwordHash: signsIn ? passwordHash : null, createdAt: made })
      if (role) await Membership.create({ productionId: production.id, personId: id, role, createdAt: made })
    }
    const writer = new DemoWriter(production, people)
    for (const [place, { code, title, shots }] of demoSequences.entries()) {
      const sequence = await Sequence.create({ id: uuid(), productionId: production.id, code, title, position: (place + 1) * 10 })
      for (const [at, shot] of shots.entries()) await writer.shot(sequence, shot, (at + 1) * 10, made)
    }
    await writer.tellInOrder()
    await run(
      `UPDATE letters SET created_at = (SELECT rulings.created_at FROM rulings WHERE rulings.id = letters.ruling_id)`,
    )
  })
}
