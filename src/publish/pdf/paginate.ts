// Slabs → pages. What must stay together moves to the next page together; a table that goes on gets its head again, as decoration.
import { type Box, moved } from './frames.ts'
import type { Slab } from './slab.ts'
import { page } from './style.ts'

/** A group longer than this part of a page is broken where it must, rather than leave the page before it half empty. */
const longestTogether = 0.35

export function paginate(slabs: readonly Slab[]): readonly (readonly Box[])[] {
  const pages: Box[][] = [[]]
  const room = page.bottom - page.top
  let y = 0
  const place = (slab: Slab): void => {
    y += y === 0 ? 0 : slab.spaceBefore
    const boxes = pages.at(-1)
    for (const box of slab.boxes) boxes?.push(moved(box, page.left, page.top + y))
    y += slab.height
  }
  const turn = (): void => {
    pages.push([])
    y = 0
  }
  slabs.forEach((slab, index) => {
    if (slab.breaksPage === true) {
      if (y > 0) turn()
      return
    }
    const before = slabs[index - 1]
    const isInside = slab.continued !== undefined && before?.continued === slab.continued
    const foot = slab.continued?.foot.height ?? 0
    const fits = (height: number): boolean => y + (y === 0 ? 0 : slab.spaceBefore) + height + foot <= room + 0.01
    const repeated = isInside ? (slab.continued?.head.height ?? 0) : 0
    if (y > 0) {
      const together = chainHeight(slabs, index, 'prefer')
      const least = chainHeight(slabs, index, 'must')
      const isWholePossible = together + repeated + foot <= longestTogether * room
      // A group that starts here moves as a whole only where its first row may start a page.
      const startsChain = before?.keepWithNext === undefined
      if (!fits(least) || (startsChain && isWholePossible && !fits(together))) {
        if (isInside && slab.continued !== undefined) place(slab.continued.foot)
        turn()
        if (isInside && slab.continued !== undefined) place(slab.continued.head)
      }
    }
    place(slab)
  })
  return pages.at(-1)?.length === 0 && pages.length > 1 ? pages.slice(0, -1) : pages
}

/** Height from this slab to the end of what it holds together. */
function chainHeight(slabs: readonly Slab[], index: number, strength: 'must' | 'prefer'): number {
  let height = slabs[index]?.height ?? 0
  for (let at = index; ; at += 1) {
    const current = slabs[at]
    const next = slabs[at + 1]
    if (current === undefined || next === undefined || next.breaksPage === true) return height
    if (current.keepWithNext === undefined || (strength === 'must' && current.keepWithNext === 'prefer')) return height
    height += next.spaceBefore + next.height
    if (height > 2000) return height // beyond any page; a longer chain says nothing more
  }
}
