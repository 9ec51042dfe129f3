// What must hold for any data: shift and scale carry through, order does not matter, equal weights are no weights, parts add up, tests agree
// with their intervals; and extreme data give the right answer or a refusal with a reason, never NaN.
import * as fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { alternatingBlocks } from '../src/statistics/alternating-blocks.ts'
import { bartlett, brownForsythe, equivalence, levene, oneSampleT, pairedT, pooledT, varianceRatio, welch } from '../src/statistics/compare.ts'
import { mean, meanInterval, median, standardDeviation, sumOfSquaredDeviations, summary } from '../src/statistics/describe.ts'
import { iso11843, mdl } from '../src/statistics/detection.ts'
import { chiSquareQuantile, fisherUpperTail, normalQuantile, studentQuantile } from '../src/statistics/distributions.ts'
import { horwitzRatio } from '../src/statistics/horwitz.ts'
import { lackOfFit, mandelTest } from '../src/statistics/lack-of-fit.ts'
import { noncentralStudentCdf, noncentralStudentDelta } from '../src/statistics/noncentral-student.ts'
import { grubbs } from '../src/statistics/outliers.ts'
import { coefficientInterval, confidenceBand, fiellerInterval, fitPolynomial, inversePredict, inversePredictionStandardError, predict, predictionInterval } from '../src/statistics/regression.ts'
import { decimalsOf, roundHalfEven, roundHalfUp, roundSignificant, significantFiguresOf } from '../src/statistics/rounding.ts'
import { intermediateTerms, modifiedLargeSampleInterval, modifiedLargeSampleIntervalOf, nested, nestedMeanInterval, oneWay, satterthwaite, satterthwaiteInterval } from '../src/statistics/variance-components.ts'

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

test('binary noise on a decimal tie changes nothing', () => {
  fc.assert(fc.property(fc.integer({ min: 1, max: 10 ** 8 }), fc.integer({ min: 0, max: 5 }), fc.constantFrom(-1, 0, 1), (whole, decimals, steps) => {
    const tie = Number(`${whole}5e${-decimals - 1}`)
    const noisy = tie * (1 + steps * Number.EPSILON)
    expect(roundHalfUp(noisy, decimals).text).toBe(roundHalfUp(tie, decimals).text)
    expect(roundHalfEven(noisy, decimals).text).toBe(roundHalfEven(tie, decimals).text)
    expect(roundHalfUp(tie, decimals).value).toBeCloseTo(Number(`${whole + 1}e${-decimals}`), decimals + 1)
  }))
})

test.each([['5.0', 1, 2], ['5', 0, 1], ['1e-3', 3, 1], ['0.050', 3, 2], ['100', 0, 3], ['-12.30', 2, 4], ['0', 0, 1]])('%s has %i decimals and %i significant figures as typed', (text, decimals, figures) => {
  expect([decimalsOf(text), significantFiguresOf(text)]).toEqual([decimals, figures])
})

const blockMeans = fc.array(value, { minLength: 6, maxLength: 12 }).filter(spread)

test('a straight drift added to alternating blocks moves the drift and no effect', () => {
  fc.assert(fc.property(blockMeans, value, value, (means, drift, shift) => {
    const of = (change: (mean: number, order: number) => number): ReturnType<typeof alternatingBlocks> => alternatingBlocks(means.map((each, order) => ({ condition: order % 2, order, mean: change(each, order) })), 0.95)
    const [plain, moved] = [of((each) => each), of((each, order) => each + shift + drift * order)]
    close(moved.effects[0]?.difference ?? 0, plain.effects[0]?.difference ?? 1, 7)
    close(moved.effects[0]?.standardError ?? 0, plain.effects[0]?.standardError ?? 1, 7)
    close(moved.drift, plain.drift + drift, 7)
  }))
})

