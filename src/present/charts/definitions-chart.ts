// Several definitions of one limit side by side; filled marks govern, and the kinds of limit differ in shape. Logarithmic when
// the values span more than two decades.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn, spansDecades } from './axis-domain.ts'
import { belowTitle, titleLayer, titleRows } from './axis-titles.ts'
import { linesOf, namesBeside, namesInOrder, roomBeside, rowNames, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame, seriesInks } from './house-style.ts'
import { keyLayers, keyRows, seriesEncoding } from './key.ts'
import { category, field, nameChannel, pointMark, rowsOf, spanLayer, ticksAcross, valueChannel, yOffset } from './layers.ts'
import { uprightLineData, uprightLineLayers } from './upright-lines.ts'

export interface DefinitionsChartInput {
  readonly xTitle: string
  readonly items: readonly { readonly label: string; readonly value: number; readonly kind: string; readonly governing?: boolean | undefined }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function definitionsChart(input: DefinitionsChartInput): Chart {
  const { items, lines } = input
  const labels = rowNames(items.map((item) => item.label))
  const kinds = namesInOrder(items.map((item) => item.kind))
  const names = namesBeside(labels, input.width)
  const rowHeight = Math.max(22, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, labels.length) })
  const values = [...items, ...lines].map((each) => each.value)
  const logarithmic = spansDecades(values)
  const span = axisDomain(values, { ticks: ticksAcross(frame), logarithmic, ends: 'open' })
  const shown = (label: string): string => names.shown.get(label) ?? label
  const marks = labels.flatMap((label) => {
    const here = items.filter((item) => item.label === label)
    const offsets = spread(here.map((item) => positionOn(span, item.value) * frame.plotWidth), rowHeight * 0.4)
    return here.map((item, index) => ({ ...item, label: shown(label), series: item.kind, offset: rowHeight / 2 + (offsets[index] ?? 0) }))
  })
  const y = category('label')
  // Hollow unless the row governs; an entry of the key is no row of data, hence hollow.
  const kind = { ...seriesEncoding, fill: { condition: { test: '!datum.governing', value: inks.paper }, ...category('series'), scale: { range: seriesInks }, legend: null } }
  const mark = { ...pointMark, strokeWidth: 1.1, fillOpacity: 1 }
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'value', frame, span), nameChannel('label', { grid: true, ...names.axis })),
    titleLayer(),
    ...uprightLineLayers(),
    { data: { name: 'items' }, mark: { ...mark, size: 46 }, encoding: { x: field('value'), y, yOffset, ...kind } },
    ...keyLayers(kind, { ...mark, size: 36 }),
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: { titles: titleRows(frame, { x: input.xTitle }), span: labels.flatMap((label) => [span.low, span.high].map((value) => ({ label: shown(label), value }))), items: rowsOf(marks), key: keyRows(kinds, frame, belowTitle(input.xTitle, frame)), ...uprightLineData(lines, span, frame) },
  }
}
