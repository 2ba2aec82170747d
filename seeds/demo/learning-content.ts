/** A module that people of the demo company took in the product, as far as its past is told. A test keeps it equal to the content. */
export interface TaughtInDemo {
  slug: string
  lessons: readonly string[]
  /** Minutes of each lesson. */
  minutes: readonly number[]
  checklist: readonly string[]
}

/** The modules with content, with their lessons and hands-on steps in order. */
export const taughtModules: readonly TaughtInDemo[] = [
  {
    slug: 'stacking',
    lessons: ['seat-every-block', 'level-and-plumb', 'seams-and-weak-spots', 'stop-height'],
    minutes: [5, 4, 4, 5],
    checklist: ['instructions', 'footing-check', 'seat', 'line', 'plumb', 'cut-seam', 'stop', 'clean'],
  },
  {
    slug: 'running-bond',
    lessons: ['stagger-and-overlap', 'corners-left-and-right', 'ties-in-line', 'off-pattern-joints'],
    minutes: [5, 4, 4, 5],
    checklist: ['overlap', 'layout', 'corners', 'stagger', 'ties', 'strap', 'bar-seat'],
  },
]

/** One of them by its slug. Throws for another. */
export function taughtModule(slug: string): TaughtInDemo {
  const found = taughtModules.find(module => module.slug === slug)
  if (!found) throw new RangeError(`The demo company does not teach ${slug}`)
  return found
}
