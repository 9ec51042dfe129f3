// Names of categories along an axis: wrapped or turned so that all of them can be read, and values of one category spread
// sideways so that none hides another.
import { belowLabels } from './axis-titles.ts'
import type { ChartWidth } from './chart-input.ts'
import type { Fragment } from './layers.ts'
import { estimatedWidth, wrapped as wrap } from './label-placement.ts'

export const lineGap = 8.5

export interface CategoryNames {
  /** Name as given → name with line breaks. */
  readonly shown: ReadonlyMap<string, string>
  /** Settings of the axis that bears them. */
  readonly axis: Fragment
  /** Width of the widest line. */
  readonly width: number
  /** Baseline of a title below them, under the foot of the plot. */
  readonly below: number
}

/** Names below a plot: wrapped where the words fit into their band, else turned. */
export function namesBelow(names: readonly string[], plotWidth: number): CategoryNames {
  const band = plotWidth / Math.max(1, names.length)
  const wrapped = new Map(names.map((name) => [name, wrap(name, band - 5)]))
  const fits = [...wrapped.values()].every((lines) => lines.length <= 3 && lines.every((line) => estimatedWidth(line) <= band - 3))
  if (fits) {
    const lines = Math.max(1, ...[...wrapped.values()].map((each) => each.length))
    return { shown: joined(wrapped), axis: { labelAngle: 0, labelOverlap: false, ...brokenLines }, width: band, below: belowLabels + (lines - 1) * lineGap }
  }
  const long = new Map(names.map((name) => [name, wrap(name, 110)]))
  const width = widestOf(long)
  const lines = Math.max(...[...long.values()].map((each) => each.length))
  return band < lineGap * 1.6
    ? { shown: joined(long), axis: { labelAngle: -90, labelBaseline: 'middle', labelOverlap: 'greedy', labelAlign: 'right', ...brokenLines }, width, below: width + 18 }
    : { shown: joined(long), axis: { labelAngle: -45, labelBaseline: 'top', labelOverlap: false, labelAlign: 'right', ...brokenLines }, width, below: (width + lines * lineGap) * Math.SQRT1_2 + 18 }
}

/** Names to the left of a plot, wrapped so that the larger part is left to the plot. */
export function namesBeside(names: readonly string[], chart: ChartWidth = 'full'): CategoryNames {
  const widest = chart === 'full' ? 150 : 78
  const wrapped = new Map(names.map((name) => [name, wrap(name, widest)]))
  return { shown: joined(wrapped), axis: { labelOverlap: false, ...brokenLines }, width: widestOf(wrapped), below: belowLabels }
}

/** Room to the left of a plot, in coarse steps so that charts of one kind share a specification. */
export function roomBeside(names: CategoryNames): number {
  return Math.max(60, Math.ceil((names.width + 10) / 20) * 20)
}

export function linesOf(names: CategoryNames): number {
  return Math.max(1, ...[...names.shown.values()].map((name) => name.split('\n').length))
}

/** Each name once, in order of appearance. */
export function namesInOrder(...lists: readonly (readonly string[])[]): readonly string[] {
  return [...new Set(lists.flat())]
}

/** The rows of a chart, of which there is one even when there is nothing to show. */
export function rowNames(...lists: readonly (readonly string[])[]): readonly string[] {
  const names = namesInOrder(...lists)
  return names.length === 0 ? [''] : names
}

const brokenLines: Fragment = { labelExpr: "split(datum.label, '\\n')", labelLineHeight: lineGap }

function widestOf(names: ReadonlyMap<string, readonly string[]>): number {
  return Math.max(0, ...[...names.values()].flat().map((line) => estimatedWidth(line)))
}

function joined(wrapped: ReadonlyMap<string, readonly string[]>): ReadonlyMap<string, string> {
  return new Map([...wrapped].map(([name, lines]) => [name, lines.join('\n')]))
}

/** Distance at which two marks stand side by side, in points. */
const marksApart = 5.6

/** Sideways offsets, in points, of marks at these positions along the axis: 0 where free, else the nearest free place within `reach`. */
export function spread(positions: readonly number[], reach: number): readonly number[] {
  const placed: { readonly position: number; readonly offset: number }[] = []
  const order = positions.map((position, index) => ({ position, index })).sort((a, b) => a.position - b.position || a.index - b.index)
  const offsets: number[] = Array.from({ length: positions.length }, () => 0)
  for (const { position, index } of order) {
    const near = placed.filter((other) => Math.abs(other.position - position) < marksApart)
    const free = sideSteps(reach).find((offset) => near.every((other) => Math.hypot(other.position - position, other.offset - offset) >= marksApart - 1e-9))
    const offset = free ?? 0
    placed.push({ position, offset })
    offsets[index] = offset
  }
  return offsets
}

/** 0, right, left, farther right, … */
function sideSteps(reach: number): readonly number[] {
  const steps = [0]
  for (let step = marksApart / 2; step <= reach; step += marksApart / 2) steps.push(step, -step)
  return steps
}
