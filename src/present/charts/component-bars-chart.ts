// Components (of variance, of uncertainty, of an effect) as horizontal bars from zero, with their intervals.
import type { Chart } from '../document.ts'
import { axisDomain } from './axis-domain.ts'
import { linesOf, namesBeside, roomBeside } from './categories.ts'
import type { ChartWidth } from './chart-input.ts'
import { chartSpecification, inks, plotFrame, ticksAlong } from './house-style.ts'
import { capped, field, rowsOf, valueAxis, valueScale, zeroMark } from './layers.ts'

export interface ComponentBarsChartInput {
  readonly xTitle: string
  readonly bars: readonly { readonly component: string; readonly value: number; readonly low?: number | undefined; readonly high?: number | undefined }[]
  readonly width?: ChartWidth | undefined
}

export function componentBarsChart(input: ComponentBarsChartInput): Chart {
  const { bars } = input
  const names = namesBeside(bars.map((bar) => bar.component))
  const rowHeight = Math.max(20, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, bars.length) })
  const span = axisDomain([0, ...bars.flatMap((bar) => [bar.value, bar.low ?? bar.value, bar.high ?? bar.value])], { ticks: ticksAlong(frame.plotWidth, 60), ends: 'open' })
  const shown = bars.map((bar) => ({ ...bar, component: names.shown.get(bar.component) ?? bar.component }))
  const y = { field: 'component', type: 'nominal', sort: null }
  const specification = chartSpecification(frame, [
    { data: { name: 'span' }, mark: { type: 'point', opacity: 0 }, encoding: { x: { ...field('value'), scale: valueScale(false), axis: valueAxis('x', input.xTitle, frame, false, { grid: true }) }, y: { ...y, scale: { type: 'band' }, axis: { title: null, grid: false, ...names.axis } } } },
    { data: { name: 'bars' }, mark: { type: 'bar', height: 10, fill: inks.bar, stroke: inks.data, strokeWidth: 0.7 }, encoding: { x: { ...field('value'), stack: null }, x2: { datum: 0 }, y } },
    ...capped('intervals', { channel: 'x', across: { ...y, bandPosition: 0.5 } }),
    { data: { values: [{ zero: 0 }] }, mark: zeroMark, encoding: { x: field('zero') } },
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: {
      span: shown.flatMap(({ component }) => [span.low, span.high].map((value) => ({ component, value }))),
      bars: rowsOf(shown), intervals: rowsOf(shown.filter((bar) => bar.low !== undefined && bar.high !== undefined)),
    },
  }
}
