// The chart functions by the name of their folder under fixtures/charts, and what every drawing must keep.
import { componentBarsChart } from '../../src/present/charts/component-bars-chart.ts'
import { definitionsChart } from '../../src/present/charts/definitions-chart.ts'
import { deviationChart } from '../../src/present/charts/deviation-chart.ts'
import { differenceChart } from '../../src/present/charts/difference-chart.ts'
import { distributionsChart } from '../../src/present/charts/distributions-chart.ts'
import { dotPlotChart } from '../../src/present/charts/dot-plot-chart.ts'
import { groupedValuesChart } from '../../src/present/charts/grouped-values-chart.ts'
import { heatTable } from '../../src/present/charts/heat-table.ts'
import { levelIntervalChart } from '../../src/present/charts/level-interval-chart.ts'
import { responseChart } from '../../src/present/charts/response-chart.ts'
import { sequenceChart } from '../../src/present/charts/sequence-chart.ts'
import { traceChart } from '../../src/present/charts/trace-chart.ts'
import type { Chart } from '../../src/present/document.ts'
import { textCorners } from '../../src/publish/chart.ts'
import type { Drawing, Operation, TextOperation } from '../../src/publish/drawing.ts'
import { loadFonts, type FontFaces } from '../../src/publish/fonts.ts'
import { fontBytes } from '../publish/assets.ts'

const functions = {
  'component-bars': componentBarsChart, definitions: definitionsChart, deviation: deviationChart, difference: differenceChart, distributions: distributionsChart, 'dot-plot': dotPlotChart,
  'grouped-values': groupedValuesChart, 'heat-table': heatTable, 'level-interval': levelIntervalChart, response: responseChart, sequence: sequenceChart, trace: traceChart,
}

export const chartKinds = functions as unknown as Readonly<Record<string, (input: unknown) => Chart>>

export function shippedFonts(): FontFaces {
  return loadFonts(fontBytes)
}

export function textsOf(operations: readonly Operation[]): readonly TextOperation[] {
  return operations.flatMap((operation) => (operation.kind === 'text' ? [operation] : operation.kind === 'clip' ? textsOf(operation.operations) : []))
}

/** What is wrong with the texts of a drawing: outside its bounds, or lying on another. */
export function textFaults(drawing: Drawing): readonly string[] {
  const texts = textsOf(drawing.operations).map((each) => ({ text: each.text, corners: textCorners(each) }))
  const outside = texts.filter(({ corners }) => corners.some(([x, y]) => x < -0.02 || y < -0.02 || x > drawing.width + 0.02 || y > drawing.height + 0.02))
  const touching = texts.flatMap((one, index) => texts.slice(index + 1).filter((other) => overlap(one.corners, other.corners)).map((other) => `\`${one.text}\` lies on \`${other.text}\``))
  return [...outside.map(({ text }) => `\`${text}\` reaches out of the drawing`), ...touching]
}

type Corners = readonly (readonly [number, number])[]

/** Two turned boxes overlap unless some side of one separates them; touching by less than a third of a point is no overlap. */
function overlap(a: Corners, b: Corners): boolean {
  return [...sides(a), ...sides(b)].every(([x, y]) => {
    const along = (corners: Corners): readonly number[] => corners.map(([px, py]) => (px * x + py * y) / Math.hypot(x, y))
    const [one, other] = [along(a), along(b)]
    return Math.min(...one) < Math.max(...other) - 0.34 && Math.min(...other) < Math.max(...one) - 0.34
  })
}

function sides(corners: Corners): readonly (readonly [number, number])[] {
  return corners.map(([x, y], index) => {
    const [nextX, nextY] = corners[(index + 1) % corners.length] ?? [x, y]
    return [nextX - x, nextY - y] as const
  })
}
