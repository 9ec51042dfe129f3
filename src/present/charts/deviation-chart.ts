// Deviations from what was expected (residuals, errors of back-calculated levels) against the level, about a zero line.
import type { Chart } from '../document.ts'
import { axisDomain, spansDecades } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import type { ChartWidth, LabelledPoint, LabelledValue, SeriesPoint } from './chart-input.ts'
import { chartSpecification, plotFrame } from './house-style.ts'
import { keyLayers, keyRows, seriesEncoding, seriesOf, withSeries } from './key.ts'
import { excludedLayers, field, limitLayers, placedLabels, pointMark, rowsOf, spanLayer, spanRows, ticksAcross, ticksUp, valueChannel, zeroMark } from './layers.ts'

export interface DeviationChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly SeriesPoint[]
  readonly excluded: readonly LabelledPoint[]
  readonly limits: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function deviationChart(input: DeviationChartInput): Chart {
  const { points, excluded, limits } = input
  const frame = plotFrame(input.width)
  const xs = [...points, ...excluded].map((each) => each.x)
  const ys = [...[...points, ...excluded].map((each) => each.y), ...limits.map((limit) => limit.value), 0]
  const logarithmic = spansDecades(xs)
  const spans = {
    x: axisDomain(xs, { ticks: ticksAcross(frame), logarithmic, room: 0.02, ends: 'open' }),
    // Room for the labels of limits above and below.
    y: axisDomain(ys, { ticks: ticksUp(frame), room: 0.09 }),
  }
  const names = seriesOf(points)
  const [x, y] = [field('x'), field('y')]
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'x', frame, spans.x), valueChannel('y', 'y', frame, spans.y)),
    titleLayer(),
    { data: { values: [{ zero: 0 }] }, mark: zeroMark, encoding: { y: field('zero') } },
    ...limitLayers(field('value')),
    { data: { name: 'points' }, mark: pointMark, encoding: { x, y, ...seriesEncoding } },
    ...excludedLayers(x, y), ...keyLayers(),
  ])
  return { specification, data: { titles: titleRows(frame, { x: input.xTitle, y: input.yTitle }), span: spanRows(spans.x, spans.y), limits: rowsOf(limits), points: withSeries(points, names), key: keyRows(names, frame), excluded: rowsOf(excluded), ...placedLabels(frame, spans, { points, excluded, limits }) } }
}
