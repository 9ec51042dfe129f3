// Comparison: options that cannot be answered are refused before any data are read, and readings outside the comparison are told.
import { describe, expect, test } from 'vitest'
import { checkSmallStudy, troubleOf } from '../support/small-study.ts'

const rows = 'n,1,0.98\nn,1,0.99\nn,1,1.00\ns,2,1.02\ns,2,1.01\ns,2,1.03\n'

function study(options: string, text = rows): ReturnType<typeof checkSmallStudy> {
  return checkSmallStudy(`data:
  feeds: { files: [feeds.csv], columns: { feed: Feed, block: Block, result: Found } }
characteristics:
  comparison: { data: feeds, ${options} }
`, { 'feeds.csv': `Feed,Block,Found\n${text}` })
}

const two = 'conditions: { column: feed, reference: n, other: s }'

describe('questions that cannot be answered', () => {
  test.each([
    ['equivalence without a margin', `${two}, question: equivalence`, 'definition/missing-key: Expected key `margin` in `characteristics.comparison`: equivalence is shown within a margin'],
    ['a margin below zero', `${two}, question: equivalence, margin: -0.2 mg/L`, 'definition/wrong-type: Unexpected `-0.2` for `characteristics.comparison.margin`'],
    ['a margin of zero', `${two}, question: equivalence, margin: 0 mg/L`, 'definition/wrong-type: Unexpected `0` for `characteristics.comparison.margin`'],
    ['a margin in another unit, for a difference', `${two}, question: difference, margin: 200 µg/L`, 'definition/unit-mismatch: Unexpected unit of `200 µg/L` for `characteristics.comparison.margin`: it has the unit `µg/L`, and the results of `substance` have `mg/L`'],
    ['a condition against itself', 'conditions: { column: feed, reference: n, other: n }, question: difference', 'definition/contradiction: `characteristics.comparison` compares `n` with itself'],
    ['nothing to compare with', 'conditions: { column: feed, reference: n }, question: difference', 'definition/missing-key: Expected key `other` in `characteristics.comparison.conditions`'],
  ])('%s', (_name, options, message) => {
    const checked = study(options)
    expect(checked.record).toBeUndefined()
    expect(troubleOf(checked)).toEqual([message])
  })
})

describe('readings outside the comparison', () => {
  test('are told, with their conditions', () => {
    const checked = study(`${two}, question: difference`, `${rows}w,3,5.00\nw,3,5.10\n,3,9.00\n`)
    expect(checked.diagnostics.map((each) => [each.severity, each.message])).toEqual([['note', '3 readings of `substance` under `w`, no condition are no part of the comparison']])
    // By hand: 1.02 − 0.99.
    expect(checked.record?.findings.find((each) => each.metric === 'difference')?.value).toBeCloseTo(0.03, 12)
  })

  test('a reading that does not tell its block is refused, at its cell', () => {
    const { diagnostics } = study(`${two}, question: difference, design: alternating blocks`, 'n,1,0.98\ns,2,1.02\nn,3,0.99\ns,,1.01\nn,5,1.00\ns,6,1.03\n')
    expect(diagnostics.map((each) => [each.code, each.place?.file, each.place?.line])).toEqual([['assess/missing-field', 'feeds.csv', 5]])
  })

  test('a drift alone is no difference between conditions that alternate', () => {
    const drifting = Array.from({ length: 10 }, (_, index) => `${index % 2 === 0 ? 'n' : 's'},${index + 1},${(1 + 0.1 * index + (index % 3 === 0 ? 0.001 : -0.001)).toFixed(4)}\n`).join('')
    const found = study(`${two}, question: difference, design: alternating blocks`, drifting).record?.findings.find((each) => each.metric === 'difference')
    // The drift makes the plain means differ by 0.1, a hundred times the scatter of ±0.001.
    expect(Math.abs(found?.value ?? 1)).toBeLessThan(0.002)
    expect(found?.df).toBe(7)
  })
})
