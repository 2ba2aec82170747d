/** For each row the columns it may take, by number; earlier ones are tried first. */
export type Choices = readonly (readonly number[])[]

/** For each row the column it takes, or null. */
export type Matching = (number | null)[]

/**
 * A matching that fills as many rows as can be filled, each column taken once (augmenting paths). Exact, and the
 * same for the same input: rows in order, columns in the order given.
 */
export function largestMatching(choices: Choices): Matching {
  const rowOf = new Map<number, number>()

  function canPlace(row: number, tried: Set<number>): boolean {
    for (const column of choices[row] ?? []) {
      if (tried.has(column)) continue
      tried.add(column)
      const holder = rowOf.get(column)
      if (holder === undefined || canPlace(holder, tried)) {
        rowOf.set(column, row)
        return true
      }
    }
    return false
  }

  for (const row of choices.keys()) canPlace(row, new Set())
  const matching: Matching = choices.map(() => null)
  for (const [column, row] of rowOf) matching[row] = column
  return matching
}

/**
 * Why a largest matching leaves its first empty row empty (Hall's condition): rows that share fewer columns than
 * they are, with all the columns any of them could take. Null when no row is empty.
 */
export function shortRows(choices: Choices, matching: Matching): { rows: number[], columns: number[] } | null {
  const start = matching.indexOf(null)
  if (start === -1) return null
  const rowOf = new Map(matching.flatMap((column, row) => column === null ? [] : [[column, row] as const]))
  const rows = new Set([start])
  const columns = new Set<number>()
  for (const row of rows) {
    for (const column of choices[row] ?? []) {
      columns.add(column)
      const holder = rowOf.get(column)
      if (holder !== undefined) rows.add(holder)
    }
  }
  const ascending = (first: number, second: number) => first - second
  return { rows: [...rows].sort(ascending), columns: [...columns].sort(ascending) }
}

/**
 * Among the matchings that fill the most rows, one that costs least (successive shortest paths). `costs` has a
 * row of whole numbers, 0 or more, per row; null where a row cannot take a column.
 */
export function cheapestMatching(costs: readonly (readonly (number | null)[])[]): Matching {
  const matching: Matching = costs.map(() => null)
  for (let path = cheapestPath(costs, matching); path !== null; path = cheapestPath(costs, matching)) {
    for (const { row, column } of path) matching[row] = column
  }
  return matching
}

/** What a matching costs. */
export function costOf(costs: readonly (readonly (number | null)[])[], matching: Matching): number {
  return matching.reduce<number>((sum, column, row) => column === null ? sum : sum + (costs[row]?.[column] ?? 0), 0)
}

interface Reached {
  cost: number
  row: number
}

/** The cheapest way to fill one more row: who moves where; null when no more rows can be filled (Bellman and Ford). */
function cheapestPath(
  costs: readonly (readonly (number | null)[])[], matching: Matching,
): { row: number, column: number }[] | null {
  const rowOf = new Map(matching.flatMap((column, row) => column === null ? [] : [[column, row] as const]))
  const rowCost = matching.map(column => column === null ? 0 : Number.POSITIVE_INFINITY)
  const reached = new Map<number, Reached>()
  let hasChanged = true
  while (hasChanged) {
    hasChanged = false
    for (const [row, line] of costs.entries()) {
      const base = rowCost[row] ?? Number.POSITIVE_INFINITY
      if (base === Number.POSITIVE_INFINITY) continue
      for (const [column, step] of line.entries()) {
        if (step === null || matching[row] === column) continue
        const cost = base + step
        if (cost >= (reached.get(column)?.cost ?? Number.POSITIVE_INFINITY)) continue
        reached.set(column, { cost, row })
        hasChanged = true
        const holder = rowOf.get(column)
        if (holder !== undefined) rowCost[holder] = cost - (costs[holder]?.[column] ?? 0)
      }
    }
  }
  return pathTo(cheapestFreeColumn(reached, rowOf), { reached, matching })
}

function cheapestFreeColumn(reached: ReadonlyMap<number, Reached>, rowOf: ReadonlyMap<number, number>): number | null {
  const free = [...reached].filter(([column]) => !rowOf.has(column))
  const [best] = free.sort(([column, { cost }], [other, { cost: otherCost }]) => cost - otherCost || column - other)
  return best?.[0] ?? null
}

function pathTo(
  end: number | null, { reached, matching }: { reached: ReadonlyMap<number, Reached>, matching: Matching },
): { row: number, column: number }[] | null {
  if (end === null) return null
  const path: { row: number, column: number }[] = []
  for (let column: number | null = end; column !== null;) {
    const from = reached.get(column)
    if (from === undefined) return null
    path.push({ row: from.row, column })
    column = matching[from.row] ?? null
  }
  return path
}
