import { openDB, type IDBPDatabase } from 'idb'

/** Something made without signal, kept on this device until the server has it. */
export interface OutboxEntry {
  /** Also the order in which entries go out. */
  id: string
  /** Who made it: it is never sent under another's session. */
  personId: string
  madeAt: string
  method: 'PUT' | 'POST'
  url: string
  body?: Record<string, unknown>
  /** Photos that go first; their ids are put into the body under `fileIds`. */
  files?: Blob[]
  /** What it is, as a message key, and its parts. */
  word: string
  parts?: Record<string, string>
  /** Entries of one chain wait for the ones before them. */
  chain?: string
  /** Why the server refused it; it stays until somebody decides. */
  problem?: string
}

let opened: Promise<IDBPDatabase> | undefined
const database = () => (opened ??= openDB('pourwright', 1, { upgrade: db => void db.createObjectStore('outbox', { keyPath: 'id' }) }))

/** A key that sorts by time and is unique on this device. */
const nextId = () => `${String(Date.now()).padStart(15, '0')}-${Math.random().toString(36).slice(2, 10)}`

/** Answers that mean "later": not signed in, too many, the server is down. Everything else below 500 is a refusal. */
const isForLater = (status: number) => status === 0 || status === 401 || status === 429 || status >= 500

/**
 * The queue of things not yet sent. Stored first, then sent in order; deleted only when the server took it. A refusal
 * is kept and shown. Sent at start, when the signal is back, when the app comes to the front, and every half minute.
 */
export const useOutboxStore = defineStore('outbox', () => {
  const entries = ref<OutboxEntry[]>([])
  const isOnline = ref(true)
  const isSending = ref(false)
  const session = useSessionStore()
  const { toProblem } = useApiError()

  const own = computed(() => entries.value.filter(entry => entry.personId === session.person?.id))
  const waiting = computed(() => own.value.filter(entry => entry.problem === undefined))
  const refused = computed(() => own.value.filter(entry => entry.problem !== undefined))

  async function load() {
    entries.value = (await (await database()).getAll('outbox')) as OutboxEntry[]
  }
  async function put(entry: OutboxEntry) {
    await (await database()).put('outbox', toRaw(entry))
    await load()
  }
  async function drop(id: string) {
    await (await database()).delete('outbox', id)
    await load()
  }

  /** Keeps something and tries to send it. Throws when this device has no room for it; nothing is then kept. */
  async function add(entry: Omit<OutboxEntry, 'id' | 'personId' | 'madeAt' | 'problem'> & { madeAt?: string }) {
    const kept = { madeAt: new Date().toISOString(), ...entry, id: nextId(), personId: session.person?.id ?? '' }
    await put(kept)
    void sendAll()
    return kept.id
  }

  async function send(entry: OutboxEntry) {
    const fileIds: string[] = []
    for (const file of entry.files ?? []) {
      const form = new FormData()
      form.append('file', file, 'photo')
      fileIds.push((await $fetch<{ id: string }>('/api/files', { method: 'POST', body: form })).id)
    }
    const url: string = entry.url
    await $fetch(url, { method: entry.method, body: entry.files ? { ...entry.body, fileIds } : entry.body })
  }

  async function sendEach() {
    const stopped = new Set<string>()
    for (const entry of [...waiting.value]) {
      if (entry.chain && (stopped.has(entry.chain) || refused.value.some(one => one.chain === entry.chain))) continue
      try {
        await send(entry)
        isOnline.value = true
        await drop(entry.id)
      }
      catch (error) {
        const { statusCode, text } = toProblem(error)
        if (isForLater(statusCode)) {
          isOnline.value = statusCode !== 0
          return
        }
        await put({ ...toRaw(entry), problem: text })
        if (entry.chain) stopped.add(entry.chain)
      }
    }
  }

  /** Sends what waits, in order, once at a time. */
  async function sendAll() {
    if (isSending.value || waiting.value.length === 0) return
    isSending.value = true
    try {
      await sendEach()
    }
    finally {
      isSending.value = false
    }
  }
  /** Puts a refused entry back into the queue. */
  async function retry(id: string) {
    const entry = entries.value.find(one => one.id === id)
    if (!entry) return
    const { problem: _refused, ...again } = toRaw(entry)
    await put(again)
    await sendAll()
  }

  return { entries, own, waiting, refused, isOnline, isSending, load, add, drop, retry, sendAll }
})
