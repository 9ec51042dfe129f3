// Single values by group (run, day, analyst, instrument) with group means, and one panel a level where there are several. Each
// panel has its own value axis, because levels are often decades apart.
import type { Chart } from '../document.ts'
import { axisDomain, positionOn, type AxisDomain } from './axis-domain.ts'
import { namesBelow, namesInOrder, spread } from './categories.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'
import { chartSpecification, inks, panelledSpecification, plotFrame, titleSize, type PlotFrame } from './house-style.ts'
import { keyData, keyLayers, meanKeyLayers, seriesEncoding, seriesOf } from './key.ts'
import { category, excludedMark, field, type Fragment, labelLayer, limitMark, limitRequests, meanMark, nameChannel, pointBox, pointMark, type Rows, ticksUp, valueChannel, xOffset } from './layers.ts'
import { aroundPoint, placeLabels } from './label-placement.ts'

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
  const panels = namesInOrder(input.values.map(panelOf), input.excluded.map(panelOf), input.means.map(panelOf))
  const frame = plotFrame(input.width, panels.length > 1 ? { height: panelHeight(panels.length) } : {})
  const groups = namesInOrder(input.values.map((each) => each.group), input.excluded.map((each) => each.group), input.means.map((each) => each.group))
  const names = namesBelow(groups, frame.plotWidth)
  const series = seriesOf(input.values)
  const x = category('group')
  const y = field('value')
  const only = (role: string): Fragment => ({ transform: [{ filter: `datum.role == '${role}'` }] })
  const labels = (role: string, encoding: Fragment, color: string): Fragment => ({ ...only(role), ...withoutData(labelLayer('', { y, ...encoding }, { color })) })
  const layer: readonly Fragment[] = [
    { ...only('span'), mark: { type: 'point', opacity: 0 }, encoding: { x: nameChannel('group', { title: input.groupTitle, ...names.axis }), y: { ...valueChannel('y', 'value', input.yTitle, frame, { low: 0, high: 1, logarithmic: false }), scale: { type: 'linear', zero: false, nice: false } } } },
    { ...only('overall'), mark: { type: 'rule', color: inks.axis, strokeWidth: 0.8 }, encoding: { y } },
    { ...only('limit'), mark: limitMark, encoding: { y } },
    { ...only('mean'), mark: meanMark, encoding: { x: { ...x, bandPosition: 0.2 }, x2: { field: 'group', bandPosition: 0.8 }, y } },
    { ...only('value'), mark: pointMark, encoding: { x, xOffset, y, ...seriesEncoding } },
    { ...only('excluded'), mark: excludedMark, encoding: { x, xOffset, y } },
    labels('excludedLabel', { x }, inks.excluded), labels('limitLabel', { x: { value: 'width' } }, inks.limit), labels('overallLabel', { x: { value: 'width' } }, inks.quiet),
    ...[...keyLayers(), ...meanKeyLayers()].map((each) => ({ ...each, ...only((each['data'] as { readonly name: string }).name) })).map(withoutData),
    { ...only('panelName'), mark: { type: 'text', align: 'left', baseline: 'alphabetic', fontWeight: 'bold', fontSize: titleSize, color: inks.text, x: 0, y: -5 }, encoding: { text: { field: 'panel', type: 'nominal' } } },
  ]
  const rows = panels.flatMap((panel) => panelRows(input, panel, { frame, groups, shown: names.shown, series, panels }))
  const specification = panels.length > 1
    ? panelledSpecification(frame, { field: 'panel', data: 'values', layer })
    : { ...chartSpecification(frame, layer), data: { name: 'values' } }
  return { specification, data: { values: rows } }
}

interface Layout {
  readonly frame: PlotFrame
  readonly groups: readonly string[]
  readonly shown: ReadonlyMap<string, string>
  readonly series: readonly string[]
  readonly panels: readonly string[]
}

