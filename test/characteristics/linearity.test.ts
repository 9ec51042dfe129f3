// What case folders cannot show of linearity: figures published as read-back levels without responses, reading back at the edges, and data
// too poor for any answer.
import { describe, expect, test } from 'vitest'
import type { AssessInput, AssessOutput } from '../../src/assess/assessment-part.ts'
import type { LinearityDetail } from '../../src/characteristics/linearity/detail.ts'
import { linearity } from '../../src/characteristics/linearity/index.ts'
import type { LinearityOptions } from '../../src/characteristics/linearity/options.ts'
import { relativeStandardError } from '../../src/characteristics/linearity/weighted-fit.ts'
import { fitPolynomial } from '../../src/statistics/regression.ts'

const place = { file: 'study.yaml', line: 1, column: 1 }

type Points = readonly (readonly [level: number, response: number, day?: string])[]

function assessed(points: Points, options: Partial<LinearityOptions> = {}): AssessOutput<LinearityDetail> {
  const input: AssessInput<LinearityOptions> = {
    block: { id: 'linearity', characteristic: 'linearity', measurands: ['x'], decideBy: 'estimate', criteria: [], place, options: { data: 'standards', fit: 'straight line', weights: 'none', runs: undefined, 'full-response': undefined, ...options } },
    measurand: { id: 'x', name: 'x', unit: 'mg/L', responseUnit: 'AU', place }, confidence: 0.95,
    responses: () => ({
      dataset: 'standards', field: 'response', censored: [], excluded: [], chain: [],
      values: points.map(([level, value, day], row) => ({ value, level, factors: day === undefined ? {} : { day }, numbers: {}, rows: [row], averaged: [value] })),
    }),
    results: () => undefined, observations: () => [], prior: () => [],
  }
  return linearity.assess(input) as AssessOutput<LinearityDetail>
}

function inverted(points: Points, response: number, options: Partial<LinearityOptions> = {}): unknown {
  const { detail } = assessed(points, options)
  if (detail === undefined) throw new Error('no detail')
  return linearity.invert?.(detail, response)
}

describe('relative standard error', () => {
  // Source: note of an accreditation institute on the relative standard error of a calibration: five standards, two coefficients, 12.83 %.
  test('agrees with a published example', () => {
    const levels = [0.05, 0.5, 2.5, 5, 10]
    const found = [0.0582, 0.4396, 2.304, 4.876, 10.34]
    const readAsThemselves = { ...fitPolynomial({ x: levels, y: found, degree: 1 }), coefficients: [0, 1] } // response = level read back
    expect(relativeStandardError(readAsThemselves)?.toFixed(2)).toBe('12.83')
  })
})

describe('reading back', () => {
  const rising: Points = [[1, 10], [2, 20], [4, 40], [8, 80]]
  const falling: Points = [[1, 90], [2, 80], [4, 60], [8, 20]]
  const bent: Points = [0, 1, 2, 3, 4, 5].map((x) => [x, 100 * x - 8 * x * x] as const) // turns at 6.25, beyond the standards

  test('gives the level inside the standards, ends included', () => {
    for (const [response, level] of [[10, 1], [30, 3], [80, 8]] as const) expect((inverted(rising, response) as { result: number }).result).toBeCloseTo(level, 12)
  })

  test('says on which side a response lies, in levels and not in responses', () => {
    expect([inverted(rising, 9.9), inverted(rising, 80.1)]).toEqual([{ outside: 'below' }, { outside: 'above' }])
    expect([inverted(falling, 90.1), inverted(falling, 19.9)]).toEqual([{ outside: 'below' }, { outside: 'above' }])
  })

  test('takes the root of a parabola that lies inside the standards', () => {
    // 100x - 8x² = 128 at x = 1.446 and 11.05, by the formula of the quadratic
    expect((inverted(bent, 128, { fit: 'quadratic' }) as { result: number }).result).toBeCloseTo(6.25 - Math.sqrt(6.25 ** 2 - 16), 9)
    expect(inverted(bent, 305, { fit: 'quadratic' })).toEqual({ outside: 'above' })
  })
})

describe('weights', () => {
  test.each(['1/x', '1/x^2'] as const)('%s refuses a standard at zero', (weights) => {
    const output = assessed([[0, 0.1], [1, 10], [2, 20.2], [4, 39.9]], { weights })
    expect([output.detail, output.diagnostics.map((each) => each.code)]).toEqual([undefined, ['assess/unsuitable-data']])
  })

  test.each(['1/y', '1/y^2'] as const)('%s refuses a response at zero', (weights) => {
    expect(assessed([[0, 0], [1, 10], [2, 20.2], [4, 39.9]], { weights }).detail).toBeUndefined()
  })

  test('1/s^2 refuses a level without scattering replicates, and is called unsteady on few', () => {
    const pairs: Points = [[1, 10], [1, 10.2], [2, 20], [2, 20.3], [4, 40], [4, 40.4]]
    expect(assessed([...pairs, [8, 80]], { weights: '1/s^2' }).detail).toBeUndefined()
    expect(assessed(pairs, { weights: '1/s^2' }).diagnostics.map((each) => each.code)).toEqual(['assess/method-note'])
  })
})

describe('too little', () => {
  test.each([
    ['nothing', []], ['one level', [[1, 10], [1, 11]]], ['two levels', [[1, 10], [2, 20], [2, 21]]], ['a parabola through three standards', [[1, 10], [2, 20], [3, 31]]],
  ] as readonly (readonly [string, Points])[])('%s: every metric is said to be not evaluable', (_, points) => {
    const output = assessed(points, { fit: 'quadratic' })
    expect([output.detail, output.findings.length, output.diagnostics.map((each) => each.code)]).toEqual([undefined, 0, ['assess/too-few-values']])
    expect(new Set(output.notEvaluable.map((each) => each.metric))).toEqual(new Set(Object.keys(linearity.metrics)))
    expect(Object.values(output.design).every(Number.isFinite)).toBe(true)
  })
})

describe('runs', () => {
  test('a run that cannot be fitted alone is named, and its standards stay in the common fit', () => {
    const output = assessed([[1, 10, 'a'], [2, 20.2, 'a'], [4, 40, 'a'], [1, 11, 'b'], [2, 21.8, 'b'], [4, 44, 'b'], [1, 10.4, 'c']], { runs: ['day'] })
    expect(output.detail?.runs.map((each) => each.run)).toEqual(['a', 'b'])
    expect(output.detail?.runsLeftOut.map((each) => `${each.run} ${each.n}`)).toEqual(['c 1'])
    expect([output.detail?.n, output.design['runs']]).toEqual([7, 3])
  })
})
