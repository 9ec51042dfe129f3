// How charts look: sizes, inks, line styles and symbols in one place. Form carries the meaning (shape, dash, hollow or filled) and
// ink only helps, so that a grey print or a colour-blind reader loses nothing. One unit is one point of the printed page.
import type { ChartWidth } from './chart-input.ts'

type Fragment = Readonly<Record<string, unknown>>

export const inks = {
  text: '#232b32',
  quiet: '#5d6871',
  axis: '#7d8790',
  grid: '#e4e8eb',
  data: '#1f4e6e',
  band: '#d8e3ea',
  window: '#f1ece1',
  bar: '#a9c0cf',
  limit: '#9c3a1e',
  excluded: '#5d6871',
  paper: '#ffffff',
}

/** Dark to light in turn, so that neighbours differ in grey too. */
export const seriesInks = ['#1f4e6e', '#d07c1f', '#6b2f5e', '#4f9aa8', '#3d3d3d', '#9a9a3c']
/** One more than the inks, so that a pair of shape and ink comes again only after all pairs. */
export const seriesShapes = ['circle', 'square', 'triangle-up', 'diamond', 'triangle-down', 'cross', 'M-0.7,-0.7L0.7,0.7M-0.7,0.7L0.7,-0.7']
export const seriesDashes = [[1, 0], [5, 2.5], [1.5, 1.8], [7, 2, 1.5, 2], [10, 3], [3, 3]]

/** An upright bar at the bound and an arrow to the side on which the value lies. */
export const arrowBelow = 'M0,-0.55L0,0.55M0,0L-1.5,0M-1.05,-0.35L-1.5,0L-1.05,0.35'
export const arrowAbove = 'M0,-0.55L0,0.55M0,0L1.5,0M1.05,-0.35L1.5,0L1.05,0.35'

export const textSize = 7.5
export const titleSize = 8
export const pointSize = 24

export interface PlotFrame {
  readonly left: number
  readonly right: number
  readonly plotWidth: number
  readonly plotHeight: number
  readonly total: number
}

/** Text width of 165 mm, and 80 mm for two side by side, in points. */
const totals: Readonly<Record<ChartWidth, number>> = { full: 467, half: 226 }
const heights: Readonly<Record<ChartWidth, number>> = { full: 176, half: 130 }
const rightRoom = 10

/** Room for the title of the y axis and six digits of its labels. */
export const valueAxisRoom = 52

export function plotFrame(width: ChartWidth = 'full', sides: { readonly left?: number; readonly height?: number } = {}): PlotFrame {
  const left = sides.left ?? valueAxisRoom
  return { left, right: rightRoom, plotWidth: totals[width] - left - rightRoom, plotHeight: sides.height ?? heights[width], total: totals[width] }
}

/** The specification of a chart of one plot; `rows` makes the height follow the number of categories instead. */
export function chartSpecification(frame: PlotFrame, layer: readonly Fragment[], options: { readonly height?: Fragment } = {}): Fragment {
  return {
    usermeta: { frame: { left: frame.left, width: frame.total } },
    background: null, padding: 0, autosize: 'none', width: frame.plotWidth, height: options.height ?? frame.plotHeight,
    layer, config: houseConfig,
  }
}

const font = 'Source Sans 3'

export const houseConfig = {
  font,
  view: { stroke: null },
  // A point without a place is our mistake and stops the publisher; left to itself the library would drop it.
  mark: { invalid: 'show' },
  axis: {
    labelFont: font, labelFontSize: textSize, labelColor: inks.quiet, labelPadding: 3, labelLimit: 0, labelFlush: false, labelOverlap: 'greedy', labelSeparation: 4,
    domainColor: inks.axis, domainWidth: 0.6, tickColor: inks.axis, tickWidth: 0.6, tickSize: 3, gridColor: inks.grid, gridWidth: 0.5,
  },
  axisX: { grid: false },
  axisY: { grid: true, domain: false, ticks: false },
  text: { font, fontSize: textSize, color: inks.text },
  point: { filled: true, size: pointSize, opacity: 1, strokeWidth: 0.9 },
}

/** Labels of a value axis: ten-powers where plain digits would be long; on a logarithmic axis the decades only, or 1, 2 and 5 where these are few. */
export function valueLabels(scale: 'linear' | 'few decades' | 'decades'): string {
  const magnitude = 'abs(datum.value)'
  const exponent = `floor(log(${magnitude}) / LN10 + 1e-9)`
  const digit = (value: string): string => `slice('⁰¹²³⁴⁵⁶⁷⁸⁹', ${value}, ${value} + 1)`
  const raised = `(${exponent} < 0 ? '⁻' : '') + (abs(${exponent}) > 9 ? ${digit(`floor(abs(${exponent}) / 10)`)} : '') + ${digit(`abs(${exponent}) % 10`)}`
  const mantissa = `format(datum.value / pow(10, ${exponent}), '.3~r')`
  const leading = `round(${magnitude} / pow(10, ${exponent}))`
  const long = `${magnitude} >= 1e7 || ${magnitude} < 1e-4`
  const shown = scale === 'decades' ? `${leading} == 1` : `${leading} == 1 || ${leading} == 2 || ${leading} == 5`
  if (scale !== 'linear') return `${shown} ? (${long} ? (${leading} == 1 ? '' : ${leading} + ' × ') + '10' + ${raised} : format(datum.value, ',~r')) : ''`
  return `datum.value == 0 ? '0' : ${long} ? ${mantissa} + ' × 10' + ${raised} : datum.label`
}

/** Ticks asked for along an axis of this many points. */
export function ticksAlong(length: number, each: number): number {
  return Math.max(3, Math.round(length / each))
}
