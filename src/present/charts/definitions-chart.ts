// Several definitions of one limit side by side; filled marks govern, and the kinds of limit differ in shape. Logarithmic when
// the values span more than two decades.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn, spansDecades } from './axis-domain.ts'
import { linesOf, namesBeside, namesInOrder, roomBeside, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame, seriesInks, seriesShapes, ticksAlong } from './house-style.ts'
import { field, legendColumns, pointMark, rowsOf, valueAxis, valueScale, yOffset } from './layers.ts'
import { uprightLineData, uprightLineLayers } from './upright-lines.ts'

export interface DefinitionsChartInput {
  readonly xTitle: string
  readonly items: readonly { readonly label: string; readonly value: number; readonly kind: string; readonly governing?: boolean | undefined }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function definitionsChart(input: DefinitionsChartInput): Chart {
  const { items, lines } = input
  const labels = namesInOrder(items.map((item) => item.label))
  const kinds = namesInOrder(items.map((item) => item.kind))
  const names = namesBeside(labels)
  const rowHeight = Math.max(22, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, labels.length) })
  const values = [...items, ...lines].map((each) => each.value)
  const logarithmic = spansDecades(values)
  const span = axisDomain(values, { ticks: ticksAlong(frame.plotWidth, 60), logarithmic, ends: 'open' })
  const shown = (label: string): string => names.shown.get(label) ?? label
  const marks = labels.flatMap((label) => {
    const here = items.filter((item) => item.label === label)
    const offsets = spread(here.map((item) => positionOn(span, item.value) * frame.plotWidth), rowHeight * 0.4)
    return here.map((item, index) => ({ ...item, label: shown(label), offset: rowHeight / 2 + (offsets[index] ?? 0) }))
  })
  const y = { field: 'label', type: 'nominal', sort: null }
  const shared = { field: 'kind', type: 'nominal', sort: null, legend: { columns: legendColumns(kinds, frame.plotWidth), symbolFillColor: inks.paper } }
  const kind = { shape: { ...shared, scale: { range: seriesShapes } }, stroke: { ...shared, scale: { range: seriesInks } } }
  const mark = { ...pointMark, size: 46, strokeWidth: 1.1 }
  const specification = chartSpecification(frame, [
    { data: { name: 'span' }, mark: { type: 'point', opacity: 0 }, encoding: { x: { ...field('value'), scale: valueScale(logarithmic), axis: valueAxis('x', input.xTitle, frame, logarithmic) }, y: { ...y, scale: { type: 'band' }, axis: { title: null, ...names.axis } } } },
    ...uprightLineLayers(),
    { data: { name: 'items' }, mark: { ...mark, fill: inks.paper, fillOpacity: 1 }, encoding: { x: field('value'), y, yOffset, ...kind } },
    { data: { name: 'items' }, transform: [{ filter: 'datum.governing' }], mark: { ...mark, fillOpacity: 1 }, encoding: { x: field('value'), y, yOffset, ...kind, fill: { ...shared, scale: { range: seriesInks }, legend: null } } },
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: { span: labels.flatMap((label) => [span.low, span.high].map((value) => ({ label: shown(label), value }))), items: rowsOf(marks), ...uprightLineData(lines, span, frame) },
  }
}
