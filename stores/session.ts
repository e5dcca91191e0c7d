import { defineStore } from 'pinia'
import type { Me, SessionAnswer } from '~/utils/contracts/people'
import { may } from '~/utils/permissions'
import type { Action, Facts, Role } from '~/utils/permissions'

/** Who is signed in, and what kind of installation this is. Loaded once by middleware/session.global.ts. */
export const useSessionStore = defineStore('session', () => {
  const me = ref<Me | null>(null)
  const demo = ref(false)
  const empty = ref(false)
  const demoAccounts = ref<SessionAnswer['demoAccounts']>([])
  const loaded = ref(false)

  function take(answer: SessionAnswer) {
    me.value = answer.me
    demo.value = answer.demo
    empty.value = answer.empty
    demoAccounts.value = answer.demoAccounts
    loaded.value = true
  }

  /** Asks the server again: after a changed role, a new production, a dismissed socket. */
  async function load() {
    take(await useRequestFetch()<SessionAnswer>('/api/session'))
  }

  async function signOut() {
    take(await $fetch<SessionAnswer>('/api/session', { method: 'DELETE' }))
  }

  /** One's role in a production by its short name; null for who is no member. */
  function roleIn(production: string): Role | null {
    return me.value?.memberships.find((one) => one.production === production)?.role ?? null
  }

  /** May the person signed in do this? Asks the same table as the server; what one may not do is not shown. */
  function can(production: string, action: Action, facts: Facts = {}): boolean {
    return may(roleIn(production), action, facts)
  }

  return { me, demo, empty, demoAccounts, loaded, take, load, signOut, roleIn, can }
})
