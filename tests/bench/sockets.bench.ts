/**
 * From a comment's POST to its arrival on 100 sockets: here the word that event n exists and the fetch of it, against a
 * bare socket.io server that sends the comment itself, same run.
 */
import { randomUUID } from 'node:crypto'
import { io } from 'socket.io-client'
import { CatchUp } from '../../utils/catch-up'
import type { EventsAnswer } from '../../utils/contracts/event'
import type { Thread } from '../../utils/contracts/thread'
import { startServer, stopServers } from '../helpers/server'
import { House } from '../live/house'
import type { SignedIn } from '../live/house'
import { median, startBare } from './bare/start'

const SOCKETS = 100
const WARM_UP = 3
const COMMENTS = 20
const LATEST_MS = 20_000

/** Calls `arrived` with a comment's id once per socket. */
type Arrived = (clientId: string) => void
interface Side {
  post: (clientId: string) => Promise<void>
  close: () => void
}

export default async function run(): Promise<void> {
  const theirs = await measure(bareSide)
  const ours = await measure(boardSide)
  const line = (name: string, all: readonly number[]) => {
    const [middle, worst] = [median(all), Math.max(...all)]
    return `${name.padEnd(34)}${middle.toFixed(1).padStart(8)} ms${worst.toFixed(1).padStart(10)} ms`
  }
  console.log(
    [
      `${COMMENTS} comments, each to ${SOCKETS} sockets            median       worst`,
      line('bare socket.io: POST → emit', theirs),
      line('the board: POST → event → fetch', ours),
      `ratio of the medians              ${(median(ours) / median(theirs)).toFixed(2).padStart(8)}`,
    ].join('\n'),
  )
  await stopServers()
}

/** @returns milliseconds from the POST to the arrival, for each comment on each socket */
async function measure(open: (arrived: Arrived) => Promise<Side>): Promise<number[]> {
  const counts = new Map<string, { at: number[]; whole: () => void }>()
  const side = await open((clientId) => {
    const count = counts.get(clientId)
    count?.at.push(performance.now())
    if (count?.at.length === SOCKETS) count.whole()
  })
  const spent: number[] = []
  for (let i = 0; i < WARM_UP + COMMENTS; i += 1) {
    const clientId = randomUUID()
    const at: number[] = []
    const whole = new Promise<void>((resolve, reject) => {
      const late = setTimeout(() => reject(new Error(`After ${LATEST_MS} ms the comment was on ${at.length} of ${SOCKETS} sockets.`)), LATEST_MS)
      const done = () => {
        clearTimeout(late)
        resolve()
      }
      counts.set(clientId, { at, whole: done })
    })
    const began = performance.now()
    await Promise.all([side.post(clientId), whole])
    if (i >= WARM_UP) spent.push(...at.map((moment) => moment - began))
  }
  side.close()
  return spent
}

async function bareSide(arrived: Arrived): Promise<Side> {
  const bare = await startBare('sockets')
  const sockets = await openSockets(bare.url, () => ({}))
  for (const socket of sockets) socket.on('comment', ({ clientId }: { clientId: string }) => arrived(clientId))
  const close = () => {
    sockets.forEach((socket) => socket.disconnect())
    bare.stop()
  }
  return { post: (clientId) => post(bare.url, { clientId, body: 'The settle reads late.' }).then(() => undefined), close }
}

async function boardSide(arrived: Arrived): Promise<Side> {
  const server = await startServer({ demo: 'off' })
  const house = new House(server)
  const pier = await house.production('pier', ['PIR-010'])
  const people: SignedIn[] = []
  for (let i = 0; i < SOCKETS; i += 1) people.push(await house.person(`Person ${i}`, { [pier]: 'animator' }))
  await house.close()

  const [writer] = people
  if (!writer) throw new Error('There is nobody to write.')
  const threads = `${server.url}/api/productions/pier/shots/PIR-010/threads`
  const headers = { origin: server.url, cookie: writer.cookie }
  const opening = { clientId: randomUUID(), fromFrame: 37, toFrame: 37, comment: { clientId: randomUUID(), body: 'begins' } }
  const { id } = (await post(threads, opening, headers)) as Thread

  const sockets = await openSockets(server.url, (i) => ({ origin: server.url, cookie: people[i]?.cookie ?? '' }))
  for (const [i, socket] of sockets.entries()) {
    const catchUp = new CatchUp({
      after: 0,
      deliver: ({ comment }) => comment && arrived(comment.clientId),
      fetchAfter: async (after) => {
        const address = `${server.url}/api/productions/pier/events?after=${after}`
        return (await (await fetch(address, { headers: { cookie: people[i]?.cookie ?? '' } })).json()) as EventsAnswer
      },
    })
    await catchUp.run()
    socket.on('event', ({ n }: { n: number }) => void catchUp.hear(n))
    const answer = (await socket.timeout(10_000).emitWithAck('watch', { production: 'pier' })) as { ok: boolean }
    if (!answer.ok) throw new Error('A socket was refused.')
  }
  return {
    post: (clientId) => post(`${threads}/${id}/comments`, { clientId, body: 'The settle reads late.' }, headers).then(() => undefined),
    close: () => sockets.forEach((socket) => socket.disconnect()),
  }
}

async function openSockets(url: string, headers: (i: number) => Record<string, string>) {
  const sockets = Array.from({ length: SOCKETS }, (_, i) =>
    io(url, { transports: ['websocket'], forceNew: true, reconnection: false, extraHeaders: headers(i) }),
  )
  await Promise.all(
    sockets.map(
      (socket) =>
        new Promise<void>((resolve, reject) => {
          socket.once('connect', resolve)
          socket.once('connect_error', reject)
        }),
    ),
  )
  return sockets
}

async function post(url: string, body: object, headers: Record<string, string> = {}): Promise<unknown> {
  const answer = await fetch(url, {
    method: 'POST',
    body: JSON.stringify(body),
    headers: { 'content-type': 'application/json', ...headers },
  })
  if (!answer.ok) throw new Error(`${url} answered ${answer.status}: ${await answer.text()}`)
  return answer.json()
}
