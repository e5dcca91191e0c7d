import type { Me, SessionAnswer } from '~/utils/contracts/people'

export interface Answer<T = unknown> {
  status: number
  /** Parsed when it is JSON, otherwise the text; null when empty. */
  body: T
  headers: Headers
}

export interface RequestOptions {
  headers?: Record<string, string>
  /** Sent as it stands instead of a JSON body: for what no well-meaning client sends. */
  raw?: string | Uint8Array
}

/** Talks to the API as the product's own page does: with the cookie, and with its Origin on whatever changes something. */
export interface Client {
  url: string
  /** The `Cookie` header as it is now; empty when signed out. */
  readonly cookie: string
  /** Who signed in, null for nobody. */
  readonly me: Me | null
  get<T = unknown>(path: string, options?: RequestOptions): Promise<Answer<T>>
  post<T = unknown>(path: string, body?: unknown, options?: RequestOptions): Promise<Answer<T>>
  put<T = unknown>(path: string, body?: unknown, options?: RequestOptions): Promise<Answer<T>>
  patch<T = unknown>(path: string, body?: unknown, options?: RequestOptions): Promise<Answer<T>>
  delete<T = unknown>(path: string, body?: unknown, options?: RequestOptions): Promise<Answer<T>>
  /** Any verb at all. */
  send<T = unknown>(method: string, path: string, body?: unknown, options?: RequestOptions): Promise<Answer<T>>
  /** Signs in anew; the answer is given back, whatever it is. */
  signIn(email: string, password: string): Promise<Answer<SessionAnswer>>
}

/** A client that nobody has signed in with yet. `cookie` continues somebody else's session. */
export function anonymous(url: string, cookie = ''): Client {
  const jar = new Map<string, string>()
  for (const pair of cookie.split('; ').filter(Boolean)) keep(jar, pair)
  let me: Me | null = null

  async function send<T>(method: string, path: string, body?: unknown, options: RequestOptions = {}): Promise<Answer<T>> {
    const content = options.raw ?? (body === undefined ? undefined : JSON.stringify(body))
    const response = await fetch(url + path, {
      method,
      redirect: 'manual',
      body: content as BodyInit | undefined,
      headers: {
        ...(method === 'GET' ? {} : { origin: url }),
        ...(content === undefined ? {} : { 'content-type': 'application/json' }),
        ...(jar.size > 0 ? { cookie: header(jar) } : {}),
        ...options.headers,
      },
    })
    for (const line of response.headers.getSetCookie()) keep(jar, line)
    return { status: response.status, body: (await bodyOf(response)) as T, headers: response.headers }
  }

  return {
    url,
    get cookie() {
      return header(jar)
    },
    get me() {
      return me
    },
    send,
    get: (path, options) => send('GET', path, undefined, options),
    post: (path, body, options) => send('POST', path, body, options),
    put: (path, body, options) => send('PUT', path, body, options),
    patch: (path, body, options) => send('PATCH', path, body, options),
    delete: (path, body, options) => send('DELETE', path, body, options),
    signIn: async (email, password) => {
      const answer = await send<SessionAnswer>('POST', '/api/session', { email, password })
      if (answer.status < 300) me = answer.body.me
      return answer
    },
  }
}

/** The password of every demo account. */
export const DEMO_PASSWORD = 'cranes walk at night'

/** Signs in and answers the client. @throws when the server refuses */
export async function signIn(url: string, email: string, password: string = DEMO_PASSWORD): Promise<Client> {
  const client = anonymous(url)
  const answer = await client.signIn(email, password)
  if (answer.status >= 300) throw new Error(`${email} could not sign in: ${answer.status} ${JSON.stringify(answer.body)}`)
  return client
}

/** Signs in one of the demo accounts: `animator`, `supervisor`, `coordinator`, `guest` or `keeper`. */
export function signInDemo(url: string, account: 'animator' | 'supervisor' | 'coordinator' | 'guest' | 'keeper') {
  return signIn(url, `${account}@quayside.example`)
}

const header = (jar: Map<string, string>) => [...jar].map(([name, value]) => `${name}=${value}`).join('; ')

/** Takes a `Set-Cookie` line as a browser does, as far as this product sets cookies: no path, no domain. */
function keep(jar: Map<string, string>, line: string) {
  const [pair = '', ...attributes] = line.split(';').map((part) => part.trim())
  const cut = pair.indexOf('=')
  const name = pair.slice(0, cut)
  const value = pair.slice(cut + 1)
  const over = attributes.some((attribute) => {
    const [key = '', said = ''] = attribute.split('=')
    if (key.toLowerCase() === 'max-age') return Number(said) <= 0
    return key.toLowerCase() === 'expires' && Date.parse(said) <= Date.now()
  })
  if (over || value === '') jar.delete(name)
  else jar.set(name, value)
}

async function bodyOf(response: Response): Promise<unknown> {
  const text = await response.text()
  if (text === '') return null
  return /\bjson\b/.test(response.headers.get('content-type') ?? '') ? JSON.parse(text) : text
}
