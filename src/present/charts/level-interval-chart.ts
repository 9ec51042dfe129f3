// Values at each level (recoveries, biases) with mean and interval against acceptance limits: values to the left of the middle of
// their level, mean and interval to the right, so that neither hides the other.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { namesBelow, rowNames, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { keyData, keyLayers, meanKeyLayers, seriesEncoding, seriesOf, withSeries } from './key.ts'
import { aroundPoint, placeLabels } from './label-placement.ts'
import { capped, category, excludedMark, field, labelLayer, limitLayers, limitRequests, meanMark, nameChannel, pointBox, pointMark, rowsOf, spanLayer, ticksUp, valueChannel, xOffset } from './layers.ts'

export interface LevelIntervalChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly level: string; readonly value: number; readonly series?: string | undefined }[]
  readonly excluded: readonly { readonly level: string; readonly value: number; readonly label: string }[]
  readonly means: readonly { readonly level: string; readonly mean: number; readonly low?: number | undefined; readonly high?: number | undefined }[]
  readonly limits: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function levelIntervalChart(input: LevelIntervalChartInput): Chart {
  const { points, excluded, means, limits } = input
  const frame = plotFrame(input.width)
  const levels = rowNames(points.map((each) => each.level), excluded.map((each) => each.level), means.map((each) => each.level))
  const names = namesBelow(levels, frame.plotWidth)
  const band = frame.plotWidth / Math.max(1, levels.length)
  const ends = means.flatMap((each) => [each.mean, each.low ?? each.mean, each.high ?? each.mean])
  const span = axisDomain([...points, ...excluded, ...limits].map((each) => each.value).concat(ends), { ticks: ticksUp(frame), room: 0.09 })
  const height = (value: number): number => (1 - positionOn(span, value)) * frame.plotHeight
  const shown = <T extends { readonly level: string }>(each: T): T => ({ ...each, level: names.shown.get(each.level) ?? each.level })

  const marks = [...points, ...excluded]
  const offsets = levels.reduce((found, level) => {
    const here = marks.flatMap((each, index) => (each.level === level ? [index] : []))
    spread(here.map((index) => height(marks[index]?.value ?? 0)), band * 0.17).forEach((offset, place) => found.set(here[place] ?? 0, band * (means.length === 0 ? 0.5 : 0.34) + offset))
    return found
  }, new Map<number, number>())
  const at = (index: number, each: { readonly level: string; readonly value: number }): { readonly x: number; readonly y: number } => ({ x: levels.indexOf(each.level) * band + (offsets.get(index) ?? 0), y: height(each.value) })
  const placed = placeLabels(
    [...limitRequests(frame, span, limits), ...excluded.map((each, index) => ({ text: each.label, ...at(points.length + index, each), candidates: aroundPoint() }))],
    { left: 0, right: frame.plotWidth, top: -6, bottom: frame.plotHeight }, marks.map((each, index) => pointBox(at(index, each))),
  )

  const series = seriesOf(points)
  const spreadMeans = means.filter((each) => each.low !== undefined && each.high !== undefined)
  const x = category('level')
  const y = field('value')
  const specification = chartSpecification(frame, [
    spanLayer(nameChannel('level', names.axis), valueChannel('y', 'value', frame, span)),
    titleLayer(),
    ...limitLayers(y),
    ...capped('intervals', { channel: 'y', across: { ...x, bandPosition: 0.66 } }),
    { data: { name: 'means' }, mark: meanMark, encoding: { x: { ...x, bandPosition: 0.56 }, x2: { field: 'level', bandPosition: 0.76 }, y: field('mean') } },
    { data: { name: 'points' }, mark: pointMark, encoding: { x, xOffset, y, ...seriesEncoding } },
    { data: { name: 'excluded' }, mark: excludedMark, encoding: { x, xOffset, y } },
    labelLayer('excludedLabels', { x, y }, { color: inks.excluded }),
    ...keyLayers(), ...meanKeyLayers(),
  ])
  return {
    specification,
    data: {
      titles: titleRows(frame, { x: input.xTitle, y: input.yTitle, below: names.below }),
      span: levels.flatMap((level) => [span.low, span.high].map((value) => ({ level: names.shown.get(level) ?? level, value }))),
      limits: rowsOf(limits), limitLabels: limits.map((limit, index) => ({ ...limit, ...placed[index] })),
      intervals: rowsOf(spreadMeans.map(shown)), means: rowsOf(means.map(shown)),
      points: withSeries(points.map((each, index) => ({ ...shown(each), offset: offsets.get(index) ?? 0 })), series),
      excluded: rowsOf(excluded.map((each, index) => ({ ...shown(each), offset: offsets.get(points.length + index) ?? 0 }))),
      ...keyData(series, means.length === 0 ? 'none' : spreadMeans.length === 0 ? 'mean' : 'interval', frame),
      excludedLabels: excluded.map((each, index) => {
        const place = placed[limits.length + index]
        return { ...shown(each), ...place, dx: (place?.dx ?? 0) + (offsets.get(points.length + index) ?? 0) - band / 2 }
      }),
    },
  }
}