test('a level read from a line comes back where its response lies, on whichever side of the range', () => {
  fc.assert(fc.property(value, fc.integer({ min: -50, max: 50 }).filter((slope) => slope !== 0), fc.integer({ min: -20, max: 30 }), (intercept, slope, at) => {
    const found = inversePredict({ coefficients: [intercept, slope] }, intercept + slope * at, { low: 0, high: 10 })
    if (at < 0) expect(found).toEqual({ outside: 'below' })
    else if (at > 10) expect(found).toEqual({ outside: 'above' })
    else close('x' in found ? found.x : Number.NaN, at, 6)
  }))
})

test('a parabola gives the root inside the range, and none where two or no levels have the response', () => {
  const parabola = { coefficients: [0, 10, -0.5] } // turns at x = 10, where it is 50
  expect(inversePredict(parabola, 32, { low: 0, high: 8 })).toEqual({ x: 4 })
  expect(inversePredict(parabola, 32, { low: 12, high: 20 })).toEqual({ x: 16 })
  expect(inversePredict(parabola, 32, { low: 0, high: 20 })).toEqual({ outside: 'no root' })
  expect(inversePredict(parabola, 51, { low: 0, high: 8 })).toEqual({ outside: 'above' })
  expect(inversePredict(parabola, -1, { low: 0, high: 8 })).toEqual({ outside: 'below' })
  expect(inversePredict(parabola, 51, { low: 0, high: 19 })).toEqual({ outside: 'above' })
  expect(inversePredict({ coefficients: [3, 0, 0] }, 2, { low: 0, high: 8 })).toEqual({ outside: 'no root' })
})

test('Fieller’s bounds enclose the level read back and approach first-order bounds as scatter vanishes', () => {
  const x = [1, 2, 4, 6, 8, 10]
  const noise = [0.3, -0.5, 0.2, 0.4, -0.3, -0.1]
  for (const size of [1, 0.1, 0.001]) {
    const fit = fitPolynomial({ x, y: x.map((level, k) => 2 + 3 * level + size * (noise[k] ?? 0)), degree: 1 })
    const bounds = fiellerInterval(fit, 17, 2, 0.95)
    const half = studentQuantile(0.975, fit.df) * inversePredictionStandardError(fit, 17, 2)
    expect(Math.abs((bounds.high - bounds.low) / 2 / half - 1)).toBeLessThan(0.02 * size ** 2 + 1e-9)
  }
})

test('the noncentral t distribution is the central one without noncentrality, falls with it, and is met by its own solution', () => {
  fc.assert(fc.property(fc.integer({ min: 1, max: 60 }), fc.double({ min: 0.001, max: 0.3, noNaN: true }), fc.double({ min: 0.001, max: 0.3, noNaN: true }), (df, alpha, beta) => {
    const critical = studentQuantile(1 - alpha, df)
    close(noncentralStudentCdf(critical, df, 0), 1 - alpha, 12)
    expect(noncentralStudentCdf(critical, df, 1)).toBeLessThan(1 - alpha)
    close(noncentralStudentCdf(critical, df, noncentralStudentDelta(df, alpha, beta)), beta, 11)
  }), { numRuns: 15 })
})