/** Everything of one panel in one dataset, told apart by role, because panels are cut from one dataset only. */
function panelRows(input: GroupedValuesChartInput, panel: string, { frame, groups, shown, series, panels }: Layout): Rows {
  const here = <T extends { readonly panel?: string | undefined }>(items: readonly T[]): readonly T[] => items.filter((item) => panelOf(item) === panel)
  const [values, excluded, means] = [here(input.values), here(input.excluded), here(input.means)]
  const limits = input.limits.filter((limit) => limit.panel === undefined || limit.panel === panel)
  const overall = input.overall === undefined ? [] : [{ value: input.overall, label: 'overall mean' }]
  const span = axisDomain([...values.map((each) => each.value), ...excluded.map((each) => each.value), ...means.map((each) => each.mean), ...[...limits, ...overall].map((each) => each.value)], { ticks: ticksUp(frame), room: 0.09 })
  const named = (group: string): string => shown.get(group) ?? group
  const band = frame.plotWidth / Math.max(1, groups.length)
  const marks = groups.flatMap((group) => {
    const inGroup = [...values.filter((each) => each.group === group).map((each) => ({ role: 'value', ...each })), ...excluded.filter((each) => each.group === group).map((each) => ({ role: 'excluded', ...each }))]
    const offsets = spread(inGroup.map((each) => heightOf(span, frame, each.value)), band * 0.36)
    return inGroup.map((each, index) => ({ ...each, offset: band / 2 + (offsets[index] ?? 0), at: { x: (groups.indexOf(group) + 0.5) * band + (offsets[index] ?? 0), y: heightOf(span, frame, each.value) } }))
  })
  const hollow = marks.flatMap((mark) => ('label' in mark ? [mark] : []))
  const requests = [...limitRequests(frame, span, [...limits, ...overall]), ...hollow.map((mark) => ({ text: mark.label, ...mark.at, candidates: aroundPoint() }))]
  const offsets = placeLabels(requests, { left: 0, right: frame.plotWidth, top: -6, bottom: frame.plotHeight }, marks.map((mark) => pointBox(mark.at)))
  const key = panels.indexOf(panel) > 0 ? undefined : keyData(series, input.means.length === 0 ? 'none' : 'mean', frame)
  const keyRole = (role: 'key' | 'meanKey'): Rows => (key?.[role] ?? []).map((each) => ({ role, panel, ...each, ...(panels.length > 1 ? { down: Number(each['down']) - 14 } : {}) }))
  return [
    ...keyRole('key'), ...keyRole('meanKey'), ...(panels.length > 1 ? [{ role: 'panelName', panel }] : []),
    ...groups.flatMap((group) => [span.low, span.high].map((value) => ({ role: 'span', panel, panelOrder: panels.indexOf(panel), group: named(group), value }))),
    ...overall.map((each) => ({ role: 'overall', panel, ...each })),
    ...limits.map((each) => ({ role: 'limit', ...each, panel })),
    ...means.map((each) => ({ role: 'mean', panel, group: named(each.group), value: each.mean })),
    ...marks.map(({ at: _, ...mark }) => ({ ...mark, panel, group: named(mark.group), ...(mark.role === 'value' ? { series: series.length === 0 ? '' : ('series' in mark ? mark.series : undefined) ?? 'other' } : {}) })),
    ...limits.map((each, index) => ({ role: 'limitLabel', panel, value: each.value, label: each.label, ...offsets[index] })),
    ...overall.map((each, index) => ({ role: 'overallLabel', panel, ...each, ...offsets[limits.length + index] })),
    ...hollow.map((mark, index) => {
      const place = offsets[limits.length + overall.length + index]
      return { role: 'excludedLabel', panel, group: named(mark.group), value: mark.value, label: mark.label, ...place, dx: (place?.dx ?? 0) + mark.offset - band / 2 }
    }),
  ]
}

function panelOf(item: { readonly panel?: string | undefined }): string {
  return item.panel ?? ''
}

function heightOf(span: AxisDomain, frame: PlotFrame, value: number): number {
  return (1 - positionOn(span, value)) * frame.plotHeight
}

function withoutData({ data: _, ...rest }: Fragment): Fragment {
  return rest
}

/** Lower where there are many, so that all of them stay on one page. */
function panelHeight(panels: number): number {
  return Math.max(36, Math.min(104, Math.floor(600 / panels) - 26))
}
