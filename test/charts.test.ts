// Every case under fixtures/charts: its approved picture, all text readable, all numbers of the input unchanged in the data of the
// chart, the same bytes again and in another order. Then random data, because labels collide where nobody thought of it.
import fc from 'fast-check'
import { readFileSync, readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { drawChart } from '../src/publish/chart.ts'
import { drawingToSvg } from '../src/publish/svg.ts'
import type { Chart } from '../src/present/document.ts'
import { expectApproved } from './support/approved.ts'
import { chartKinds, shippedFonts, textFaults } from './support/chart-kinds.ts'

const folder = fileURLToPath(new URL('../fixtures/charts', import.meta.url))
const fonts = shippedFonts()
const cases = readdirSync(folder).sort().flatMap((kind) => readdirSync(`${folder}/${kind}`).sort().map((name) => ({ kind, name, path: `${folder}/${kind}/${name}` })))

function chartOf(kind: string, input: unknown): Chart {
  const draw = chartKinds[kind]
  if (draw === undefined) throw new Error(`no chart is called ${kind}`)
  return draw(input)
}

function inputOf(path: string): unknown {
  return JSON.parse(readFileSync(`${path}/input.json`, 'utf8'))
}

async function picture(kind: string, name: string, path: string): Promise<string> {
  return drawingToSvg(await drawChart(chartOf(kind, inputOf(path)), fonts.measure), { title: `${kind}: ${name.replaceAll('-', ' ')}`, description: 'Approved picture of a test case' })
}

describe.each(cases)('$kind: $name', ({ kind, name, path }) => {
  test('looks as approved', async () => {
    expectApproved(`${path}/chart.svg`, await picture(kind, name, path))
  })

  test('keeps every text inside and apart', async () => {
    expect(textFaults(await drawChart(chartOf(kind, inputOf(path)), fonts.measure))).toEqual([])
  })

  test('carries every number of its input, and no text in place of one', () => {
    const found = numbersIn(chartOf(kind, inputOf(path)).data)
    const counts = new Map<number, number>()
    for (const number of found) counts.set(number, (counts.get(number) ?? 0) + 1)
    const lost = numbersIn(inputOf(path)).filter((number) => {
      const left = counts.get(number) ?? 0
      counts.set(number, left - 1)
      return left < 1
    })
    expect(lost).toEqual([])
  })
})

test('every kind of chart has a case', () => {
  expect(readdirSync(folder).sort()).toEqual(Object.keys(chartKinds).sort())
})

test('draws the same bytes again, in another order', async () => {
  const forwards = new Map<string, string>()
  for (const { kind, name, path } of cases) forwards.set(path, await picture(kind, name, path))
  for (const { kind, name, path } of [...cases].reverse()) expect(await picture(kind, name, path)).toBe(forwards.get(path))
})

test('charts of one kind share a specification, whatever their titles, series and exclusions', () => {
  const few = chartKinds['response']?.({ xTitle: 'Level (mg/L)', yTitle: 'Response', points: [{ x: 1, y: 2 }, { x: 2, y: 4.1 }], excluded: [], line: [] })
  const many = chartKinds['response']?.({ xTitle: 'Other level (µg/L)', yTitle: 'Area', points: [1, 2, 3, 4].map((x) => ({ x, y: 5 * x, series: `day ${x}` })), excluded: [{ x: 2, y: 30, label: 'E1' }], line: [{ x: 1, y: 5 }, { x: 4, y: 20 }] })
  expect(JSON.stringify(few?.specification)).toBe(JSON.stringify(many?.specification))
  for (const { kind, path } of cases) expect(JSON.stringify(chartOf(kind, inputOf(path)).specification), kind).not.toMatch(/"title":"/)
})

test('refuses a point without a place', async () => {
  await expect(drawChart(chartOf('response', { xTitle: 'x', yTitle: 'y', points: [{ x: 1, y: Number.NaN }, { x: 2, y: 4 }], excluded: [], line: [] }), fonts.measure)).rejects.toThrow(/without a place/)
})

test.each(Object.keys(chartKinds).filter((kind) => kind !== 'heat-table'))('%s has room for nothing to show', async (kind) => {
  const nothing = { xTitle: 'x', yTitle: 'y', groupTitle: 'group', orderTitle: 'order', points: [], excluded: [], line: [], limits: [], values: [], means: [], bars: [], dots: [], censored: [], lines: [], curves: [], windows: [], items: [] }
  const drawing = await drawChart(chartOf(kind, nothing), fonts.measure)
  expect(drawing.width).toBe(467)
})

describe('random data', () => {
  // As measured: six digits, and nothing smaller than a billionth but zero.
  const measured = (number: number): number => (Math.abs(number) < 1e-9 ? 0 : Number(number.toPrecision(6)))
  const value = fc.double({ min: -1e4, max: 1e4, noNaN: true }).map(measured)
  const positive = fc.double({ min: 1e-6, max: 1e6, noNaN: true }).map(measured)
  const level = fc.oneof(value, positive)
  const label = fc.constantFrom('E1', 'E2 air bubble', 'at most 15 %', 'detection limit', 'criterion: at least 99.5 %', 'W')
  const name = fc.constantFrom('blank', 'day 1, AK', 'lot 7', 'spikes at 0.05 mg/L', 'instrument of the field station', 'a')
  const width = fc.constantFrom('full', 'half')
  const labelled = fc.array(fc.record({ value: level, label }), { maxLength: 4 })
  const titles = { xTitle: 'Analyte A (mg/L)', yTitle: 'Error (%)', groupTitle: 'Run', orderTitle: 'Order' }
  const inputs: Readonly<Record<string, fc.Arbitrary<object>>> = {
    response: fc.record({ width, points: fc.array(fc.record({ x: level, y: level, series: name }), { minLength: 1, maxLength: 12 }), excluded: fc.array(fc.record({ x: level, y: level, label }), { maxLength: 4 }), line: fc.constant([]) }),
    deviation: fc.record({ width, points: fc.array(fc.record({ x: level, y: value }), { minLength: 1, maxLength: 12 }), excluded: fc.array(fc.record({ x: level, y: value, label }), { maxLength: 4 }), limits: labelled }),
    'grouped-values': fc.record({ width, values: fc.array(fc.record({ group: name, value: level, panel: fc.constantFrom('0.5 mg/L', '5 mg/L') }), { minLength: 1, maxLength: 20 }), excluded: fc.array(fc.record({ group: name, value: level, label, panel: fc.constantFrom('0.5 mg/L', '5 mg/L') }), { maxLength: 3 }), means: fc.constant([]), limits: labelled }),
    'level-interval': fc.record({ width, points: fc.array(fc.record({ level: name, value: level, series: name }), { minLength: 1, maxLength: 20 }), excluded: fc.array(fc.record({ level: name, value: level, label }), { maxLength: 3 }), means: fc.array(fc.record({ level: name, mean: level }), { maxLength: 3 }), limits: labelled }),
    'dot-plot': fc.record({ width, dots: fc.array(fc.record({ group: name, value: level }), { minLength: 1, maxLength: 20 }), censored: fc.array(fc.record({ group: name, bound: level, direction: fc.constantFrom('below', 'above') }), { maxLength: 3 }), lines: labelled }),
    definitions: fc.record({ width, items: fc.array(fc.record({ label: name, value: level, kind: fc.constantFrom('detection limit', 'quantitation limit', 'critical value'), governing: fc.boolean() }), { minLength: 1, maxLength: 12 }), lines: labelled }),
    trace: fc.record({ width, points: fc.array(fc.record({ x: value, y: level }), { minLength: 2, maxLength: 30 }), windows: fc.array(fc.record({ from: value, to: value, label }), { maxLength: 4 }), lines: labelled }),
    sequence: fc.record({ width, points: fc.array(fc.record({ order: fc.integer({ min: 1, max: 500 }), value: level, condition: name }), { minLength: 1, maxLength: 20 }) }),
    difference: fc.record({ width, items: fc.array(fc.record({ label: name, estimate: value, low: value, high: value }), { minLength: 1, maxLength: 5 }), margins: fc.record({ low: value, high: value, label }), zero: fc.boolean() }),
  }

  test.each(Object.keys(inputs))('%s keeps every text inside and apart', async (kind) => {
    await fc.assert(fc.asyncProperty(inputs[kind] ?? fc.constant({}), async (input) => {
      expect(textFaults(await drawChart(chartOf(kind, { ...titles, ...input }), fonts.measure))).toEqual([])
    }), { numRuns: 40, seed: 20260417 })
  })
})

function numbersIn(value: unknown): readonly number[] {
  if (typeof value === 'number') return [value]
  if (Array.isArray(value)) return value.flatMap(numbersIn)
  return typeof value === 'object' && value !== null ? Object.values(value).flatMap(numbersIn) : []
}