// By hand from 40 CFR 136, appendix B, revision 2: rank n × 0.99 of all blanks from 100 on, those without a number lowest; the highest below.
test.each([
  [Array.from({ length: 99 }, (_, k) => k + 1), 1, '99th percentile', 98],
  [Array.from({ length: 98 }, (_, k) => k + 1), 1, 'highest blank', 98],
  [[7], 149, 'highest blank', 7],
  [Array.from({ length: 150 }, (_, k) => k + 1), 0, '99th percentile', 149],
] as const)('blanks by rank, case %#', (numeric, silent, rule, limit) => {
  const found = mdl({ spikes: [1, 2, 3, 2, 1, 2, 3], blanks: [...numeric, ...Array.from({ length: silent }, () => undefined)] }).blanks
  expect([found.rule, found.limit]).toEqual([rule, limit])
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

  const shape = { a: [1.1, 1.2, 1.3, 1.25, 1.18], b: [1.15, 1.21, 1.4, 1.3, 1.2], x: [1, 1, 2, 2, 5, 5, 7, 8], y: [2, 2.1, 4.1, 4, 10.2, 9.9, 14.1, 16] }

  /** Every statistic of data of one size; figures without unit first, figures in the unit of the data second. */
  function everything(size: number): readonly (() => readonly [number, number])[] {
    const [a, b, y] = [shape.a, shape.b, shape.y].map((values) => values.map((value) => value * size)) as [number[], number[], number[]]
    const { x } = shape
    const line = (): ReturnType<typeof fitPolynomial> => fitPolynomial({ x, y, degree: 1 })
    const anova = (): ReturnType<typeof oneWay> => oneWay([a, b])
    return [
      () => [0, Math.sqrt(sumOfSquaredDeviations(a))], () => [welch(a, b, 0.95).df, welch(a, b, 0.95).interval.high], () => [pooledT(a, b, 0.95).t, pooledT(a, b, 0.95).standardError], () => [pairedT(a, b, 0.95).probability, pairedT(a, b, 0.95).interval.low],
      () => [oneSampleT(a, size, 0.95).t, oneSampleT(a, size, 0.95).difference], () => [varianceRatio(a, b).F, 0], () => [brownForsythe([a, b]).probability, 0], () => [levene([a, b]).F, 0], () => [bartlett([a, b]).statistic, 0],
      () => [equivalence(welch(a, b, 0.9), { low: -size, high: size }, 0.05).probability, 0], () => [line().rSquared ?? 0, line().coefficients[1] ?? 0], () => [0, fitPolynomial({ x, y, weights: x.map((level) => 1 / level ** 2), degree: 2 }).standardErrors[2] ?? 0],
      () => [0, fitPolynomial({ x, y, degree: 1, throughZero: true }).residualStandardDeviation], () => [0, predictionInterval(line(), 3, 0.95).high], () => [0, confidenceBand(line(), 3, 0.95).low], () => [inversePredictionStandardError(line(), 4 * size, 2), 0],
      () => [fiellerInterval(line(), 4 * size, 2, 0.95).high, 0], () => [lackOfFit(line()).F, Math.sqrt(lackOfFit(line()).sumOfSquaresPureError)], () => [mandelTest(line(), fitPolynomial({ x, y, degree: 2 })).F, 0],
      () => [anova().F, Math.sqrt(anova().totalVariance)], () => [0, modifiedLargeSampleInterval(anova(), 0.95).high], () => [satterthwaite(intermediateTerms(anova())).df, satterthwaiteInterval(intermediateTerms(anova()), 0.95).low],
      () => [0, nestedMeanInterval(anova(), 0.95).high], () => [0, Math.sqrt(nested([[a, b], [b, a.slice(1)]]).totalVariance)], () => [iso11843({ x, y }, 1, 0.05, 0.05).minimumDetectable, iso11843({ x, y }, 1, 0.05, 0.05).criticalResponse],
      () => [alternatingBlocks([...a, ...b].map((each, order) => ({ condition: order % 2, mean: each, order })), 0.95).effects[0]?.t ?? 0, alternatingBlocks([...a, ...b].map((each, order) => ({ condition: order % 2, mean: each, order })), 0.95).drift],
    ]
  }

  test.each([1e-120, 1e-60, 1e60, 1e120])('every statistic at %d times the size is the same but for the size', (size) => {
    const plain = everything(1)
    everything(size).forEach((statistic, k) => {
      const [without, within] = plain[k]?.() ?? [0, 0]
      const found = statistic()
      close(found[0], without, 8)
      close(found[1] / size, within, 8)
    })
  })

  test.each([1e-290, 1e-200, 1e200, 1e300, 1.6e308])('every statistic of values near %d is right or refused, never an overflow', (size) => {
    const plain = everything(1)
    let refused = 0
    everything(size).forEach((statistic, k) => {
      try {
        close(statistic()[0], plain[k]?.()[0] ?? 0, 8)
        expect(Number.isFinite(statistic()[1])).toBe(true)
      } catch (error) {
        if (!(error instanceof RangeError)) throw error
        refused += 1
      }
    })
    expect(refused).toBeGreaterThan(20)
  })

  test('values that are not finite are refused', () => {
    for (const wrong of [Number.NaN, Infinity, -Infinity]) {
      const values = [1, wrong, 2, 3]
      for (const statistic of [() => mean(values), () => median(values), () => standardDeviation(values), () => oneWay([values, [1, 2]]), () => fitPolynomial({ x: values, y: [1, 2, 3, 4], degree: 1 }), () => fitPolynomial({ x: [1, 2, 3, 4], y: values, degree: 1 }), () => grubbs(values), () => roundHalfUp(wrong, 1)]) {
        expect(statistic, `${wrong}: ${statistic.toString()}`).toThrow(RangeError)
      }
    }
  })

  test('a tail too small for 1 − p is still above zero', () => {
    expect(fisherUpperTail(400, 2, 60)).toBeGreaterThan(0)
    expect(oneWay([[1, 1.001, 0.999], [9, 9.001, 8.999], [5, 5.001, 4.999]]).probability).toBeGreaterThan(0)
  })

  test('refusals name what is missing', () => {
    expect(() => fitPolynomial({ x: [1, 2, 3], y: [1, 2], degree: 1 })).toThrow(/as many responses/)
    expect(() => fitPolynomial({ x: [1, 2, 3], y: [1, 2, 3], weights: [1, 1], degree: 1 })).toThrow(/as many weights/)
    expect(() => coefficientInterval(fitPolynomial({ x: [1, 2, 3], y: [1, 2, 3.1], degree: 1, throughZero: true }), 0, 0.95)).toThrow(/no coefficient/)
    expect(() => inversePredict({ coefficients: [0, 1, 1, 1] }, 1, { low: 0, high: 1 })).toThrow(/line or a parabola/)
    expect(() => inversePredictionStandardError(fitPolynomial({ x: [1, 2, 3, 4], y: [1, 4, 9, 16.1], degree: 2 }), 4, 1)).toThrow(/straight line/)
    expect(() => fiellerInterval(fitPolynomial({ x: [1, 2, 3, 4], y: [1, 3, 1.2, 2.5], degree: 1 }), 2, 1, 0.95)).toThrow(/not significant/)
    expect(() => noncentralStudentDelta(5, 0.5, 0.5)).toThrow(/error rates/)
    expect(() => alternatingBlocks([0, 1, 2, 3].map((order) => ({ condition: 0, mean: order ** 2, order })), 0.95)).toThrow(/two conditions/)
    expect(() => alternatingBlocks([0, 0, 0, 1, 1, 1].map((condition) => ({ condition, mean: condition + 1, order: condition })), 0.95)).toThrow(/apart from/)
    expect(() => modifiedLargeSampleIntervalOf([{ coefficient: -1, meanSquare: 1, df: 2 }], 0.95)).toThrow(/at least zero/)
    expect(() => satterthwaite([{ coefficient: 1, meanSquare: 0, df: 2 }])).toThrow(/not above zero/)
    expect(() => meanInterval([1], 0.95)).toThrow(/two values/)
    expect(() => horwitzRatio(2, 2)).toThrow(/mass fraction/)
    expect(() => studentQuantile(1.2, 5)).toThrow(RangeError)
    expect(() => chiSquareQuantile(0.5, -1)).toThrow(RangeError)
    expect(() => normalQuantile(0)).toThrow(RangeError)
    expect(() => roundSignificant(1.5, 0, 'half up')).toThrow(/one significant digit/)
    expect(() => decimalsOf('five')).toThrow(/not the text/)
    expect(summary([-1, 1]).relativeStandardDeviation).toBeUndefined()
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
