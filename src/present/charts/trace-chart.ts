// A signal trace with the windows it was read in and the values read from it. No smoothing: every point is drawn.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { estimatedWidth, placeLabels } from './label-placement.ts'
import { field, labelLayer, limitLayers, limitRequests, pointBox, rowsOf, spanLayer, spanRows, ticksAcross, ticksUp, valueChannel } from './layers.ts'

export interface TraceChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly x: number; readonly y: number }[]
  readonly windows: readonly { readonly from: number; readonly to: number; readonly label: string }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function traceChart(input: TraceChartInput): Chart {
  const { points, windows, lines } = input
  const frame = plotFrame(input.width)
  const spans = {
    x: axisDomain([...points.map((point) => point.x), ...windows.flatMap((window) => [window.from, window.to])], { ticks: ticksAcross(frame), room: 0.01, ends: 'open' }),
    y: axisDomain([...points.map((point) => point.y), ...lines.map((line) => line.value)], { ticks: ticksUp(frame), room: 0.09 }),
  }
  const across = (value: number): number => positionOn(spans.x, value) * frame.plotWidth
  const trace = points.map((point) => pointBox({ x: across(point.x), y: (1 - positionOn(spans.y, point.y)) * frame.plotHeight }))
  const rows = [-4, -14, -24, -34, -44, -54]
  const placed = placeLabels([
    ...windows.map((window) => {
      const [middle, half] = [across((window.from + window.to) / 2), estimatedWidth(window.label) / 2]
      const dx = Math.max(half, Math.min(middle, frame.plotWidth - half)) - middle
      return { text: window.label, x: middle, y: 0, candidates: rows.map((dy) => ({ dx, dy, align: 'center' as const })) }
    }),
    ...limitRequests(frame, spans.y, lines),
  ], { left: 0, right: frame.plotWidth, top: -62, bottom: frame.plotHeight }, trace)
  const [x, y] = [field('x'), field('y')]
  const specification = chartSpecification(frame, [
    { data: { name: 'windows' }, mark: { type: 'rect', color: inks.window, opacity: 1 }, encoding: { x: field('from'), x2: { field: 'to' } } },
    spanLayer(valueChannel('x', 'x', frame, spans.x), valueChannel('y', 'y', frame, spans.y)),
    titleLayer(),
    { data: { name: 'windows' }, mark: { type: 'rule', color: inks.axis, strokeWidth: 0.5, strokeDash: [1.5, 1.8] }, encoding: { x: field('from') } },
    { data: { name: 'windows' }, mark: { type: 'rule', color: inks.axis, strokeWidth: 0.5, strokeDash: [1.5, 1.8] }, encoding: { x: field('to') } },
    labelLayer('windowLabels', { x: field('middle'), y: { value: 0 } }, { color: inks.quiet }),
    ...limitLayers(field('value'), inks.quiet),
    { data: { name: 'points' }, mark: { type: 'line', color: inks.data, strokeWidth: 0.8, strokeJoin: 'round' }, encoding: { x, y } },
  ])
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle, y: input.yTitle }),
      windows: rowsOf(windows), windowLabels: windows.map((window, index) => ({ middle: (window.from + window.to) / 2, label: window.label, ...placed[index] })),
      span: spanRows(spans.x, spans.y), limits: rowsOf(lines), limitLabels: lines.map((line, index) => ({ ...line, ...placed[windows.length + index] })), points: rowsOf(points),
    },
  }
}
