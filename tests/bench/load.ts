import { Agent, request } from 'node:http'

export interface Measured { count: number, seconds: number, perSecond: number, p50: number, p99: number, statuses: Record<number, number> }

interface Sent { method: string, path: string, headers: Record<string, string>, body: string }

function send(origin: URL, agent: Agent, { method, path, headers, body }: Sent): Promise<number> {
  return new Promise((done, fail) => {
    const call = request({ host: origin.hostname, port: origin.port, method, path, agent, headers: { 'content-length': Buffer.byteLength(body), ...headers } }, (answer) => {
      answer.resume()
      answer.on('end', () => done(answer.statusCode ?? 0))
    })
    call.on('error', fail)
    call.end(body)
  })
}

/** Sends every request once, `width` at a time over kept-alive connections, and tells how long they took (milliseconds for p50, p99). */
export async function measure(origin: string, requests: readonly Sent[], width = 16): Promise<Measured> {
  const url = new URL(origin)
  const agent = new Agent({ keepAlive: true, maxSockets: width })
  const times: number[] = []
  const statuses: Record<number, number> = {}
  let next = 0
  const startedAt = performance.now()
  await Promise.all(Array.from({ length: width }, async () => {
    for (;;) {
      const sent = requests[next++]
      if (!sent) return
      const at = performance.now()
      const status = await send(url, agent, sent)
      times.push(performance.now() - at)
      statuses[status] = (statuses[status] ?? 0) + 1
    }
  }))
  const seconds = (performance.now() - startedAt) / 1000
  agent.destroy()
  times.sort((a, b) => a - b)
  const at = (share: number) => times[Math.min(times.length - 1, Math.floor(times.length * share))] ?? 0
  return { count: requests.length, seconds, perSecond: requests.length / seconds, p50: at(0.5), p99: at(0.99), statuses }
}
