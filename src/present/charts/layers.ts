// The layers that charts share: span of the axes, points, excluded points, limits, and the labels of both. Each layer names its
// data, so one specification serves every chart of its kind.
import type { AxisDomain } from './axis-domain.ts'
import { positionOn, scaleOf } from './axis-domain.ts'
import type { LabelledPoint, LabelledValue } from './chart-input.ts'
import { inks, pointSize, textSize, ticksAlong, valueLabels, type PlotFrame } from './house-style.ts'
import { aroundPoint, alongLine, placeLabels, type Box, type LabelRequest } from './label-placement.ts'

export type Fragment = Readonly<Record<string, unknown>>
export type Rows = readonly Readonly<Record<string, unknown>>[]

/** The numbers of the record as rows of a chart, unchanged. */
export function rowsOf<T extends object>(items: readonly T[]): Rows {
  return items.map((item) => Object.fromEntries(Object.entries(item)))
}

/** The encoding that bears an axis of numbers: field, scale and axis. The ends stand in the first two rows of the span. */
export function valueChannel(channel: 'x' | 'y', name: string, frame: PlotFrame, domain: AxisDomain, more: Fragment = {}): Fragment {
  const ends = { expr: `[data('span')[0].${name}, data('span')[1].${name}]` }
  return { ...field(name), scale: { domain: ends, nice: false, ...(domain.logarithmic ? { type: 'log' } : { type: 'linear', zero: false }) }, axis: valueAxis(channel, frame, domain, more) }
}

/** The encoding that bears an axis of names, in the order of the data. */
export function nameChannel(name: string, axis: Fragment): Fragment {
  return { ...category(name), scale: { type: 'band' }, axis: { title: null, ...axis } }
}

export function category(name: string): Fragment {
  return { field: name, type: 'nominal', sort: null }
}

function valueAxis(channel: 'x' | 'y', frame: PlotFrame, domain: AxisDomain, more: Fragment): Fragment {
  const ticks = channel === 'x' ? ticksAcross(frame) : ticksUp(frame)
  return {
    title: null, labelExpr: valueLabels(scaleOf(domain)), ...(domain.logarithmic ? { gridOpacity: decadesOnly } : { tickCount: ticks }),
    ...more,
  }
}

export function ticksAcross(frame: PlotFrame): number {
  return ticksAlong(frame.plotWidth, 56)
}

export function ticksUp(frame: PlotFrame): number {
  return ticksAlong(frame.plotHeight, 34)
}

const decadesOnly: Fragment = { condition: { test: 'abs(log(datum.value) / LN10 - round(log(datum.value) / LN10)) < 1e-9', value: 1 }, value: 0 }

/** Draws nothing: it stretches both axes over the spans chosen for them. */
export function spanLayer(x: Fragment, y: Fragment): Fragment {
  return { data: { name: 'span' }, mark: { type: 'point', opacity: 0 }, encoding: { x, y } }
}

export function spanRows(x: AxisDomain, y: AxisDomain): Rows {
  return [{ x: x.low, y: y.low }, { x: x.high, y: y.high }]
}

export function field(name: string): Fragment {
  return { field: name, type: 'quantitative' }
}

/** Full outline and half-clear filling: of points that lie on one another, each is seen. */
export const pointMark: Fragment = { type: 'point', filled: true, size: pointSize, shape: 'circle', fill: inks.data, stroke: inks.data, fillOpacity: 0.45, opacity: 1, strokeWidth: 0.9 }
export const excludedMark: Fragment = { type: 'point', filled: false, size: pointSize + 10, shape: 'circle', color: inks.excluded, fill: inks.paper, strokeWidth: 1 }
/** A short thick line, unlike any point. */
export const meanMark: Fragment = { type: 'rule', color: inks.text, strokeWidth: 1.6 }
export const limitMark: Fragment = { type: 'rule', color: inks.limit, strokeWidth: 0.9, strokeDash: [4, 2.5] }
export const zeroMark: Fragment = { type: 'rule', color: inks.axis, strokeWidth: 0.8 }

const offset: Fragment = { field: 'offset', type: 'quantitative', scale: { type: 'linear', domain: [0, 1], range: [0, 1], zero: false, nice: false } }
/** Points from the start of the band of a category; the scale is the identity, so that an offset is what it says. */
export const xOffset: Fragment = offset
export const yOffset: Fragment = offset

