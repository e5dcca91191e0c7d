import { defineStore } from 'pinia'
import type { LiveSocket } from '~/plugins/live.client'
import { leaveNotice } from '~/composables/useNotices'
import { CatchUp } from '~/utils/catch-up'
import type { EventsAnswer, Presence, ProductionEvent, SocketAnswer } from '~/utils/contracts/event'

export type LiveState = 'live' | 'connecting' | 'offline'

interface Following {
  /** Slug. */
  production: string
  after: number
  event: (event: ProductionEvent) => void
  /** Code of the shot on the follower's screen, asked on every (re)connect. */
  shot: () => string | null
}
interface Follower extends Following {
  catchUp: CatchUp
}

// Milliseconds.
const ANSWER_WITHIN = 5_000
const FETCH_WITHIN = 15_000
const TRY_AGAIN = 2_000
const AT_ONCE = 50
/** A blink of the connection is not worth a notice. */
const GRACE = 3_000
const POLL_EVERY = 20_000
/** A sign-out on this page is heard over the socket before its answer is here. */
const OWN_SIGN_OUT = 400
/** Going from page to page keeps the socket; staying away lets it go. */
const LINGER = 5_000

/**
 * The live connection as the pages see it: one socket, what it says of the connection and of who is looking, and the
 * followers that are kept up to date over HTTP. The socket is only ever a reason to ask.
 */
