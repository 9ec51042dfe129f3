// Components (of variance, of uncertainty, of an effect) as horizontal bars from zero, with their intervals.
import type { Chart } from '../document.ts'
import { axisDomain } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { linesOf, namesBeside, roomBeside, rowNames } from './categories.ts'
import type { ChartWidth } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { capped, category, field, nameChannel, rowsOf, spanLayer, ticksAcross, valueChannel, zeroMark } from './layers.ts'

export interface ComponentBarsChartInput {
  readonly xTitle: string
  readonly bars: readonly { readonly component: string; readonly value: number; readonly low?: number | undefined; readonly high?: number | undefined }[]
  readonly width?: ChartWidth | undefined
}

export function componentBarsChart(input: ComponentBarsChartInput): Chart {
  const { bars } = input
  const names = namesBeside(bars.map((bar) => bar.component), input.width)
  const rowHeight = Math.max(20, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, bars.length) })
  const span = axisDomain([0, ...bars.flatMap((bar) => [bar.value, bar.low ?? bar.value, bar.high ?? bar.value])], { ticks: ticksAcross(frame), ends: 'open' })
  const shown = bars.map((bar) => ({ ...bar, component: names.shown.get(bar.component) ?? bar.component }))
  const y = category('component')
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'value', frame, span, { grid: true }), nameChannel('component', { grid: false, ...names.axis })),
    titleLayer(),
    { data: { name: 'bars' }, mark: { type: 'bar', height: 10, fill: inks.bar, stroke: inks.data, strokeWidth: 0.7 }, encoding: { x: { ...field('value'), stack: null }, x2: { datum: 0 }, y } },
    ...capped('intervals', { channel: 'x', across: { ...y, bandPosition: 0.5 } }),
    { data: { values: [{ zero: 0 }] }, mark: zeroMark, encoding: { x: field('zero') } },
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle }),
      span: rowNames(shown.map((bar) => bar.component)).flatMap((component) => [span.low, span.high].map((value) => ({ component, value }))),
      bars: rowsOf(shown), intervals: rowsOf(shown.filter((bar) => bar.low !== undefined && bar.high !== undefined)),
    },
  }
}
