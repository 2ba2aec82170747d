import { moduleBySlug } from '#shared/domain/curriculum'
import type { BankItem } from '#shared/domain/quiz-bank'
import { notFound } from './refusal'
import type { TaughtModule, Teaching } from './teaching'

/** An item of a bank, with its module. */
export interface FoundItem { taught: TaughtModule, item: BankItem }

/** The item of that id, whichever bank it stands in: ids are unique for ever. 404 when there is none. */
export function requireItem(teaching: Teaching, id: string): FoundItem {
  for (const taught of teaching.values()) {
    const item = taught.bank.items.find(one => one.id === id)
    if (item) return { taught, item }
  }
  throw notFound('item')
}

/** A module's slug with its title. 404 for no such module. */
export function requireModule(slug: string) {
  const module = moduleBySlug(slug)
  if (!module) throw notFound('module')
  return module
}
