// Verdicts of many rows by column as tiles with a mark and a tone, so that the few that need attention stand out; the mark alone
// says the verdict in a grey print.
import type { Chart } from '../document.ts'
import { titleLayer, titleRows } from './axis-titles.ts'
import { lineGap, linesOf, namesBeside, namesBelow, namesInOrder, roomBeside } from './categories.ts'
import type { ChartWidth } from './chart-input.ts'
import { chartSpecification, inks, plotFrame } from './house-style.ts'
import { keyLayers, keyRows } from './key.ts'
import { category, nameChannel } from './layers.ts'

export interface HeatTableInput {
  readonly rowTitle: string
  readonly cells: readonly { readonly row: string; readonly column: string; readonly word: string }[]
  readonly width?: ChartWidth | undefined
}

/** Verdict words in the order of the legend: mark, tone of the tile, ink of the mark. Tones differ in grey as well. */
const verdicts: readonly { readonly word: string; readonly shape: string; readonly tone: string; readonly ink: string }[] = [
  { word: 'meets', shape: 'M-0.7,0.05L-0.2,0.55L0.7,-0.55', tone: '#e3efe9', ink: '#2c6e54' },
  { word: 'misses', shape: 'M-0.6,-0.6L0.6,0.6M-0.6,0.6L0.6,-0.6', tone: '#9c3a1e', ink: '#ffffff' },
  { word: 'not evaluable', shape: 'M-0.6,0L0.6,0', tone: '#e9d9ae', ink: '#4d3f12' },
  { word: 'not performed', shape: 'M-0.5,0A0.5,0.5,0,1,1,0.5,0A0.5,0.5,0,1,1,-0.5,0Z', tone: '#e4e8eb', ink: '#5d6871' },
  { word: 'information only', shape: 'M0,-0.35L0,0.55M0,-0.7L0,-0.55', tone: '#f5f7f8', ink: '#5d6871' },
]

export function heatTable(input: HeatTableInput): Chart {
  const { cells } = input
  for (const { word } of cells) if (!verdicts.some((verdict) => verdict.word === word)) throw new Error(`\`${word}\` is no verdict`)
  const rows = namesInOrder(cells.map((cell) => cell.row))
  const columns = namesInOrder(cells.map((cell) => cell.column))
  const beside = namesBeside([...rows, input.rowTitle], input.width)
  const tall = rows.length > 30 ? 11 : 14
  const frame = plotFrame(input.width, { left: roomBeside(beside), height: tall * Math.max(1, rows.length) })
  const above = namesBelow(columns, frame.plotWidth)
  const used = verdicts.filter(({ word }) => cells.some((cell) => cell.word === word)).map(({ word }) => word)
  const [x, y] = [category('column'), category('row')]
  const words = verdicts.map(({ word }) => word)
  const tone = { field: 'word', type: 'nominal', scale: { domain: words, range: verdicts.map((verdict) => verdict.tone) }, legend: null }
  const mark = {
    shape: { field: 'word', type: 'nominal', scale: { domain: words, range: verdicts.map((verdict) => verdict.shape) }, legend: null },
    stroke: { field: 'word', type: 'nominal', scale: { domain: words, range: verdicts.map((verdict) => verdict.ink) }, legend: null },
  }
  const specification = chartSpecification(frame, [
    { data: { name: 'cells' }, mark: { type: 'rect', stroke: inks.paper, strokeWidth: 1.5, opacity: 1 }, encoding: { x: nameChannel('column', { orient: 'top', domain: false, ticks: false, ...above.axis, labelPadding: 3 + (linesOf(above) - 1) * lineGap }), y: nameChannel('row', { grid: false, ...beside.axis }), fill: tone } },
    { data: { name: 'cells' }, mark: { type: 'point', filled: false, size: tall > 12 ? 48 : 36, strokeWidth: 1.2, opacity: 1 }, encoding: { x, y, ...mark } },
    titleLayer(), ...keyLayers({ fill: tone }, { shape: 'square', size: 110, strokeWidth: 0, fillOpacity: 1 }), ...keyLayers(mark, { filled: false, fill: null, size: 36, strokeWidth: 1.1 }).slice(0, 1),
  ], { height: { step: tall } })
  const lines = linesOf(above)
  const column = (name: string): string => {
    const shown = above.shown.get(name) ?? name
    return '\n'.repeat(lines - shown.split('\n').length) + shown
  }
  return { specification, data: { titles: titleRows(frame, { y: input.rowTitle }), cells: cells.map((cell) => ({ ...cell, row: beside.shown.get(cell.row) ?? cell.row, column: column(cell.column) })), key: keyRows(used, frame, 13).map((each) => ({ ...each, word: each['series'] })) } }
}
