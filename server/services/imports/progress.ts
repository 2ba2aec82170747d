import { setImmediate as nextTurn } from 'node:timers/promises'
import type { ImportProgress } from '#shared/schemas/imports'

/** How far imports that run now have come, by the key their sender chose; the newest few only. */
const running = new Map<string, ImportProgress & { personId: string }>()
const most = 50
/** Rows between two breaths, in which others are answered. */
const stride = 250

/** Tells how far an import has come; every so many rows it lets others be answered. */
export type Tell = (phase: ImportProgress['phase'], done: number, total: number) => Promise<void>

/** A teller for one import; without a key it only breathes. */
export function tellerOf(personId: string, key: string | undefined): Tell {
  return async (phase, done, total) => {
    if (done % stride !== 0 && done !== total) return
    if (key) {
      running.delete(`${personId}/${key}`)
      running.set(`${personId}/${key}`, { personId, phase, done, total })
      while (running.size > most) running.delete(running.keys().next().value!)
    }
    await nextTurn()
  }
}

/** How far one's own import has come; nothing done while it is unknown. */
export function readProgress(personId: string, key: string): ImportProgress {
  const found = running.get(`${personId}/${key}`)
  return found ? { phase: found.phase, done: found.done, total: found.total } : { phase: 'reading', done: 0, total: 0 }
}
