import { inject } from 'vitest'

export interface Answer<Body = Record<string, unknown>> { status: number, body: Body, headers: Headers, text: string }

/** A browser-like caller: keeps its cookies and sends a matching Origin with every change. */
export function createClient(origin = inject('origin')) {
  const cookies = new Map<string, string>()
  async function call<Body = Record<string, unknown>>(method: string, path: string, json?: unknown, headers: Record<string, string> = {}): Promise<Answer<Body>> {
    const isForm = json instanceof FormData
    const answer = await fetch(origin + path, {
      method,
      redirect: 'manual',
      headers: {
        ...(method === 'GET' ? {} : { origin }),
        ...(cookies.size > 0 && { cookie: [...cookies].map(([name, value]) => `${name}=${value}`).join('; ') }),
        ...(json !== undefined && !isForm && { 'content-type': 'application/json' }),
        ...headers,
      },
      body: json === undefined ? undefined : isForm ? json : JSON.stringify(json),
    })
    for (const cookie of answer.headers.getSetCookie()) {
      const [name, value] = cookie.split(';')[0]!.split('=') as [string, string]
      if (value === '' || /max-age=0/i.test(cookie)) cookies.delete(name)
      else cookies.set(name, value)
    }
    const text = await answer.text()
    let body: unknown = null
    try {
      body = text ? JSON.parse(text) : null
    }
    catch {
      body = null
    }
    return { status: answer.status, body: body as Body, headers: answer.headers, text }
  }
  return {
    origin,
    cookies,
    get: <Body = Record<string, unknown>>(path: string, headers?: Record<string, string>) => call<Body>('GET', path, undefined, headers),
    post: <Body = Record<string, unknown>>(path: string, json?: unknown, headers?: Record<string, string>) => call<Body>('POST', path, json, headers),
    patch: <Body = Record<string, unknown>>(path: string, json?: unknown) => call<Body>('PATCH', path, json),
    put: <Body = Record<string, unknown>>(path: string, json?: unknown) => call<Body>('PUT', path, json),
    delete: <Body = Record<string, unknown>>(path: string) => call<Body>('DELETE', path),
  }
}
export type Client = ReturnType<typeof createClient>

export type DemoPerson = 'safety' | 'office' | 'foreman' | 'super' | 'installer' | 'newHire'

/** A client signed in as somebody of the demo company. */
export async function signedIn(who: DemoPerson, origin?: string): Promise<Client> {
  const client = createClient(origin)
  const body = who === 'newHire' ? { badge: '2041', pin: '739416' } : { email: `${who}@cedarhollow.example`, password: 'running-bond' }
  const answer = await client.post('/api/session', body)
  if (answer.status !== 200) throw new Error(`sign-in as ${who} answered ${answer.status}: ${answer.text}`)
  return client
}
