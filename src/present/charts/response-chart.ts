// Responses against levels with the fitted line and its band: the picture of a calibration. The band is drawn only where the
// caller computed it. Both axes are logarithmic when the levels span more than two decades, so that a straight line stays one.
import type { Chart } from '../document.ts'
import { axisDomain, spansDecades } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import type { ChartWidth, LabelledPoint, SeriesPoint } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { keyLayers, keyRows, seriesEncoding, seriesOf, withSeries } from './key.ts'
import { excludedLayers, field, placedLabels, pointMark, rowsOf, spanLayer, spanRows, ticksAcross, ticksUp, valueChannel } from './layers.ts'

export interface ResponseChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly SeriesPoint[]
  readonly excluded: readonly LabelledPoint[]
  readonly line: readonly { readonly x: number; readonly y: number }[]
  readonly band?: readonly { readonly x: number; readonly low: number; readonly high: number }[] | undefined
  readonly width?: ChartWidth | undefined
}

export function responseChart(input: ResponseChartInput): Chart {
  const { points, excluded, line, band = [] } = input
  const frame = plotFrame(input.width)
  const xs = [...points, ...excluded, ...line, ...band].map((each) => each.x)
  const ys = [...[...points, ...excluded, ...line].map((each) => each.y), ...band.flatMap((each) => [each.low, each.high])]
  const logarithmic = { x: spansDecades(xs), y: spansDecades(xs) && ys.every((each) => each > 0) }
  const spans = {
    x: axisDomain(xs, { ticks: ticksAcross(frame), logarithmic: logarithmic.x, room: 0.02, ends: 'open' }),
    y: axisDomain(ys, { ticks: ticksUp(frame), logarithmic: logarithmic.y, ends: 'open' }),
  }
  const names = seriesOf(points)
  const [x, y] = [field('x'), field('y')]
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'x', frame, spans.x), valueChannel('y', 'y', frame, spans.y)),
    titleLayer(),
    { data: { name: 'band' }, mark: { type: 'area', color: inks.band, opacity: 1 }, encoding: { x, y: field('low'), y2: { field: 'high' } } },
    { data: { name: 'line' }, mark: { type: 'line', color: inks.data, strokeWidth: 1 }, encoding: { x, y } },
    { data: { name: 'points' }, mark: pointMark, encoding: { x, y, ...seriesEncoding } },
    ...excludedLayers(x, y), ...keyLayers(),
  ])
  const { excludedLabels } = placedLabels(frame, spans, { points: [...points, ...line], excluded, limits: [] })
  return { specification, data: { titles: titleRows(frame, { x: input.xTitle, y: input.yTitle }), span: spanRows(spans.x, spans.y), band: rowsOf(band), line: rowsOf(line), points: withSeries(points, names), key: keyRows(names, frame), excluded: rowsOf(excluded), excludedLabels } }
}
