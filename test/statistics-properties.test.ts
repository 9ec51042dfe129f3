// What must hold for any data: shift and scale carry through, order does not matter, equal weights are no weights, parts add up, tests agree
// with their intervals; and extreme data give the right answer or a refusal with a reason, never NaN.
import * as fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { brownForsythe, equivalence, oneSampleT, pooledT, varianceRatio, welch } from '../src/statistics/compare.ts'
import { mean, standardDeviation, summary } from '../src/statistics/describe.ts'
import { lackOfFit, mandelTest } from '../src/statistics/lack-of-fit.ts'
import { grubbs } from '../src/statistics/outliers.ts'
import { fitPolynomial, inversePredict, predict } from '../src/statistics/regression.ts'
import { roundHalfEven, roundHalfUp, roundSignificant } from '../src/statistics/rounding.ts'
import { modifiedLargeSampleInterval, nested, oneWay } from '../src/statistics/variance-components.ts'

const value = fc.integer({ min: -100_000, max: 100_000 }).map((whole) => whole / 1000)
const series = (least: number): fc.Arbitrary<number[]> => fc.array(value, { minLength: least, maxLength: 12 })
const spread = (values: readonly number[]): boolean => new Set(values).size > 1
const close = (found: number, expected: number, digits = 9): void => expect(Math.abs(found - expected)).toBeLessThanOrEqual(10 ** -digits * Math.max(1, Math.abs(expected)))

test('a shift moves the mean and leaves the spread; a scale carries through both', () => {
  fc.assert(fc.property(series(2).filter(spread), value, fc.integer({ min: 1, max: 1000 }), (values, shift, scale) => {
    close(mean(values.map((each) => each + shift)), mean(values) + shift)
    close(standardDeviation(values.map((each) => each + shift)), standardDeviation(values))
    close(standardDeviation(values.map((each) => each * scale)), scale * standardDeviation(values))
  }))
})

test('order does not matter', () => {
  fc.assert(fc.property(series(3).filter(spread), (values) => {
    close(standardDeviation([...values].reverse()), standardDeviation(values))
    close(grubbs([...values].reverse()).G, grubbs(values).G)
  }))
})

const points = fc.array(fc.record({ x: fc.integer({ min: 0, max: 50 }), y: value }), { minLength: 5, maxLength: 14 }).filter((all) => new Set(all.map((point) => point.x)).size > 3 && spread(all.map((point) => point.y)))

test('weights of one are no weights, and their size does not matter', () => {
  fc.assert(fc.property(points, fc.integer({ min: 1, max: 1000 }), (all, size) => {
    const [x, y] = [all.map((point) => point.x), all.map((point) => point.y)]
    const plain = fitPolynomial({ x, y, degree: 1 })
    const weighted = fitPolynomial({ x, y, weights: x.map(() => size), degree: 1 })
    weighted.coefficients.forEach((each, k) => close(each, plain.coefficients[k] ?? 0, 7))
    weighted.standardErrors.forEach((each, k) => close(each, plain.standardErrors[k] ?? 0, 7))
  }))
})

test('residuals of a fit with intercept add up to nothing, and a parabola never fits worse than a line', () => {
  fc.assert(fc.property(points, (all) => {
    const [x, y] = [all.map((point) => point.x), all.map((point) => point.y)]
    const [line, parabola] = [fitPolynomial({ x, y, degree: 1 }), fitPolynomial({ x, y, degree: 2 })]
    close(line.residuals.reduce((total, each) => total + each, 0), 0, 7)
    expect(parabola.residualSumOfSquares).toBeLessThanOrEqual(line.residualSumOfSquares * (1 + 1e-9) + 1e-9)
  }))
})

test('an exact line is found by a parabola with no curvature, and read back everywhere inside', () => {
  fc.assert(fc.property(value, fc.integer({ min: 1, max: 100 }), fc.integer({ min: 1, max: 9 }), (intercept, slope, at) => {
    const x = [1, 2, 4, 6, 8, 10]
    const parabola = fitPolynomial({ x, y: x.map((each) => intercept + slope * each), degree: 2 })
    close(parabola.coefficients[2] ?? 1, 0, 6)
    const found = inversePredict(parabola, predict(parabola, at).value, { low: 1, high: 10 })
    expect('x' in found ? Math.abs(found.x - at) : 1).toBeLessThan(1e-6)
  }))
})

const groups = fc.array(series(2).filter(spread), { minLength: 2, maxLength: 6 })

test('sums of squares and components add up to the total', () => {
  fc.assert(fc.property(groups, (all) => {
    const anova = oneWay(all)
    const flat = all.flat()
    close(anova.sumOfSquaresBetween + anova.sumOfSquaresWithin, standardDeviation(flat) ** 2 * (flat.length - 1), 6)
    close(anova.totalVariance, anova.withinVariance + Math.max(0, anova.betweenVarianceRaw))
    const { low, high } = modifiedLargeSampleInterval(anova, 0.95)
    expect(low).toBeLessThanOrEqual(Math.sqrt(anova.totalVariance))
    expect(high).toBeGreaterThanOrEqual(Math.sqrt(anova.totalVariance))
  }))
})

test('a nested analysis with one size everywhere agrees with its mean squares', () => {
  fc.assert(fc.property(fc.array(value, { minLength: 12, maxLength: 12 }).filter(spread), (values) => {
    const data = [0, 1, 2].map((i) => [0, 1].map((j) => [0, 1].map((k) => values[i * 4 + j * 2 + k] ?? 0)))
    if (data.flat().every((cell) => cell[0] === cell[1])) return
    const found = nested(data)
    close(found.inner.varianceRaw, (found.inner.meanSquare - found.residual.meanSquare) / 2, 6)
    close(found.outer.varianceRaw, (found.outer.meanSquare - found.inner.meanSquare) / 4, 6)
  }))
})

