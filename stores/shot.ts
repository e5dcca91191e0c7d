import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import { v7 as uuid } from 'uuid'
import type { ProductionEvent } from '~/utils/contracts/event'
import type { Decision } from '~/utils/contracts/production'
import type { FindingName, Ruling, ShotPage } from '~/utils/contracts/take'
import type { Comment } from '~/utils/contracts/thread'
import type { PersonName } from '~/utils/contracts/people'
import type { Facts } from '~/utils/permissions'
import { addComment, mergePage } from '~/utils/shot/merge'

/** The address of a shot's routes. */
export const shotPath = (production: string, code: string) =>
  `/api/productions/${encodeURIComponent(production)}/shots/${encodeURIComponent(code)}`

/**
 * The shot on screen. The refs are private on purpose: Pinia would write every public one into the page a second time,
 * beside what useAsyncData already carries.
 */
export const useShotStore = defineStore('shot', () => {
  const base = shallowRef<ShotPage | null>(null)
  /** A ruling that was sent and not answered yet: the stamp is on the page, and comes off again if the server refuses. */
  const sending = shallowRef<Ruling | null>(null)
  /** The ruling whose stamp was pressed while someone was looking. */
  const freshRuling = ref<string | null>(null)
  let asked = 0
  let running: Promise<void> | null = null
  let again = false

  const page = computed<ShotPage | null>(() => (base.value && sending.value ? withRuling(base.value, sending.value) : base.value))
  const path = () => (base.value ? shotPath(base.value.production.slug, base.value.code) : '')
  const takePath = () => `${path()}/takes/${base.value?.take?.number ?? 0}`

  /** Takes what the first paint or a change of take brought. */
  function accept(brought: ShotPage): void {
    base.value = mergePage(base.value, brought)
  }

  /** Fetches the page again for the take on screen. Calls that come while one is under way share one more. */
  function refetch(): Promise<void> {
    if (running) {
      again = true
      return running
    }
    running = (async () => {
      try {
        do {
          again = false
          await fetchOnce()
        } while (again)
      } finally {
        running = null
      }
    })()
    return running
  }
  async function fetchOnce(): Promise<void> {
    const shown = base.value
    if (!shown) return
    const turn = ++asked
    // The take on screen stays on screen when a newer one comes: somebody may be writing about it.
    const query = shown.take ? { take: shown.take.number } : {}
    const fetched = await $fetch<ShotPage>(path(), { query, retry: 0 })
    // Meanwhile another take, or another shot, may be on screen: that one's own answer counts.
    if (turn !== asked || base.value?.code !== shown.code || base.value.take?.number !== shown.take?.number) return
    noticeStamp(shown, fetched)
    base.value = mergePage(base.value, fetched)
  }
  function noticeStamp(before: ShotPage, after: ShotPage): void {
    const known = new Set(before.takes.map(({ ruling }) => ruling?.id))
    const pressed = after.takes.find(({ ruling }) => ruling && !ruling.reopened && !known.has(ruling.id))
    // One's own stamp is on the page since it was sent.
    if (pressed?.ruling && sending.value?.take !== pressed.number) freshRuling.value = pressed.ruling.id
  }

  /** Hears what happened in the production. A comment is put in place; anything else is fetched. */
  function hear(event: ProductionEvent): void {
    const shown = base.value
    if (!shown || (event.shot !== shown.code && event.kind !== 'member' && event.kind !== 'sequence')) return
    if (event.kind === 'comment' && event.comment) return heard(event.comment)
    if (event.n > shown.eventNumber) void refetch().catch(() => undefined)
  }
  function heard(comment: Comment): void {
    const shown = base.value
    if (!shown) return
    const threads = addComment(shown.threads, comment)
    if (threads !== shown.threads) base.value = { ...shown, threads }
    else if (!shown.threads.some(({ id }) => id === comment.thread)) void refetch().catch(() => undefined)
  }

  /** What the table of permissions wants to know of the shot and its take. */
  function facts(person: string | undefined): Facts {
    const shown = base.value
    if (!shown || !person) return {}
    return {
      ownShot: shown.animator?.id === person,
      ownTake: shown.take?.by.id === person,
      takeRuled: Boolean(shown.take?.ruling),
      shotRuled: shown.takes.some(({ ruling }) => ruling !== null),
    }
  }

  /** Stamps at once, and sends. @throws what $fetch throws; the stamp is off again by then, if it was still ours. */
  async function rule(decision: Decision, note: string, by: PersonName): Promise<void> {
    const shown = base.value
    if (!shown?.take) return
    const clientId = uuid()
    const stamp: Ruling = { id: clientId, take: shown.take.number, decision, note, by, at: new Date().toISOString(), reopened: null }
    sending.value = stamp
    freshRuling.value = stamp.id
    try {
      await $fetch<unknown>(`${takePath()}/rulings`, { method: 'POST', body: { clientId, decision, note, version: shown.version } })
      await refetch()
    } finally {
      if (sending.value === stamp) sending.value = null
      if (freshRuling.value === stamp.id) freshRuling.value = null
    }
  }

  const write = async (method: 'POST' | 'DELETE' | 'PATCH', address: string, body?: object) => {
    await $fetch<unknown>(address, { method, body })
    await refetch()
  }
  const flag = (fromFrame: number, toFrame: number, reason: string, finding: FindingName | null, clientId: string) =>
    write('POST', `${takePath()}/flags`, { clientId, fromFrame, toFrame, reason, finding })
  const waive = (finding: FindingName, reason: string, clientId: string) => write('POST', `${takePath()}/waivers`, { clientId, finding, reason })

  return {
    page: computed(() => page.value),
    freshRuling: computed(() => freshRuling.value),
    /** True while one's own ruling is on its way. */
    isRuling: computed(() => sending.value !== null),
    accept,
    refetch,
    hear,
    heard,
    facts,
    rule,
    flag,
    waive,
    liftFlag: (id: string) => write('DELETE', `${takePath()}/flags/${id}`),
    liftWaiver: (id: string) => write('DELETE', `${takePath()}/waivers/${id}`),
    settle: (thread: string, settled: boolean) => write('PATCH', `${path()}/threads/${thread}`, { settled }),
    takeBack: () => write('DELETE', takePath()),
    reopen: (reason: string) => write('POST', `${path()}/reopen`, { reason, version: base.value?.version ?? 1 }),
  }
})

/** Number of the newest take that was not taken back: what the page shows when no take is asked for. Null before the first. */
export function newestTake(page: Pick<ShotPage, 'takes'>): number | null {
  const standing = page.takes.filter(({ withdrawnAt }) => withdrawnAt === null).map(({ number }) => number)
  return standing.length > 0 ? Math.max(...standing) : null
}

function withRuling(page: ShotPage, ruling: Ruling): ShotPage {
  if (page.take?.number !== ruling.take || page.take.ruling) return page
  return {
    ...page,
    desk: ruling.decision === 'goes-back' ? 'animator' : 'settled',
    take: { ...page.take, ruling },
    takes: page.takes.map((take) => (take.number === ruling.take ? { ...take, ruling } : take)),
  }
}
