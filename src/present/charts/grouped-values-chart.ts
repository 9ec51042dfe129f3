// Single values by group (run, day, analyst, instrument) with group means, and one panel a level where there are several. Each
// panel has its own value axis, because levels are often decades apart; all stand in one plot, with their places worked out here
// (`down`, in points), since separate plots would cost several times the work.
import type { Chart } from '../document.ts'
import { axisDomain, axisTicks, positionOn } from './axis-domain.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { namesBelow, namesInOrder, rowNames, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, plotFrame, textSize, titleSize, type PlotFrame } from './house-style.ts'
import { keyData, keyLayers, meanKeyLayers, seriesEncoding, seriesOf } from './key.ts'
import { aroundPoint, placeLabels } from './label-placement.ts'
import { category, excludedMark, labelLayer, limitMark, limitRequests, meanMark, nameChannel, pointBox, pointMark, rowsOf, ticksUp, xOffset, type Rows } from './layers.ts'

export interface GroupedValuesChartInput {
  readonly groupTitle: string
  readonly yTitle: string
  readonly values: readonly { readonly group: string; readonly value: number; readonly series?: string | undefined; readonly panel?: string | undefined }[]
  readonly excluded: readonly { readonly group: string; readonly value: number; readonly label: string; readonly panel?: string | undefined }[]
  readonly means: readonly { readonly group: string; readonly mean: number; readonly panel?: string | undefined }[]
  readonly overall?: number | undefined
  /** Without a panel: in every panel. */
  readonly limits: readonly (LabelledValue & { readonly panel?: string | undefined })[]
  readonly width?: ChartWidth | undefined
}

export function groupedValuesChart(input: GroupedValuesChartInput): Chart {
  const { values, excluded, means } = input
  const panels = namesInOrder(values.map(panelOf), excluded.map(panelOf), means.map(panelOf))
  const groups = rowNames(values.map((each) => each.group), excluded.map((each) => each.group), means.map((each) => each.group))
  const frame = plotFrame(input.width, panels.length > 1 ? { height: panelHeight(panels.length) } : {})
  const names = namesBelow(groups, frame.plotWidth)
  const series = seriesOf(values)
  const shown = (group: string): string => names.shown.get(group) ?? group
  const layout: Layout = { frame, groups, shown, series }
  const parts = panels.map((panel, index) => panelRows(input, panel, index * (frame.plotHeight + panelGap), layout))
  const whole = { ...frame, plotHeight: panels.length * frame.plotHeight + (panels.length - 1) * panelGap }
  const key = keyData(series, means.length === 0 ? 'none' : 'mean', frame)
  const raised = (rows: Rows): Rows => (panels.length > 1 ? rows.map((row) => ({ ...row, down: Number(row['down']) - 14 })) : rows)
  return {
    specification: specification(whole, names.axis),
    data: {
      span: groups.map((group) => ({ group: shown(group) })),
      ...Object.fromEntries(partNames.map((name) => [name, parts.flatMap((part): Rows => part[name])])),
      titles: [...titleRows(whole, { x: input.groupTitle, below: names.below }), ...panels.flatMap((_, index) => titleRows(frame, { y: input.yTitle, top: index * (frame.plotHeight + panelGap) }))],
      panels: panels.map((panel, index) => ({ name: panel, down: index * (frame.plotHeight + panelGap) })),
      key: raised(key.key), meanKey: raised(key.meanKey), intervalKey: [],
    },
  }
}

/** Room for the name of the level above each panel but the first. */
const panelGap = 26

/** Lower where there are many, so that all of them stay on one page. */
function panelHeight(panels: number): number {
  return Math.max(36, Math.min(104, Math.floor(600 / panels) - panelGap))
}

