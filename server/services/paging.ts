import type { Page } from '#shared/schemas/common'

/** One page of a short list that is already at hand. */
export function toPage<Item>(all: readonly Item[], { page, perPage }: { page: number, perPage: number }): Page<Item> {
  return { items: all.slice((page - 1) * perPage, page * perPage), total: all.length, page, perPage }
}

/** Keeps what holds `q` in one of its texts, without regard to case; everything when nothing is asked. */
export function matching<Item>(all: readonly Item[], q: string | undefined, textsOf: (item: Item) => readonly (string | null)[]): Item[] {
  const asked = q?.toLowerCase() ?? ''
  return all.filter(item => textsOf(item).some(text => (text ?? '').toLowerCase().includes(asked)))
}
