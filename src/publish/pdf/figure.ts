// Figures → slabs: the drawing with its caption below, never parted; two narrow figures in a row stand side by side.
import type { ExhibitFigure, Inline } from '../../present/document.ts'
import type { Drawing } from '../drawing.ts'
import type { Box } from './frames.ts'
import { lineBoxes, setLines } from './lines.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node } from './structure.ts'
import { page, styles } from './style.ts'

export interface FigureWithDrawing {
  readonly figure: ExhibitFigure
  readonly drawing: Drawing
}

const gutter = 14
const halfWidth = (page.textWidth - gutter) / 2

/** A figure is never taller than this, so that its caption fits beside it on a page. */
const tallest = 560

export function isNarrow(drawing: Drawing): boolean {
  return drawing.width <= halfWidth + 1
}

export function figureSlabs(figures: readonly FigureWithDrawing[], context: BlockContext): readonly Slab[] {
  const [first, second] = figures
  if (first === undefined) return []
  if (second === undefined) {
    const one = placedFigure(first, 0, page.textWidth, context)
    return [{ height: one.height + 6, spaceBefore: 12, boxes: one.boxes }]
  }
  const left = placedFigure(first, 0, halfWidth, context)
  const right = placedFigure(second, halfWidth + gutter, halfWidth, context)
  return [{ height: Math.max(left.height, right.height) + 6, spaceBefore: 12, boxes: [...left.boxes, ...right.boxes] }]
}

function placedFigure({ figure, drawing }: FigureWithDrawing, x: number, width: number, context: BlockContext): { readonly height: number; readonly boxes: readonly Box[] } {
  const scale = Math.min(1, width / drawing.width, tallest / drawing.height)
  const height = drawing.height * scale
  const tag = node('Figure', context.root, { alternative: figure.alternative, isPlaced: true })
  const caption: readonly Inline[] = [{ type: 'strong', children: [{ type: 'text', value: `Figure ${figure.number ?? ''}`.trim() }] }, { type: 'text', value: '\u2002' }, ...figure.caption]
  const lines = setLines(caption, styles.caption, node('Caption', node('Div', context.root)), width, context)
  return {
    height: height + 5 + lines.length * styles.caption.leading,
    boxes: [
      { kind: 'anchor', y: 0, id: figure.id },
      { kind: 'drawing', x, y: 0, scale, drawing, tag },
      ...lines.flatMap((line, index) => lineBoxes(line, x, height + 5 + index * styles.caption.leading + baselineIn(styles.caption.leading, styles.caption.size))),
    ],
  }
}
