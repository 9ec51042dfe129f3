// The key of a chart: which shape is which series, in rows above the plot (or below it, where names stand above). It is drawn as
// data and not as a legend of the chart library, so that charts with and without series share one specification.
import { inks, seriesInks, seriesShapes, textSize, type PlotFrame } from './house-style.ts'
import { estimatedWidth } from './label-placement.ts'
import { category, pointMark, type Fragment, type Rows } from './layers.ts'

/** How series are told apart: shape first, ink second. */
export const seriesEncoding: Fragment = {
  shape: { ...category('series'), scale: { range: seriesShapes }, legend: null },
  stroke: { ...category('series'), scale: { range: seriesInks }, legend: null },
  fill: { ...category('series'), scale: { range: seriesInks }, legend: null },
}

/** Names in order of appearance; values without one, beside values with one, are `other`. */
export function seriesOf(points: readonly { readonly series?: string | undefined }[]): readonly string[] {
  if (points.every((point) => point.series === undefined)) return []
  return [...new Set(points.map((point) => point.series ?? 'other'))]
}

export function withSeries<T extends { readonly series?: string | undefined }>(points: readonly T[], names: readonly string[]): Rows {
  return points.map((point) => ({ ...point, series: names.length === 0 ? '' : point.series ?? 'other' }))
}

const place: Fragment = { x: { expr: 'datum.at' }, y: { expr: 'datum.down < 0 ? datum.down : height + datum.down' } }
const words: Fragment = { type: 'text', align: 'left', baseline: 'middle', dx: 7, fontSize: textSize, color: inks.text, ...place }

/** Mean and interval as they are drawn in the plot. */
const meanSign = 'M-0.8,0L0.8,0'
const intervalSign = 'M-0.8,0L0.8,0M0,-0.7L0,0.7M-0.3,-0.7L0.3,-0.7M-0.3,0.7L0.3,0.7'

export function keyLayers(encoding: Fragment = seriesEncoding, mark: Fragment = {}): readonly Fragment[] {
  return [
    { data: { name: 'key' }, mark: { ...pointMark, size: 28, ...mark, ...place }, encoding },
    { data: { name: 'key' }, mark: words, encoding: { text: { field: 'series', type: 'nominal' } } },
  ]
}

export function meanKeyLayers(): readonly Fragment[] {
  return ['mean', 'mean with interval'].flatMap((name, index) => [
    { data: { name: index === 0 ? 'meanKey' : 'intervalKey' }, mark: { type: 'point', filled: false, shape: index === 0 ? meanSign : intervalSign, size: 120, stroke: inks.text, strokeWidth: 1.1, opacity: 1, ...place }, encoding: {} },
    { data: { name: index === 0 ? 'meanKey' : 'intervalKey' }, mark: { ...words, text: name }, encoding: {} },
  ])
}

export interface KeyPlace {
  readonly at: number
  /** Below zero: above the plot; above zero: below its foot. */
  readonly down: number
}

/** Entries from the left, in as many rows as they need. */
export function keyPlaces(labels: readonly string[], frame: PlotFrame, foot?: number): readonly KeyPlace[] {
  const rows: string[][] = []
  let used = 0
  for (const label of labels) {
    const width = estimatedWidth(label) + entryRoom
    if (rows.length === 0 || used + width > frame.plotWidth + frame.right) {
      rows.push([])
      used = 0
    }
    rows.at(-1)?.push(label)
    used += width
  }
  return rows.flatMap((row, index) => {
    let at = 4
    return row.map((label) => {
      const entry = { at, down: foot === undefined ? -11 - (rows.length - 1 - index) * rowGap : foot + index * rowGap }
      at += estimatedWidth(label) + entryRoom
      return entry
    })
  })
}

/** Sign, gap and room before the next entry. */
const entryRoom = 24
const rowGap = 11

export function keyRows(names: readonly string[], frame: PlotFrame, foot?: number): Rows {
  const places = keyPlaces(names, frame, foot)
  return names.map((series, index) => ({ series, ...places[index] }))
}

/** The rows of series and mean together. */
export function keyData(names: readonly string[], mean: 'none' | 'mean' | 'interval', frame: PlotFrame): { readonly key: Rows; readonly meanKey: Rows; readonly intervalKey: Rows } {
  const places = keyPlaces([...names, ...(mean === 'none' ? [] : [mean === 'mean' ? 'mean' : 'mean with interval'])], frame)
  const last = rowOf(places.at(-1))
  return {
    key: names.map((series, index) => ({ series, ...places[index] })),
    meanKey: mean === 'mean' ? last : [], intervalKey: mean === 'interval' ? last : [],
  }
}

function rowOf(placed: KeyPlace | undefined): Rows {
  return placed === undefined ? [] : [{ ...placed }]
}
