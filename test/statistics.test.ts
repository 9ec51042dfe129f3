// Every certified case: published figures with their sources against what the program computes.
import { describe, expect, test } from 'vitest'
import { certifiedCases, compareCase } from './support/certified.ts'
import { certifiedStatistics } from './support/certified-statistics.ts'

describe.each(certifiedCases.map((each) => ({ each, name: `${each.id} (${each.source})` })))('$name', ({ each }) => {
  test(`agrees: ${each.agreement}`, () => {
    const compute = certifiedStatistics[each.statistic]
    if (compute === undefined) throw new Error(`nothing computes ${each.statistic}`)
    const comparisons = compareCase(each, compute(each.data))
    expect(comparisons.length).toBeGreaterThan(0)
    expect(comparisons.filter((comparison) => !comparison.agrees).map(({ path, published, found, digits }) => `${path}: published ${published}, found ${found} (${digits.toFixed(1)} digits)`)).toEqual([])
  })
})

test('every way of computing has a case', () => {
  expect(Object.keys(certifiedStatistics).filter((name) => !certifiedCases.some((each) => each.statistic === name))).toEqual([])
})