test('two one-sided tests agree with the interval', () => {
  fc.assert(fc.property(series(3).filter(spread), fc.integer({ min: 1, max: 200 }), (values, margin) => {
    const found = oneSampleT(values, 0, 0.9)
    const tests = equivalence(found, { low: -margin, high: margin }, 0.05)
    expect(tests.equivalent).toBe(tests.probability < 0.05)
    close(tests.interval.low, found.interval.low, 7)
  }))
})

test('Welch and pooled agree for equal sizes but for their degrees of freedom', () => {
  fc.assert(fc.property(fc.array(fc.tuple(value, value), { minLength: 3, maxLength: 10 }).filter((pairs) => spread(pairs.map((pair) => pair[0])) && spread(pairs.map((pair) => pair[1]))), (pairs) => {
    const [a, b] = [pairs.map((pair) => pair[0]), pairs.map((pair) => pair[1])]
    close(welch(a, b, 0.95).t, pooledT(a, b, 0.95).t, 7)
    expect(welch(a, b, 0.95).df).toBeLessThanOrEqual(pooledT(a, b, 0.95).df + 1e-9)
  }))
})

test('rounding never moves a number by more than half a unit, keeps its digits, and is its own fixed point', () => {
  fc.assert(fc.property(fc.double({ min: -1e9, max: 1e9, noNaN: true }), fc.integer({ min: 0, max: 6 }), (number, decimals) => {
    for (const round of [roundHalfUp, roundHalfEven]) {
      const rounded = round(number, decimals)
      expect(Math.abs(rounded.value - number)).toBeLessThanOrEqual(0.5 * 10 ** -decimals * (1 + 1e-9) + Math.abs(number) * 1e-15)
      expect(rounded.text.split('.')[1]?.length ?? 0).toBe(decimals)
      expect(round(rounded.value, decimals).text).toBe(rounded.text)
    }
  }))
})

test.each([
  [2.675, 2, '2.68', '2.68'], [98.25, 1, '98.3', '98.2'], [0.125, 2, '0.13', '0.12'], [-2.5, 0, '-3', '-2'], [1.005, 2, '1.01', '1.00'], [9.995, 2, '10.00', '10.00'], [0.0005, 3, '0.001', '0.000'],
])('%f to %i decimals is %s half up and %s half even (ASTM E29; requirements of rounding in decimal arithmetic)', (number, decimals, up, even) => {
  expect([roundHalfUp(number, decimals).text, roundHalfEven(number, decimals).text]).toEqual([up, even])
})

test.each([[98.28568, 4, '98.29'], [9.996, 3, '10.0'], [0.00098765, 3, '0.000988'], [123456, 2, '120000'], [5e-324, 1, undefined]] as const)('%f to %i significant digits', (number, digits, text) => {
  const rounded = roundSignificant(number, digits, 'half up')
  if (text === undefined) expect(rounded.value).toBe(5e-324)
  else expect(rounded.text).toBe(text)
})

describe('extreme and degenerate data: the right answer or a reason', () => {
  test.each([1e-300, 1e-150, 1, 1e150, 1e300])('values near %f', (size) => {
    const values = [1.1, 1.2, 1.3, 1.25].map((each) => each * size)
    const found = summary(values)
    close(found.mean / size, 1.2125)
    close(found.standardDeviation / size, 0.0853912563829966) // by hand: √(0.021875/3)
  })

  test.each([1e-120, 1e120])('a calibration of responses near %f', (size) => {
    const fit = fitPolynomial({ x: [1, 2, 3, 4], y: [2, 4.1, 5.9, 8.05].map((each) => each * size), degree: 1 })
    close((fit.coefficients[1] ?? 0) / size, 1.995)
  })

  test('refusals name what is missing', () => {
    expect(() => mean([])).toThrow(/at least one value/)
    expect(() => standardDeviation([1])).toThrow(/at least two values/)
    expect(() => fitPolynomial({ x: [1, 1, 1], y: [1, 2, 3], degree: 1 })).toThrow(/do not determine the slope/)
    expect(() => fitPolynomial({ x: [1, 2], y: [1, 2], degree: 1 })).toThrow(/more than 2 values/)
    expect(() => fitPolynomial({ x: [0, 1, 2], y: [1, 2, 3], weights: [Infinity, 1, 1], degree: 1 })).toThrow(/weight/)
    expect(() => oneWay([[1, 1], [1, 1]])).toThrow(/do not scatter/)
    expect(() => oneWay([[1], [2]])).toThrow(/replicates/)
    expect(() => welch([1, 1], [1, 1], 0.95)).toThrow(/do not scatter/)
    expect(() => varianceRatio([1, 1], [1, 2])).toThrow(/does not scatter/)
    expect(() => grubbs([1, 2])).toThrow(/at least three/)
    expect(() => brownForsythe([[1, 1], [2, 2]])).toThrow(RangeError)
    const line = fitPolynomial({ x: [1, 2, 3], y: [1, 2, 3.1], degree: 1 })
    expect(() => lackOfFit(line)).toThrow(/replicates/)
    expect(() => mandelTest(line, fitPolynomial({ x: [1, 2, 3, 4], y: [1, 4, 9, 16], degree: 2 }))).toThrow(RangeError)
  })
})
