import type { Bilingual, ItemKind } from './states'
import type { Unit } from './units'

/** One choice of an item; a place item's letters stand in its picture. */
export interface ItemOption {
  id: string
  text: Bilingual
}

/** The right number, in the item's unit. The tolerance is absolute, or a share of the value when `relative`. */
export interface NumberKey {
  value: number
  tolerance: number
  relative?: boolean
}

interface ItemBase {
  /** Unique for ever: past attempts point at it. */
  id: string
  /** Slug of the lesson that teaches it. */
  lesson: string
  /** Must be right for a pass, and is served in every attempt. */
  mustKnow: boolean
  source: string
  stem: Bilingual
  feedback: Bilingual
  /** Name of the drawing shown with the item. */
  picture?: string
}

/** One question with its key. It lives on the server; `toServedItem` makes what may leave it. */
export type BankItem
  = | (ItemBase & { kind: 'one', options: readonly ItemOption[], key: string })
    | (ItemBase & { kind: 'place', options: readonly ItemOption[], key: string })
    | (ItemBase & { kind: 'all', options: readonly ItemOption[], key: readonly string[] })
    | (ItemBase & { kind: 'order', options: readonly ItemOption[], key: readonly string[] })
    | (ItemBase & { kind: 'number', unit: Unit, units?: readonly Unit[], key: NumberKey })

/** A module's questions, as its file holds them. */
export interface QuizBank {
  module: string
  /** Items in one attempt; more only when there are more must-know items. */
  quizLength: number
  /** Share from 0 to 1. */
  passMark: number
  /** Minutes the quiz stays shut after two fails in a row. */
  pauseMinutes: number
  items: readonly BankItem[]
}

/** What a learner gets of an item: no key, no feedback, no source, and nothing that tells must-know items apart. */
export interface ServedItem {
  id: string
  kind: ItemKind
  stem: string
  options?: { id: string, text: string }[]
  unit?: Unit
  units?: readonly Unit[]
  picture?: string
}

/** An answer as it comes from a client, after its schema: option id, option ids, or a number with or without a unit. */
export type Answer = string | number | readonly string[] | { value: number | string, unit?: string }

/** What is wrong with the key of an item, or null: the guard of every bank. */
export function keyProblem(item: BankItem): 'noSuchOption' | 'repeatedOption' | 'emptyKey' | 'notEveryOption' | 'badNumber' | null {
  if (item.kind === 'number') {
    const { value, tolerance } = item.key
    return Number.isFinite(value) && Number.isFinite(tolerance) && tolerance >= 0 ? null : 'badNumber'
  }
  const ids = item.options.map(option => option.id)
  const key = typeof item.key === 'string' ? [item.key] : item.key
  if (new Set(ids).size !== ids.length || new Set(key).size !== key.length) return 'repeatedOption'
  if (key.length === 0) return 'emptyKey'
  if (key.some(id => !ids.includes(id))) return 'noSuchOption'
  return item.kind === 'order' && key.length !== ids.length ? 'notEveryOption' : null
}