export const useLiveStore = defineStore('live', () => {
  const state = ref<LiveState>('connecting')
  /** ISO 8601; null before everything was known for the first time. */
  const heardAt = ref<string | null>(null)
  const lookers = ref<Record<string, Presence['lookers']>>({})

  const nuxt = useNuxtApp()
  const followers = new Set<Follower>()
  let socket: LiveSocket | null = null
  let polling: ReturnType<typeof setInterval> | null = null
  let graceTimer: ReturnType<typeof setTimeout> | null = null
  let again: ReturnType<typeof setTimeout> | null = null
  let listening = false
  let sessionDoubted = false

  /** The production of the page on screen; while one page gives way to the next, the newer one's. */
  const production = () => [...followers].at(-1)?.production
  const lookersOf = (slug: string): Presence['lookers'] => lookers.value[slug] ?? []

  /** Starts following. @returns `stop`, and `catchUp`, which asks at once and says whether all is known now. */
  function follow(following: Following): { stop: () => void; catchUp: () => Promise<boolean> } {
    const fetchAfter = (after: number) =>
      $fetch<EventsAnswer>(`/api/productions/${encodeURIComponent(following.production)}/events`, {
        query: { after },
        retry: 0,
        timeout: FETCH_WITHIN,
      })
    const catchUp = new CatchUp({ after: following.after, fetchAfter, deliver: following.event })
    const follower: Follower = { ...following, catchUp }
    followers.add(follower)
    listenToWindow()
    polling ??= setInterval(() => {
      if (state.value !== 'live' && document.visibilityState === 'visible') void syncAll()
    }, POLL_EVERY)
    void connect()
    return { catchUp: () => sync(follower), stop: () => unfollow(follower) }
  }

  function unfollow(follower: Follower): void {
    follower.catchUp.stop()
    followers.delete(follower)
    const next = production()
    if (next !== undefined) return void (next === follower.production ? lookAgain() : watchProduction())
    setTimeout(() => followers.size === 0 && hangUp(), LINGER)
    void look(follower.production, null)
  }

  /** Ends the connection without a word: before signing out, or when no page needs it. */
  function hangUp(): void {
    for (const follower of followers) follower.catchUp.stop()
    followers.clear()
    if (polling) clearInterval(polling)
    if (graceTimer) clearTimeout(graceTimer)
    if (again) clearTimeout(again)
    polling = graceTimer = again = null
    socket?.disconnect()
    state.value = 'connecting'
    lookers.value = {}
  }

  async function connect(): Promise<void> {
    waitForGrace()
    try {
      const made = await nuxt.$liveSocket()
      if (!socket) listenToSocket((socket = made))
    } catch {
      // The code itself could not be fetched: there is no line at all.
      state.value = 'offline'
      return tryAgain(connect)
    }
    if (followers.size === 0) return
    if (socket.connected) await watchProduction()
    else socket.connect()
  }

  function listenToSocket(line: LiveSocket): void {
    line.on('connect', () => void watchProduction())
    line.on('disconnect', () => {
      if (state.value === 'live') heardAt.value = new Date().toISOString()
      state.value = 'connecting'
      lookers.value = {}
      waitForGrace()
      // After a word of the server's the client does not come back by itself.
      if (!line.active) tryAgain(connect, sessionDoubted ? AT_ONCE : TRY_AGAIN)
      sessionDoubted = false
    })
    line.on('connect_error', (problem: Error & { data?: SocketAnswer }) => {
      if (problem.data?.ok === false && problem.data.statusCode === 401) return signedOut()
      state.value = 'offline'
      if (!line.active) tryAgain(connect)
    })
    line.on('event', ({ production: slug, n }) => {
      for (const follower of followers) if (follower.production === slug) void sync(follower, n)
    })
    line.on('presence', (presence) => {
      lookers.value = { ...lookers.value, [presence.production]: presence.lookers }
    })
    line.on('dismissed', ({ reason, production: slug }) => {
      // Perhaps this browser has a new session by now, as after a new password: the handshake will tell.
      if (reason === 'session') sessionDoubted = true
      else if (slug === production()) rightsChanged(reason)
    })
  }

  /** Says which production and shot are on screen, then asks for what was missed. */
  async function watchProduction(): Promise<void> {
    const slug = production()
    if (!socket?.connected || slug === undefined) return
    const answer = await ask('watch', { production: slug })
    if (slug !== production()) return
    if (!answer.ok) return refused(answer.statusCode, () => watchProduction())
    void lookAgain()
    if (!(await syncAll()) || !socket.connected) return
    state.value = 'live'
    if (graceTimer) clearTimeout(graceTimer)
    graceTimer = null
  }

  /** The shot on screen changed, or came into view. */
  async function lookAgain(): Promise<void> {
    const current = [...followers].at(-1)
    if (current) await look(current.production, document.visibilityState === 'visible' ? current.shot() : null)
  }
  async function look(slug: string, shot: string | null): Promise<void> {
    if (socket?.connected) await ask('look', { production: slug, shot })
  }
  async function ask(event: 'watch' | 'look', request: object): Promise<SocketAnswer> {
    try {
      return await socket!.timeout(ANSWER_WITHIN).emitWithAck(event, request)
    } catch {
      return { ok: false, statusCode: 504, message: 'No answer came in time.' }
    }
  }

  async function syncAll(): Promise<boolean> {
    const done = await Promise.all([...followers].map((follower) => sync(follower)))
    return done.every(Boolean)
  }
  /** @returns true when the follower now knows everything. */
  async function sync(follower: Follower, n?: number): Promise<boolean> {
    try {
      await (n === undefined ? follower.catchUp.run() : follower.catchUp.hear(n))
      heardAt.value = new Date().toISOString()
      return true
    } catch (problem) {
      if (followers.has(follower)) refused((problem as { statusCode?: number }).statusCode ?? 0, () => syncAll())
      return false
    }
  }

  function refused(statusCode: number, retry: () => Promise<unknown>): void {
    if (statusCode === 401) signedOut()
    else if (statusCode === 404) rightsChanged('membership')
    // While the line is down, the poll and the next connect ask anyway.
    else if (socket?.connected) tryAgain(retry)
  }
  function tryAgain(task: () => Promise<unknown>, ms = TRY_AGAIN): void {
    if (again) clearTimeout(again)
    again = setTimeout(() => followers.size > 0 && void task(), ms)
  }
  function waitForGrace(): void {
    graceTimer ??= setTimeout(() => {
      graceTimer = null
      if (state.value === 'connecting' && followers.size > 0) state.value = 'offline'
    }, GRACE)
  }

  // A whole new page each time: nothing that one person may see stays in memory for the next.
  function signedOut(): void {
    if (followers.size === 0) return
    hangUp()
    const { fullPath } = nuxt.$router.currentRoute.value
    setTimeout(() => {
      // Who signs out on this very page is shown the way by that.
      if (nuxt.$router.currentRoute.value.fullPath !== fullPath) return
      void nuxt.runWithContext(() => navigateTo({ path: '/sign-in', query: { to: fullPath } }, { external: true }))
    }, OWN_SIGN_OUT)
  }
  function rightsChanged(reason: 'membership' | 'role'): void {
    hangUp()
    if (reason === 'role') nuxt.runWithContext(() => reloadNuxtApp({ force: true }))
    else {
      leaveNotice('You are no longer on that production: its coordinator can tell you why.')
      void nuxt.runWithContext(() => navigateTo('/', { external: true }))
    }
  }

  function listenToWindow(): void {
    if (listening) return
    listening = true
    document.addEventListener('visibilitychange', () => {
      void lookAgain()
      // A machine that slept does not know yet that its line is dead.
      if (document.visibilityState === 'visible') void syncAll()
    })
    window.addEventListener('online', () => followers.size > 0 && void connect())
    window.addEventListener('offline', () => {
      if (followers.size > 0) state.value = 'offline'
    })
  }

  return {
    state: computed(() => state.value),
    heardAt: computed(() => heardAt.value),
    lookersOf,
    follow,
    lookAgain,
    catchUp: syncAll,
    hangUp,
  }
})