function specification(frame: PlotFrame, groupAxis: Readonly<Record<string, unknown>>): Chart['specification'] {
  const x = category('group')
  const y = { field: 'down', type: 'quantitative', scale: null, axis: null }
  const text = (color: string, mark: Readonly<Record<string, unknown>>): Readonly<Record<string, unknown>> => ({ type: 'text', color, fontSize: textSize, ...mark })
  return chartSpecification(frame, [
    { data: { name: 'span' }, mark: { type: 'point', opacity: 0 }, encoding: { x: nameChannel('group', groupAxis) } },
    { data: { name: 'ticks' }, mark: { type: 'rule', color: inks.grid, strokeWidth: 0.5 }, encoding: { y } },
    { data: { name: 'ticks' }, mark: text(inks.quiet, { align: 'right', baseline: 'middle', x: -5 }), encoding: { y, text: { field: 'text', type: 'nominal' } } },
    { data: { name: 'panels' }, mark: text(inks.text, { align: 'left', baseline: 'alphabetic', fontWeight: 'bold', fontSize: titleSize, x: 0, dy: -6 }), encoding: { y, text: { field: 'name', type: 'nominal' } } },
    titleLayer(),
    { data: { name: 'overall' }, mark: { type: 'rule', color: inks.axis, strokeWidth: 0.8 }, encoding: { y } },
    { data: { name: 'limits' }, mark: limitMark, encoding: { y } },
    { data: { name: 'means' }, mark: meanMark, encoding: { x: { ...x, bandPosition: 0.2 }, x2: { field: 'group', bandPosition: 0.8 }, y } },
    { data: { name: 'values' }, mark: pointMark, encoding: { x, xOffset, y, ...seriesEncoding } },
    { data: { name: 'excluded' }, mark: excludedMark, encoding: { x, xOffset, y } },
    labelLayer('excludedLabels', { x, y }, { color: inks.excluded }), labelLayer('limitLabels', { x: { value: 'width' }, y }, { color: inks.limit }), labelLayer('overallLabels', { x: { value: 'width' }, y }, { color: inks.quiet }),
    ...keyLayers(), ...meanKeyLayers(),
  ])
}

interface Layout {
  readonly frame: PlotFrame
  readonly groups: readonly string[]
  readonly shown: (group: string) => string
  readonly series: readonly string[]
}

const partNames = ['ticks', 'overall', 'limits', 'means', 'values', 'excluded', 'excludedLabels', 'limitLabels', 'overallLabels'] as const
type PanelRows = Readonly<Record<(typeof partNames)[number], Rows>>

function panelRows(input: GroupedValuesChartInput, panel: string, top: number, { frame, groups, shown, series }: Layout): PanelRows {
  const here = <T extends { readonly panel?: string | undefined }>(items: readonly T[]): readonly T[] => items.filter((item) => panelOf(item) === panel)
  const [values, excluded, means] = [here(input.values), here(input.excluded), here(input.means)]
  const limits = input.limits.filter((limit) => limit.panel === undefined || limit.panel === panel)
  const overall = input.overall === undefined ? [] : [{ value: input.overall, label: 'overall mean' }]
  const span = axisDomain([...[...values, ...excluded, ...limits, ...overall].map((each) => each.value), ...means.map((each) => each.mean)], { ticks: ticksUp(frame), room: 0.09 })
  const height = (value: number): number => (1 - positionOn(span, value)) * frame.plotHeight
  const band = frame.plotWidth / Math.max(1, groups.length)
  const offsets = groups.map((group) => {
    const marks = [...values, ...excluded].filter((each) => each.group === group)
    return new Map(spread(marks.map((each) => height(each.value)), band * 0.36).map((offset, index) => [marks[index], band / 2 + offset]))
  })
  const offsetOf = (mark: (typeof values)[number]): number => offsets[groups.indexOf(mark.group)]?.get(mark) ?? band / 2
  const at = (mark: (typeof values)[number]): { readonly x: number; readonly y: number } => ({ x: groups.indexOf(mark.group) * band + offsetOf(mark), y: height(mark.value) })
  const placed = placeLabels(
    [...limitRequests(frame, span, [...limits, ...overall]), ...excluded.map((each) => ({ text: each.label, ...at(each), candidates: aroundPoint() }))],
    { left: 0, right: frame.plotWidth, top: 0, bottom: frame.plotHeight }, [...values, ...excluded].map((each) => pointBox(at(each))),
  )
  const level = <T extends { readonly value: number }>(each: T): T & { readonly down: number } => ({ ...each, down: top + height(each.value) })
  return {
    ticks: axisTicks(span, ticksUp(frame)).map(({ value, text }) => ({ down: top + height(value), text })),
    overall: overall.map(level), limits: rowsOf(limits.map(level)),
    means: means.map((each) => ({ mean: each.mean, group: shown(each.group), down: top + height(each.mean) })),
    values: values.map((each) => ({ ...level(each), group: shown(each.group), offset: offsetOf(each), series: series.length === 0 ? '' : each.series ?? 'other' })),
    excluded: excluded.map((each) => ({ ...level(each), group: shown(each.group), offset: offsetOf(each) })),
    limitLabels: limits.map((each, index) => ({ ...level(each), ...placed[index] })),
    overallLabels: overall.map((each, index) => ({ ...level(each), ...placed[limits.length + index] })),
    excludedLabels: excluded.map((each, index) => {
      const place = placed[limits.length + overall.length + index]
      return { ...level(each), group: shown(each.group), ...place, dx: (place?.dx ?? 0) + offsetOf(each) - band / 2 }
    }),
  }
}

function panelOf(item: { readonly panel?: string | undefined }): string {
  return item.panel ?? ''
}
