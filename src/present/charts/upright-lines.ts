// Upright lines at values of a horizontal axis, each named above the plot, where no data are.
import { positionOn, type AxisDomain } from './axis-domain.ts'
import type { LabelledValue } from './chart-input.ts'
import { inks, type PlotFrame } from './house-style.ts'
import { aboveHead, placeLabels } from './label-placement.ts'
import { field, labelLayer, limitMark, rowsOf, type Fragment, type Rows } from './layers.ts'

export function uprightLineLayers(ink: string = inks.limit): readonly Fragment[] {
  return [
    { data: { name: 'lines' }, mark: { ...limitMark, color: ink }, encoding: { x: field('value') } },
    labelLayer('lineLabels', { x: field('value'), y: { value: 0 } }, { color: ink }),
  ]
}

export function uprightLineData(lines: readonly LabelledValue[], span: AxisDomain, frame: PlotFrame): { readonly lines: Rows; readonly lineLabels: Rows } {
  const requests = lines.map((line) => ({ text: line.label, x: positionOn(span, line.value) * frame.plotWidth, y: 0, candidates: aboveHead(Math.max(8, lines.length)) }))
  const placed = placeLabels(requests, { left: -frame.left, right: frame.plotWidth + 8, top: -Infinity, bottom: 0 }, [])
  return { lines: rowsOf(lines), lineLabels: lines.map((line, index) => ({ ...line, ...placed[index] })) }
}
