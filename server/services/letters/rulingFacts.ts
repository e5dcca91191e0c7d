import { Flag, Person, Production, Shot, Take, Waiver } from '~/server/models'
import type { Ruling } from '~/server/models'
import { sameFinding } from '~/utils/contracts/take'
import type { Finding } from '~/utils/motion/types'
import type { RulingFacts } from './rulingLetter'

/** A letter is read, not searched: what goes on is one link away. */
const MOST_FLAGS = 60
const MOST_SENTENCES = 4
const MOST_FINDINGS = 8

/** The findings that a flag speaks of: the one it names, else those that touch its frames. */
export function findingsOfFlag(flag: Pick<Flag, 'fromFrame' | 'toFrame' | 'finding'>, findings: Finding[]): Finding[] {
  const { finding: name, fromFrame, toFrame } = flag
  const named = name ? findings.filter((finding) => sameFinding(finding, name)) : []
  if (named.length > 0) return named
  return findings.filter(({ frames }) => frames.some((frame) => frame >= fromFrame && frame <= toFrame))
}

/** Gathers what a letter about this ruling tells. Reads inside the transaction it is called in. */
export async function rulingFacts(ruling: Ruling, baseUrl: string): Promise<{ facts: RulingFacts; shotId: string }> {
  const take = await Take.findByPk(ruling.takeId, { rejectOnEmpty: true })
  const shot = await Shot.findByPk(take.shotId, { rejectOnEmpty: true })
  const production = await Production.findByPk(shot.productionId, { rejectOnEmpty: true })
  const flags = await Flag.findAll({ where: { takeId: take.id, liftedAt: null }, order: [['fromFrame', 'ASC'], ['id', 'ASC']] })
  const waivers = await Waiver.findAll({ where: { takeId: take.id, liftedAt: null } })
  const ids = [ruling.personId, take.personId, shot.animatorId, ...flags.map((flag) => flag.personId)].filter((id) => id !== null)
  const people = await Person.findAll({ attributes: ['id', 'name'], where: { id: [...new Set(ids)] } })
  const nameOf = (id: string | null) => people.find((person) => person.id === id)?.name ?? null

  const told = new Set<Finding>()
  const flagged = flags.slice(0, MOST_FLAGS).map((flag) => {
    const findings = findingsOfFlag(flag, take.answer.findings).slice(0, MOST_SENTENCES)
    findings.forEach((finding) => told.add(finding))
    return {
      fromFrame: flag.fromFrame,
      toFrame: flag.toFrame,
      reason: flag.reason,
      by: nameOf(flag.personId) ?? '',
      sentences: findings.map(({ text }) => text),
    }
  })
  // A take that stands needs no list of what is wrong with it.
  const untold = take.answer.findings.filter(
    (finding) => !told.has(finding) && !waivers.some((waiver) => sameFinding(finding, waiver.finding)),
  )
  const others = ruling.decision === 'stands' ? [] : untold
  return {
    shotId: shot.id,
    facts: {
      baseUrl,
      production: { slug: production.slug, title: production.title },
      shot: { code: shot.code, title: shot.title },
      take: take.number,
      decision: ruling.decision,
      ruledBy: nameOf(ruling.personId) ?? '',
      at: ruling.createdAt,
      note: ruling.note,
      animator: nameOf(shot.animatorId ?? take.personId),
      flags: flagged,
      findings: others.slice(0, MOST_FINDINGS).map(({ frames, text }) => ({ frame: frames[0] ?? null, text })),
      more: { flags: flags.length - flagged.length, findings: Math.max(0, others.length - MOST_FINDINGS) },
    },
  }
}
