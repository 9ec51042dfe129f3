// The laid-out report as plain data: pages with placed boxes, y downwards from the top of the page. Everything is final here; drawing
// only says it in the language of PDF.
import type { Drawing } from '../drawing.ts'
import type { FaceName } from '../fonts.ts'
import type { StructureNode } from './structure.ts'

export interface TextBox {
  readonly kind: 'text'
  readonly x: number
  /** Baseline. */
  readonly y: number
  readonly text: string
  readonly face: FaceName
  readonly size: number
  readonly width: number
  readonly colour: string
  /** Undefined for decoration (page headers, repeated table heads). */
  readonly tag: StructureNode | undefined
  readonly isStruck?: true
}

export interface RuleBox {
  readonly kind: 'rule'
  readonly x: number
  readonly y: number
  readonly toX: number
  readonly toY: number
  readonly width: number
  readonly colour: string
  readonly dash?: readonly number[]
}

export interface PanelBox {
  readonly kind: 'panel'
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
  readonly fill: string
}

export interface DrawingBox {
  readonly kind: 'drawing'
  readonly x: number
  readonly y: number
  readonly scale: number
  readonly drawing: Drawing
  readonly tag: StructureNode
}

/** A place to click. Its words stand in text boxes of the same tag. */
export interface LinkBox {
  readonly kind: 'link'
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
  readonly target: { readonly kind: 'inside'; readonly id: string } | { readonly kind: 'address'; readonly url: string }
  readonly words: string
  readonly tag: StructureNode
}

/** Where links to an id arrive. */
export interface AnchorBox {
  readonly kind: 'anchor'
  readonly y: number
  readonly id: string
}

/** A node that has its place in the logical tree even when nothing is drawn for it, such as an empty cell. */
export interface StructureBox {
  readonly kind: 'structure'
  readonly tag: StructureNode
}

export type Box = TextBox | RuleBox | PanelBox | DrawingBox | LinkBox | AnchorBox | StructureBox

export interface PageFrames {
  readonly boxes: readonly Box[]
  readonly header: readonly Box[]
  readonly footer: readonly Box[]
}

export interface OutlineEntry {
  readonly title: string
  readonly depth: number
  readonly id: string
}

export interface Frames {
  readonly pages: readonly PageFrames[]
  readonly outline: readonly OutlineEntry[]
  readonly root: StructureNode
}

export function moved(box: Box, x: number, y: number): Box {
  switch (box.kind) {
    case 'rule': return { ...box, x: box.x + x, y: box.y + y, toX: box.toX + x, toY: box.toY + y }
    case 'anchor': return { ...box, y: box.y + y }
    case 'structure': return box
    default: return { ...box, x: box.x + x, y: box.y + y }
  }
}
