// Density curves that the caller computed, told apart by line style and named at their tops, with the values that divide them.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { namesInOrder } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame, seriesDashes, seriesInks } from './house-style.ts'
import { aboveTop, placeLabels } from './label-placement.ts'
import { field, labelLayer, spanLayer, spanRows, ticksAcross, valueChannel } from './layers.ts'
import { uprightLineData, uprightLineLayers } from './upright-lines.ts'

export interface DistributionsChartInput {
  readonly xTitle: string
  readonly curves: readonly { readonly name: string; readonly points: readonly { readonly x: number; readonly density: number }[] }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function distributionsChart(input: DistributionsChartInput): Chart {
  const { curves, lines } = input
  const frame = plotFrame(input.width, { left: 24, height: input.width === 'half' ? 100 : 124 })
  const points = curves.flatMap((curve) => curve.points)
  const spans = {
    x: axisDomain([...points.map((point) => point.x), ...lines.map((line) => line.value)], { ticks: ticksAcross(frame), room: 0.02, ends: 'open' }),
    // The names of the curves stand above their tops.
    y: axisDomain([0, ...points.map((point) => point.density)], { ticks: 4, room: 0.16, ends: 'open' }),
  }
  const tops = curves.flatMap(({ name, points: [first, ...rest] }) => (first === undefined ? [] : [{ name, ...rest.reduce((top, point) => (point.density > top.density ? point : top), first) }]))
  const placed = placeLabels(
    tops.map((top) => ({ text: top.name, x: positionOn(spans.x, top.x) * frame.plotWidth, y: (1 - positionOn(spans.y, top.density)) * frame.plotHeight, candidates: aboveTop() })),
    { left: 0, right: frame.plotWidth, top: 0, bottom: frame.plotHeight },
    lines.map((line) => positionOn(spans.x, line.value) * frame.plotWidth).map((place) => ({ left: place - 1, right: place + 1, top: 0, bottom: frame.plotHeight })),
  )
  const [x, y] = [field('x'), field('density')]
  const names = namesInOrder(curves.map((curve) => curve.name))
  const series = { field: 'name', type: 'nominal', sort: null, legend: null }
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'x', frame, spans.x), valueChannel('y', 'y', frame, spans.y, { labels: false, grid: false })),
    titleLayer(),
    { data: { name: 'curves' }, mark: { type: 'area', opacity: 1, fillOpacity: 0.14, line: false }, encoding: { x, y: { ...y, stack: null }, fill: { ...series, scale: { range: seriesInks } } } },
    ...uprightLineLayers(),
    { data: { name: 'curves' }, mark: { type: 'line', strokeWidth: 1.1 }, encoding: { x, y, stroke: { ...series, scale: { range: seriesInks } }, strokeDash: { ...series, scale: { range: seriesDashes } } } },
    labelLayer('names', { x, y }, { color: inks.text }),
  ])
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle, y: 'Density' }),
      span: spanRows(spans.x, spans.y), ...uprightLineData(lines, spans.x, frame),
      curves: names.flatMap((name) => curves.filter((curve) => curve.name === name).flatMap((curve) => curve.points.map((point) => ({ ...point, name })))),
      names: tops.map((top, index) => ({ ...top, label: top.name, ...placed[index] })),
    },
  }
}
