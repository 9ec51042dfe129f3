// Differences (or effects) with their intervals against a margin: whether the whole interval lies inside is seen at a glance.
import type { Chart } from '../document.ts'
import { axisDomain } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { linesOf, namesBeside, roomBeside, rowNames } from './categories.ts'
import type { ChartWidth } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { capped, category, field, nameChannel, pointMark, rowsOf, spanLayer, ticksAcross, valueChannel, zeroMark } from './layers.ts'
import { uprightLineLayers } from './upright-lines.ts'

export interface DifferenceChartInput {
  readonly xTitle: string
  readonly items: readonly { readonly label: string; readonly estimate: number; readonly low: number; readonly high: number }[]
  readonly margins?: { readonly low: number; readonly high: number; readonly label: string } | undefined
  /** Draw a line at zero. */
  readonly zero?: boolean | undefined
  readonly width?: ChartWidth | undefined
}

export function differenceChart(input: DifferenceChartInput): Chart {
  const { items, margins, zero } = input
  const names = namesBeside(items.map((item) => item.label), input.width)
  const rowHeight = Math.max(24, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, items.length) })
  const values = [...items.flatMap((item) => [item.estimate, item.low, item.high]), ...(margins === undefined ? [] : [margins.low, margins.high]), ...(zero === true ? [0] : [])]
  const span = axisDomain(values, { ticks: ticksAcross(frame), ends: 'open' })
  const shown = items.map((item) => ({ ...item, label: names.shown.get(item.label) ?? item.label }))
  const y = category('label')
  const specification = chartSpecification(frame, [
    { data: { name: 'margins' }, mark: { type: 'rect', color: inks.window, opacity: 1 }, encoding: { x: field('low'), x2: { field: 'high' } } },
    spanLayer(valueChannel('x', 'value', frame, span), nameChannel('label', { grid: false, ...names.axis })),
    titleLayer(),
    { data: { name: 'zero' }, mark: zeroMark, encoding: { x: field('value') } },
    ...uprightLineLayers(),
    ...capped('items', { channel: 'x', across: { ...y, bandPosition: 0.5 } }),
    { data: { name: 'items' }, mark: { ...pointMark, shape: 'diamond', size: 40, fillOpacity: 1 }, encoding: { x: field('estimate'), y } },
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle }),
      span: rowNames(shown.map((item) => item.label)).flatMap((label) => [span.low, span.high].map((value) => ({ label, value }))),
      margins: margins === undefined ? [] : rowsOf([margins]), zero: zero === true ? [{ value: 0 }] : [], items: rowsOf(shown),
      lines: margins === undefined ? [] : [{ value: margins.low }, { value: margins.high }],
      lineLabels: margins === undefined ? [] : [{ value: (margins.low + margins.high) / 2, label: margins.label, dx: 0, dy: -4, align: 'center' }],
    },
  }
}
