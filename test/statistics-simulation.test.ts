// Seeded simulation: intervals cover what they claim, and the comparison of alternating blocks keeps its error rate under a drift of several
// standard deviations, where pairing neighbours or comparing block means by Welch does not.
import { describe, expect, test } from 'vitest'
import { alternatingBlocks } from '../src/statistics/alternating-blocks.ts'
import { pairedT, welch } from '../src/statistics/compare.ts'
import { meanInterval, standardDeviation, standardDeviationInterval } from '../src/statistics/describe.ts'
import { studentQuantile } from '../src/statistics/distributions.ts'
import { noncentralStudentDelta } from '../src/statistics/noncentral-student.ts'
import { coefficientInterval, fitPolynomial, inversePredictionStandardError } from '../src/statistics/regression.ts'
import { modifiedLargeSampleInterval, nestedMeanInterval, oneWay, satterthwaiteInterval, intermediateTerms } from '../src/statistics/variance-components.ts'
import { seededRandom } from './support/seeded-random.ts'

const trials = 4000
/** Four standard errors of a share near 95 % in 4 000 trials: a right interval fails once in 16 000 runs of other seeds. */
const monteCarlo = 4 * Math.sqrt((0.95 * 0.05) / trials)

function share(seed: number, once: (random: ReturnType<typeof seededRandom>) => boolean): number {
  const random = seededRandom(seed)
  let hits = 0
  for (let trial = 0; trial < trials; trial += 1) if (once(random)) hits += 1
  return hits / trials
}

const inside = (interval: { readonly low: number; readonly high: number }, truth: number): boolean => interval.low <= truth && truth <= interval.high

describe('95 % intervals cover the truth in 95 % of trials', () => {
  test.each([3, 6, 20])('mean and standard deviation of %i values', (n) => {
    expect(Math.abs(share(1 + n, (random) => inside(meanInterval(Array.from({ length: n }, () => 10 + 2 * random.normal()), 0.95), 10)) - 0.95)).toBeLessThan(monteCarlo)
    expect(Math.abs(share(50 + n, (random) => inside(standardDeviationInterval(standardDeviation(Array.from({ length: n }, () => 10 + 2 * random.normal())), n - 1, 0.95), 2)) - 0.95)).toBeLessThan(monteCarlo)
  })

  test.each([[[3, 3, 3, 3, 3, 3], 'balanced'], [[2, 5, 3, 6, 2, 4], 'unbalanced']] as const)('intermediate precision, runs of %j (%s): modified large sample', (sizes, _) => {
    const truth = Math.sqrt(1 + 1.5 ** 2)
    const covered = share(7, (random) => {
      const anova = oneWay(sizes.map((size) => {
        const run = 1.5 * random.normal()
        return Array.from({ length: size }, () => 50 + run + random.normal())
      }))
      return inside(modifiedLargeSampleInterval(anova, 0.95), truth)
    })
    // The method is approximate: slightly wide is its known side.
    expect(covered).toBeGreaterThan(0.95 - monteCarlo - 0.01)
    expect(covered).toBeLessThan(0.985)
  })

  test.each([0, 0.5])('the same where many estimates of the component between runs are negative (true value %d)', (between) => {
    const truth = Math.sqrt(1 + between ** 2)
    let truncated = 0
    const covered = share(18, (random) => {
      const anova = oneWay(Array.from({ length: 6 }, () => {
        const run = between * random.normal()
        return Array.from({ length: 3 }, () => 50 + run + random.normal())
      }))
      if (anova.truncated) truncated += 1
      return inside(modifiedLargeSampleInterval(anova, 0.95), truth)
    })
    expect(truncated).toBeGreaterThan(trials / 5)
    expect(covered).toBeGreaterThan(0.95 - monteCarlo - 0.01)
    expect(covered).toBeLessThan(0.985)
  })

  test('Satterthwaite’s interval is not far off either, and that of the mean of nested results holds', () => {
    const draw = (random: ReturnType<typeof seededRandom>): ReturnType<typeof oneWay> => oneWay(Array.from({ length: 6 }, () => {
      const run = 1.5 * random.normal()
      return Array.from({ length: 3 }, () => 50 + run + random.normal())
    }))
    expect(share(8, (random) => inside(satterthwaiteInterval(intermediateTerms(draw(random)), 0.95), Math.sqrt(3.25)))).toBeGreaterThan(0.9)
    expect(Math.abs(share(9, (random) => inside(nestedMeanInterval(draw(random), 0.95), 50)) - 0.95)).toBeLessThan(monteCarlo)
  })

  test('slope of a line, weighted and not, and a level read back', () => {
    const x = [1, 1, 2, 2, 5, 5, 10, 10]
    expect(Math.abs(share(10, (random) => inside(coefficientInterval(fitPolynomial({ x, y: x.map((level) => 3 + 2 * level + 0.4 * random.normal()), degree: 1 }), 1, 0.95), 2)) - 0.95)).toBeLessThan(monteCarlo)
    expect(Math.abs(share(11, (random) => inside(coefficientInterval(fitPolynomial({ x, y: x.map((level) => 3 + 2 * level + 0.04 * level * random.normal()), weights: x.map((level) => 1 / level ** 2), degree: 1 }), 1, 0.95), 2)) - 0.95)).toBeLessThan(monteCarlo)
    expect(Math.abs(share(12, (random) => {
      const fit = fitPolynomial({ x, y: x.map((level) => 3 + 2 * level + 0.1 * random.normal()), degree: 1 })
      const response = 3 + 2 * 4 + 0.1 * random.normal()
      const found = (response - (fit.coefficients[0] ?? 0)) / (fit.coefficients[1] ?? 1)
      return Math.abs(found - 4) <= studentQuantile(0.975, fit.df) * inversePredictionStandardError(fit, response, 1)
    }) - 0.95)).toBeLessThan(monteCarlo)
  })
})

