// Slabs: horizontal bands of the text area that never break, the material of pages. Boxes of a slab are placed from its own top left.
import type { Box } from './frames.ts'
import type { InlineContext } from './inline.ts'
import type { StructureNode } from './structure.ts'

export interface Slab {
  readonly height: number
  /** White above, dropped at the top of a page. */
  readonly spaceBefore: number
  readonly boxes: readonly Box[]
  /** `must`: never the last on a page. `prefer`: not if a whole page can hold what belongs together. */
  readonly keepWithNext?: 'must' | 'prefer'
  readonly breaksPage?: true
  /** Parts of a table that go on: drawn at the foot of the page that ends inside it and at the head of the next. */
  readonly continued?: { readonly head: Slab; readonly foot: Slab }
}

export interface BlockContext extends InlineContext {
  readonly root: StructureNode
}

/** The baseline that centres letters of `size` in a line of `leading`. */
export function baselineIn(leading: number, size: number): number {
  return leading / 2 + size * 0.33
}
