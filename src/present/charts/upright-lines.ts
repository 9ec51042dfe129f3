// Upright lines at values of a horizontal axis, each named above the plot, where no data are. Names that would collide stand in
// rows, each beside the head of its own line, which is drawn up to it.
import { positionOn, type AxisDomain } from './axis-domain.ts'
import type { LabelledValue } from './chart-input.ts'
import { inks, type PlotFrame } from './house-style.ts'
import { estimatedWidth, labelSize, type LabelOffset } from './label-placement.ts'
import { field, labelLayer, limitMark, rowsOf, type Fragment, type Rows } from './layers.ts'

export function uprightLineLayers(ink: string = inks.limit): readonly Fragment[] {
  return [
    { data: { name: 'lines' }, mark: { ...limitMark, color: ink }, encoding: { x: field('value') } },
    { data: { name: 'lineLabels' }, mark: { type: 'rule', color: ink, strokeWidth: 0.5, y: { expr: 'datum.head' }, y2: 0 }, encoding: { x: field('value') } },
    labelLayer('lineLabels', { x: field('value'), y: { value: 0 } }, { color: ink }),
  ]
}

export function uprightLineData(lines: readonly LabelledValue[], span: AxisDomain, frame: PlotFrame): { readonly lines: Rows; readonly lineLabels: Rows } {
  const places = lines.map((line) => ({ at: positionOn(span, line.value) * frame.plotWidth, width: estimatedWidth(line.label) + 4 }))
  const placed = centred(places, frame) ?? inRows(places, frame)
  return { lines: rowsOf(lines), lineLabels: lines.map((line, index) => ({ ...line, ...placed[index] })) }
}

interface Place {
  readonly at: number
  readonly width: number
}

/** `head` is where the line ends above the plot (0: at its edge). */
type Placed = LabelOffset & { readonly head: number }

const rowGap = labelSize + 2

/** All in one row over their lines, moved a little where the drawing ends; undefined where they would touch. */
function centred(places: readonly Place[], frame: PlotFrame): readonly Placed[] | undefined {
  const starts = places.map(({ at, width }) => Math.max(-frame.left, Math.min(at - width / 2, frame.plotWidth + frame.right - width)))
  const touching = starts.some((start, index) => starts.some((other, place) => place > index && start < other + (places[place]?.width ?? 0) && other < start + (places[index]?.width ?? 0)))
  if (touching) return undefined
  return places.map(({ at, width }, index) => ({ dx: (starts[index] ?? 0) + width / 2 - at, dy: -4, align: 'center', head: 0 }))
}

/** To the right of their lines, from the rightmost, or to the left from the leftmost: so that no line runs through a name below. */
function inRows(places: readonly Place[], frame: PlotFrame): readonly Placed[] {
  const fits = places.every(({ at, width }) => at + width <= frame.plotWidth + frame.right)
  const sign = fits ? 1 : -1
  const order = places.map((place, index) => ({ ...place, index })).sort((a, b) => sign * (b.at - a.at) || a.index - b.index)
  const taken: { readonly row: number; readonly from: number; readonly to: number }[] = []
  const placed: Placed[] = []
  for (const { at, width, index } of order) {
    const [from, to] = fits ? [at, at + width] : [at - width, at]
    const row = Array.from({ length: order.length }, (_, each) => each).find((each) => !taken.some((other) => other.row === each && from < other.to && other.from < to)) ?? 0
    taken.push({ row, from, to })
    placed[index] = { dx: sign * 3, dy: -3 - row * rowGap, align: fits ? 'left' : 'right', head: -(row + 0.75) * rowGap }
  }
  return placed
}
