// A small seeded generator (mulberry32), so that generated studies and simulations are the same on every machine.

export interface Random {
  /** Uniform in [0, 1). */
  next(): number
  /** Standard normal (Box-Muller). */
  normal(): number
  integer(low: number, high: number): number
  pick<T>(items: readonly T[]): T
  shuffled<T>(items: readonly T[]): T[]
}

export function seededRandom(seed: number): Random {
  let state = seed >>> 0
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
  const integer = (low: number, high: number): number => low + Math.floor(next() * (high - low + 1))
  return {
    next, integer,
    normal: () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    pick: (items) => {
      const item = items[integer(0, items.length - 1)]
      if (item === undefined) throw new Error('nothing to pick from')
      return item
    },
    shuffled: (items) => {
      const copy = [...items]
      for (let index = copy.length - 1; index > 0; index -= 1) {
        const other = integer(0, index)
        ;[copy[index], copy[other]] = [copy[other] as (typeof copy)[number], copy[index] as (typeof copy)[number]]
      }
      return copy
    },
  }
}
