// Every single value on one axis, a row a group; values known only as below or above a bound are arrows, never dots.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn, spansDecades } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { linesOf, namesBeside, roomBeside, rowNames, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { arrowAbove, arrowBelow, chartSpecification, inks, plotFrame } from './house-style.ts'
import { category, field, nameChannel, pointMark, spanLayer, ticksAcross, valueChannel, yOffset } from './layers.ts'
import { uprightLineData, uprightLineLayers } from './upright-lines.ts'

export interface DotPlotChartInput {
  readonly xTitle: string
  readonly dots: readonly { readonly group: string; readonly value: number }[]
  readonly censored: readonly { readonly group: string; readonly bound: number; readonly direction: 'below' | 'above' }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function dotPlotChart(input: DotPlotChartInput): Chart {
  const { dots, censored, lines } = input
  const groups = rowNames(dots.map((each) => each.group), censored.map((each) => each.group))
  const names = namesBeside(groups, input.width)
  const rowHeight = Math.max(34, linesOf(names) * 10)
  const frame = plotFrame(input.width, { left: roomBeside(names), height: rowHeight * Math.max(1, groups.length) })
  const values = [...dots.map((each) => each.value), ...censored.map((each) => each.bound), ...lines.map((each) => each.value)]
  const logarithmic = spansDecades(values)
  const span = axisDomain(values, { ticks: ticksAcross(frame), logarithmic, ends: 'open' })
  const shown = (group: string): string => names.shown.get(group) ?? group
  const marks = groups.flatMap((group) => {
    const here = [...dots.filter((each) => each.group === group), ...censored.filter((each) => each.group === group)]
    const offsets = spread(here.map((each) => positionOn(span, 'bound' in each ? each.bound : each.value) * frame.plotWidth), rowHeight * 0.4)
    return here.map((each, index) => ({ ...each, group: shown(group), offset: rowHeight / 2 + (offsets[index] ?? 0) }))
  })
  const y = category('group')
  const arrow = { type: 'point', filled: false, size: 90, stroke: inks.data, strokeWidth: 1, opacity: 1 }
  const specification = chartSpecification(frame, [
    spanLayer(valueChannel('x', 'value', frame, span), nameChannel('group', { grid: true, ...names.axis })),
    titleLayer(),
    ...uprightLineLayers(),
    { data: { name: 'dots' }, mark: pointMark, encoding: { x: field('value'), y, yOffset } },
    { data: { name: 'below' }, mark: { ...arrow, shape: arrowBelow }, encoding: { x: field('bound'), y, yOffset } },
    { data: { name: 'above' }, mark: { ...arrow, shape: arrowAbove }, encoding: { x: field('bound'), y, yOffset } },
  ], { height: { step: rowHeight } })
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle }),
      span: groups.flatMap((group) => [span.low, span.high].map((value) => ({ group: shown(group), value }))),
      ...uprightLineData(lines, span, frame),
      dots: marks.filter((each) => 'value' in each), below: marks.filter((each) => 'direction' in each && each.direction === 'below'), above: marks.filter((each) => 'direction' in each && each.direction === 'above'),
    },
  }
}
