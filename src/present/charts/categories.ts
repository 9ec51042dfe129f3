// Names of categories along an axis: wrapped or turned so that all of them can be read, and values of one category spread
// sideways so that none hides another.
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
}

/** Names below a plot: wrapped where the words fit into their band, else turned. */
export function namesBelow(names: readonly string[], plotWidth: number): CategoryNames {
  const band = plotWidth / Math.max(1, names.length)
  const wrapped = new Map(names.map((name) => [name, wrap(name, band - 5)]))
  const fits = [...wrapped.values()].every((lines) => lines.length <= 3 && lines.every((line) => estimatedWidth(line) <= band - 3))
  const turned = band < lineGap * 1.6 ? { labelAngle: -90, labelBaseline: 'middle', labelOverlap: 'greedy' } : { labelAngle: -45, labelBaseline: 'top', labelOverlap: false }
  return names.length > 0 && fits
    ? { shown: joined(wrapped), axis: { labelAngle: 0, labelOverlap: false, ...brokenLines }, width: band }
    : { shown: joined(new Map(names.map((name) => [name, wrap(name, 110)]))), axis: { ...turned, labelAlign: 'right', ...brokenLines }, width: band }
}

/** Names to the left of a plot, wrapped so that the larger part is left to the plot. */
export function namesBeside(names: readonly string[], chart: ChartWidth = 'full'): CategoryNames {
  const widest = chart === 'full' ? 150 : 78
  const wrapped = new Map(names.map((name) => [name, wrap(name, widest)]))
  const width = Math.max(0, ...[...wrapped.values()].flat().map((line) => estimatedWidth(line)))
  return { shown: joined(wrapped), axis: { labelOverlap: false, ...brokenLines }, width }
}

/** Room to the left of a plot, in coarse steps so that charts of one kind share a specification. */
export function roomBeside(names: CategoryNames): number {
  return Math.max(60, Math.ceil((names.width + 10) / 20) * 20)
}

export function linesOf(names: CategoryNames): number {
  return Math.max(1, ...[...names.shown.values()].map((name) => name.split('\n').length))
}

export function namesInOrder(...lists: readonly (readonly string[])[]): readonly string[] {
  return [...new Set(lists.flat())]
}

const brokenLines: Fragment = { labelExpr: "split(datum.label, '\\n')", labelLineHeight: lineGap }

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
