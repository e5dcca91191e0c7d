import { EventEmitter } from 'node:events'
import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useLiveStore } from '~/stores/live'
import type { EventsAnswer, ProductionEvent, SocketAnswer } from '~/utils/contracts/event'

/** A socket whose other end is the test. */
class FakeSocket extends EventEmitter {
  connected = false
  active = false
  asked: [string, object][] = []
  answers: Record<string, SocketAnswer> = {}

  connect() {
    this.active = true
  }
  disconnect() {
    if (this.connected) this.drop('io client disconnect')
  }
  /** The connection stands. */
  up() {
    this.connected = true
    this.emit('connect')
  }
  drop(reason = 'transport close') {
    this.connected = false
    this.active = !reason.startsWith('io ')
    this.emit('disconnect', reason)
  }
  timeout() {
    return {
      emitWithAck: async (name: string, request: object) => {
        this.asked.push([name, request])
        return this.answers[name] ?? { ok: true }
      },
    }
  }
}

const event = (n: number): ProductionEvent => ({ n, kind: 'shot', shot: null, by: null, at: '2026-01-01T00:00:00.000Z' })
let socket: FakeSocket
let record: number
let fetched: number[]
let refusal: { statusCode?: number } | null
let page: EventTarget & { visibilityState: string }
let browser: EventTarget
let path: string
const went = vi.fn()
const reloaded = vi.fn()

beforeEach(() => {
  vi.useFakeTimers()
  setActivePinia(createPinia())
  socket = new FakeSocket()
  record = 0
  fetched = []
  refusal = null
  path = '/p/pier'
  page = Object.assign(new EventTarget(), { visibilityState: 'visible' })
  browser = new EventTarget()
  vi.stubGlobal('document', page)
  vi.stubGlobal('window', browser)
  vi.stubGlobal('navigateTo', went)
  vi.stubGlobal('reloadNuxtApp', reloaded)
  vi.stubGlobal('useNuxtApp', () => ({
    $liveSocket: async () => socket,
    $router: { currentRoute: { value: { get fullPath() { return path } } } },
    runWithContext: (task: () => unknown) => task(),
  }))
  vi.stubGlobal('$fetch', async (address: string, { query }: { query: { after: number } }): Promise<EventsAnswer> => {
    expect(address).toBe('/api/productions/pier/events')
    fetched.push(query.after)
    if (refusal) throw Object.assign(new Error('refused'), refusal)
    const events = Array.from({ length: record - query.after }, (_, i) => event(query.after + 1 + i))
    return { events, more: false }
  })
})
afterEach(() => {
  vi.useRealTimers()
  went.mockReset()
  reloaded.mockReset()
})

const settle = () => vi.advanceTimersByTimeAsync(1)
function follow(after = 0, shot: string | null = null) {
  const store = useLiveStore()
  const seen: number[] = []
  const follower = store.follow({ production: 'pier', after, event: ({ n }) => seen.push(n), shot: () => shot })
  return { store, seen, ...follower }
}
async function live(after = 0, shot: string | null = null) {
  const page = follow(after, shot)
  await settle()
  socket.up()
  await settle()
  expect(page.store.state).toBe('live')
  return page
}