describe('alternating blocks under a drift of several standard deviations, no effect', () => {
  const readings = 4
  const blocks = 8
  const drift = 1.2 // standard deviations of a block mean per block: ten over the whole sequence

  function draw(random: ReturnType<typeof seededRandom>, effect: number): readonly { readonly condition: number; readonly mean: number; readonly order: number }[] {
    return Array.from({ length: blocks }, (_, order) => {
      const condition = order % 2
      return { condition, order, mean: 100 + drift * order + condition * effect + random.normal() / Math.sqrt(readings) }
    })
  }

  test('the model with drift finds an effect in 5 % of trials', () => {
    expect(Math.abs(share(13, (random) => (alternatingBlocks(draw(random, 0), 0.95).effects[0]?.probability ?? 1) < 0.05) - 0.05)).toBeLessThan(monteCarlo)
  })

  test('pairing neighbours finds one far too often, Welch on block means hardly ever: neither is used', () => {
    const of = (found: ReturnType<typeof draw>, condition: number): readonly number[] => found.filter((block) => block.condition === condition).map((block) => block.mean)
    expect(share(14, (random) => { const found = draw(random, 0); return pairedT(of(found, 1), of(found, 0), 0.95).probability < 0.05 })).toBeGreaterThan(0.3)
    expect(share(15, (random) => { const found = draw(random, 0); return welch(of(found, 1), of(found, 0), 0.95).probability < 0.05 })).toBeLessThan(0.01)
  })

  test('a real effect is estimated without bias', () => {
    const random = seededRandom(16)
    const estimates = Array.from({ length: trials }, () => alternatingBlocks(draw(random, 0.7), 0.95).effects[0]?.difference ?? 0)
    expect(Math.abs(estimates.reduce((total, each) => total + each, 0) / trials - 0.7)).toBeLessThan(4 * standardDeviation(estimates) / Math.sqrt(trials))
  })
})

test('at the minimum detectable value a net signal is missed with probability beta', () => {
  const [df, alpha, beta] = [8, 0.05, 0.05]
  const detectable = noncentralStudentDelta(df, alpha, beta)
  const critical = studentQuantile(1 - alpha, df)
  const missed = share(17, (random) => {
    const spread = standardDeviation(Array.from({ length: df + 1 }, () => random.normal()))
    return detectable + random.normal() <= critical * spread
  })
  expect(Math.abs(missed - beta)).toBeLessThan(4 * Math.sqrt((beta * (1 - beta)) / trials))
})
