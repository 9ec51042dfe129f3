// Results in the order they were measured, conditions told apart by shape, with the line of the model of each condition where
// there is one.
import type { Chart } from '../document.ts'
import { axisDomain } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { namesInOrder } from './categories.ts'
import type { ChartWidth } from './chart-input.ts'
import { chartSpecification, plotFrame, seriesDashes } from './house-style.ts'
import { keyLayers, keyRows, seriesEncoding } from './key.ts'
import { category, field, pointMark, rowsOf, spanLayer, spanRows, ticksAcross, ticksUp, valueChannel } from './layers.ts'

export interface SequenceChartInput {
  readonly orderTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly order: number; readonly value: number; readonly condition: string }[]
  readonly line?: readonly { readonly order: number; readonly value: number; readonly condition: string }[] | undefined
  readonly width?: ChartWidth | undefined
}

export function sequenceChart(input: SequenceChartInput): Chart {
  const { points, line = [] } = input
  const frame = plotFrame(input.width)
  const spans = {
    x: axisDomain([...points, ...line].map((each) => each.order), { ticks: ticksAcross(frame), room: 0.03, ends: 'open' }),
    y: axisDomain([...points, ...line].map((each) => each.value), { ticks: ticksUp(frame), room: 0.06 }),
  }
  const conditions = namesInOrder(points.map((each) => each.condition), line.map((each) => each.condition))
  const named = <T extends { readonly condition: string }>(items: readonly T[]) => conditions.flatMap((condition) => items.filter((item) => item.condition === condition)).map(({ condition, ...rest }) => ({ ...rest, series: condition }))
  const [x, y] = [field('order'), field('value')]
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'x', frame, spans.x, { tickMinStep: 1 }), valueChannel('y', 'y', frame, spans.y)),
    titleLayer(),
    { data: { name: 'points' }, mark: pointMark, encoding: { x, y, ...seriesEncoding } },
    ...keyLayers(),
    { data: { name: 'line' }, mark: { type: 'line', strokeWidth: 1 }, encoding: { x, y, stroke: seriesEncoding['stroke'], strokeDash: { ...category('series'), legend: null, scale: { range: seriesDashes } } } },
  ])
  return { specification, data: { titles: titleRows(frame, { x: input.orderTitle, y: input.yTitle }), span: spanRows(spans.x, spans.y), key: keyRows(conditions, frame), points: rowsOf(named(points)), line: rowsOf(named(line)) } }
}