describe('a page that follows a production', () => {
  it('is live once it is in the room and knows everything', async () => {
    record = 3
    const { store, seen } = follow(1, 'PIR-010')
    expect(store.state).toBe('connecting')
    await settle()
    socket.up()
    await settle()
    expect(socket.asked).toEqual([
      ['watch', { production: 'pier' }],
      ['look', { production: 'pier', shot: 'PIR-010' }],
    ])
    expect(seen).toEqual([2, 3])
    expect(store.state).toBe('live')
    expect(store.heardAt).not.toBeNull()
  })

  it('fetches what it hears of, and nothing for another production', async () => {
    const { seen } = await live()
    record = 2
    socket.emit('event', { production: 'harbour', n: 9 })
    await settle()
    expect(seen).toEqual([])
    socket.emit('event', { production: 'pier', n: 1 })
    socket.emit('event', { production: 'pier', n: 2 })
    await settle()
    expect(seen).toEqual([1, 2])
  })

  it('follows again and asks for what it missed on every connect', async () => {
    const { seen, store } = await live(0, 'PIR-010')
    socket.drop()
    expect(store.state).toBe('connecting')
    record = 2
    socket.asked = []
    socket.up()
    await settle()
    expect(socket.asked.map(([name]) => name)).toEqual(['watch', 'look'])
    expect(seen).toEqual([1, 2])
    expect(store.state).toBe('live')
  })

  it('says offline only when the line stays down, and then asks every 20 seconds while it is seen', async () => {
    const { store, seen } = await live()
    socket.drop()
    await vi.advanceTimersByTimeAsync(2_000)
    expect(store.state).toBe('connecting')
    await vi.advanceTimersByTimeAsync(2_000)
    expect(store.state).toBe('offline')
    record = 1
    await vi.advanceTimersByTimeAsync(20_000)
    expect(seen).toEqual([1])
    page.visibilityState = 'hidden'
    const before = fetched.length
    await vi.advanceTimersByTimeAsync(60_000)
    expect(fetched.length).toBe(before)
  })

  it('tries again when catching up fails while the line stands', async () => {
    refusal = { statusCode: 500 }
    const { store, seen } = follow()
    await settle()
    socket.up()
    await settle()
    expect(store.state).not.toBe('live')
    refusal = null
    record = 1
    await vi.advanceTimersByTimeAsync(2_500)
    expect(seen).toEqual([1])
  })

  it('comes back by itself after the server sent it away without a reason', async () => {
    await live()
    socket.drop('io server disconnect')
    const connect = vi.spyOn(socket, 'connect')
    await vi.advanceTimersByTimeAsync(2_500)
    expect(connect).toHaveBeenCalled()
  })

  it('knows who is looking, and forgets it with the connection', async () => {
    const { store } = await live()
    const lookers = [{ person: { id: 'a', name: 'Ada Lund' }, shot: 'PIR-010' }]
    socket.emit('presence', { production: 'pier', lookers })
    expect(store.lookersOf('pier')).toEqual(lookers)
    expect(store.lookersOf('harbour')).toEqual([])
    socket.drop()
    expect(store.lookersOf('pier')).toEqual([])
  })

  it('does not look at a shot while the window is hidden', async () => {
    await live(0, 'PIR-010')
    socket.asked = []
    page.visibilityState = 'hidden'
    page.dispatchEvent(new Event('visibilitychange'))
    await settle()
    expect(socket.asked).toEqual([['look', { production: 'pier', shot: null }]])
    page.visibilityState = 'visible'
    page.dispatchEvent(new Event('visibilitychange'))
    await settle()
    expect(socket.asked.at(-1)).toEqual(['look', { production: 'pier', shot: 'PIR-010' }])
  })

  it('hears nothing any more after it was left, and lets the line go when no page needs it', async () => {
    const { stop, seen } = await live(0, 'PIR-010')
    stop()
    await settle()
    expect(socket.asked.at(-1)).toEqual(['look', { production: 'pier', shot: null }])
    record = 1
    socket.emit('event', { production: 'pier', n: 1 })
    await settle()
    expect(seen).toEqual([])
    expect(socket.connected).toBe(true)
    await vi.advanceTimersByTimeAsync(6_000)
    expect(socket.connected).toBe(false)
  })

  it('keeps the line from one page to the next', async () => {
    const { stop } = await live()
    const next = follow(0, 'PIR-020')
    stop()
    await vi.advanceTimersByTimeAsync(10_000)
    expect(socket.connected).toBe(true)
    record = 1
    socket.emit('event', { production: 'pier', n: 1 })
    await settle()
    expect(next.seen).toEqual([1])
    expect(socket.asked.at(-1)).toEqual(['look', { production: 'pier', shot: 'PIR-020' }])
  })
})

describe('rights that end', () => {
  const noSession = Object.assign(new Error('Sign in first.'), { data: { ok: false, statusCode: 401 } })
  /** What the server does to the sockets of a session that ended. */
  function cutOff() {
    socket.emit('dismissed', { reason: 'session' })
    socket.drop('io server disconnect')
  }

  it('lead to the sign-in page when the session is over', async () => {
    await live()
    const connect = vi.spyOn(socket, 'connect')
    cutOff()
    await vi.advanceTimersByTimeAsync(100)
    expect(connect).toHaveBeenCalledOnce()
    expect(went).not.toHaveBeenCalled()
    socket.emit('connect_error', noSession)
    await vi.advanceTimersByTimeAsync(1_000)
    expect(went).toHaveBeenCalledExactlyOnceWith({ path: '/sign-in', query: { to: '/p/pier' } }, { external: true })
  })

  it('are back at once when the browser has a new session by then', async () => {
    const { store, seen } = await live()
    cutOff()
    await vi.advanceTimersByTimeAsync(100)
    record = 1
    socket.up()
    await settle()
    expect([store.state, seen]).toEqual(['live', [1]])
    await vi.advanceTimersByTimeAsync(5_000)
    expect(went).not.toHaveBeenCalled()
  })

  it('lead there, too, when only the fetch says so', async () => {
    await live()
    refusal = { statusCode: 401 }
    socket.emit('event', { production: 'pier', n: 1 })
    await vi.advanceTimersByTimeAsync(1_000)
    expect(went).toHaveBeenCalledOnce()
  })

  it('leave alone who is on the way out by themselves', async () => {
    await live()
    cutOff()
    await vi.advanceTimersByTimeAsync(100)
    socket.emit('connect_error', noSession)
    path = '/sign-in'
    await vi.advanceTimersByTimeAsync(1_000)
    expect(went).not.toHaveBeenCalled()
  })

  it('lead to the walls when the membership is over', async () => {
    await live()
    socket.emit('dismissed', { reason: 'membership', production: 'pier' })
    await settle()
    expect(went).toHaveBeenCalledExactlyOnceWith('/', { external: true })
  })

  it('lead to the walls when the server knows no such production any more', async () => {
    socket.answers.watch = { ok: false, statusCode: 404, message: 'There is nothing here.' }
    follow()
    await settle()
    socket.up()
    await settle()
    expect(went).toHaveBeenCalledExactlyOnceWith('/', { external: true })
  })

  it('load the page again when the role is another one', async () => {
    await live()
    socket.emit('dismissed', { reason: 'role', production: 'pier' })
    await settle()
    expect(reloaded).toHaveBeenCalledExactlyOnceWith({ force: true })
  })

  it('of another production change nothing here', async () => {
    const { store } = await live()
    socket.emit('dismissed', { reason: 'membership', production: 'harbour' })
    socket.emit('dismissed', { reason: 'role', production: 'harbour' })
    await vi.advanceTimersByTimeAsync(1_000)
    expect([went.mock.calls, reloaded.mock.calls, store.state]).toEqual([[], [], 'live'])
  })
})