/** An interval as a thin line with caps, from `low` to `high`. */
export function capped(data: string, { channel, across }: { readonly channel: 'x' | 'y'; readonly across: Fragment }): readonly Fragment[] {
  const other = channel === 'x' ? 'y' : 'x'
  const cap = (end: string): Fragment => ({ data: { name: data }, mark: { type: 'point', filled: false, shape: channel === 'y' ? 'M-0.5,0L0.5,0' : 'M0,-0.5L0,0.5', size: 64, stroke: inks.text, strokeWidth: 0.8, opacity: 1 }, encoding: { [channel]: field(end), [other]: across } })
  return [
    { data: { name: data }, mark: { type: 'rule', color: inks.text, strokeWidth: 0.8 }, encoding: { [channel]: field('low'), [`${channel}2`]: { field: 'high' }, [other]: across } },
    cap('low'), cap('high'),
  ]
}

/** Text at a point of the data, moved by the offset of its row. */
export function labelLayer(data: string, encoding: Fragment, mark: Fragment = {}): Fragment {
  return { data: { name: data }, mark: { type: 'text', baseline: 'alphabetic', align: { expr: 'datum.align' }, dx: { expr: 'datum.dx' }, dy: { expr: 'datum.dy' }, fontSize: textSize, ...mark }, encoding: { text: { field: 'label', type: 'nominal' }, ...encoding } }
}

/** Excluded points are hollow and say why. */
export function excludedLayers(x: Fragment, y: Fragment): readonly Fragment[] {
  return [{ data: { name: 'excluded' }, mark: excludedMark, encoding: { x, y } }, labelLayer('excludedLabels', { x, y }, { color: inks.excluded })]
}

/** Level dashed lines across the plot, each with its label at the right end inside the plot. */
export function limitLayers(y: Fragment, color: string = inks.limit): readonly Fragment[] {
  return [{ data: { name: 'limits' }, mark: { ...limitMark, color }, encoding: { y } }, labelLayer('limitLabels', { y, x: { value: 'width' } }, { color })]
}

export interface Spans {
  readonly x: AxisDomain
  readonly y: AxisDomain
}

export interface PlacedLabels {
  readonly excludedLabels: Rows
  readonly limitLabels: Rows
}

/** Labels of limits first, which have fewer places to go, then those of excluded points. */
export function placedLabels(frame: PlotFrame, spans: Spans, given: { readonly points: readonly { readonly x: number; readonly y: number }[]; readonly excluded: readonly LabelledPoint[]; readonly limits: readonly LabelledValue[] }): PlacedLabels {
  const place = (point: { readonly x: number; readonly y: number }): { readonly x: number; readonly y: number } => ({ x: positionOn(spans.x, point.x) * frame.plotWidth, y: (1 - positionOn(spans.y, point.y)) * frame.plotHeight })
  const taken: readonly Box[] = [...given.points, ...given.excluded].map((point) => pointBox(place(point)))
  const lines: readonly LabelRequest[] = limitRequests(frame, spans.y, given.limits)
  const points: readonly LabelRequest[] = given.excluded.map((point) => ({ text: point.label, ...place(point), candidates: aroundPoint() }))
  const offsets = placeLabels([...lines, ...points], { left: 0, right: frame.plotWidth, top: 0, bottom: frame.plotHeight }, taken)
  return {
    limitLabels: given.limits.map((limit, index) => ({ value: limit.value, label: limit.label, ...offsets[index] })),
    excludedLabels: given.excluded.map((point, index) => ({ x: point.x, y: point.y, label: point.label, ...offsets[lines.length + index] })),
  }
}

/** An upper limit has its label above, a lower one below: outside, where there are fewest points. */
export function limitRequests(frame: PlotFrame, y: AxisDomain, limits: readonly LabelledValue[]): readonly LabelRequest[] {
  return limits.map((limit) => {
    const level = 1 - positionOn(y, limit.value)
    return { text: limit.label, x: frame.plotWidth, y: level * frame.plotHeight, candidates: alongLine(isLower(limit, limits, y) ? 'below' : 'above', frame.plotWidth) }
  })
}

function isLower(limit: LabelledValue, limits: readonly LabelledValue[], y: AxisDomain): boolean {
  if (limits.length > 1) return limit.value < (Math.min(...limits.map((each) => each.value)) + Math.max(...limits.map((each) => each.value))) / 2
  return positionOn(y, limit.value) < 0.5
}

export function pointBox({ x, y }: { readonly x: number; readonly y: number }): Box {
  return { left: x - 3, right: x + 3, top: y - 3, bottom: y + 3 }
}
