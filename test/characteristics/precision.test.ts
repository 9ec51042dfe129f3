// Precision with awkward designs: no value makes a run of its own because a cell is empty, and one reading of the runs is chosen.
import { describe, expect, test } from 'vitest'
import { checkSmallStudy, troubleOf, verdictsOf } from '../support/small-study.ts'

function study(options: string, rows: string, columns = 'day: Day, run: Run'): ReturnType<typeof checkSmallStudy> {
  return checkSmallStudy(`data:
  precision: { files: [results.csv], columns: { ${columns}, result: Found } }
characteristics:
  precision: { data: precision, ${options}, require: { intermediate-precision-rsd: at most 20 % } }
`, { 'results.csv': `Day,Run,Found\n${rows}` })
}

const twoDays = 'a,1,0.98\na,1,0.99\na,2,1.02\na,2,1.03\nb,1,1.01\nb,1,1.00\nb,2,0.97\nb,2,0.96\n'
const intermediate = 'precision/substance/intermediate-precision-rsd'

describe('runs', () => {
  test('a result without its run is refused, at its cell', () => {
    const { diagnostics, record } = study('runs: day', 'a,1,0.98\na,1,0.99\n,1,1.02\nb,1,1.01\nb,1,1.00\n,1,0.97\n')
    expect(record).toBeUndefined()
    expect(diagnostics.map((each) => [each.code, each.place?.file, each.place?.line])).toEqual([['assess/missing-field', 'results.csv', 4]])
  })

  test('a run field that is not mapped is refused', () => {
    expect(troubleOf(study('runs: [day, analyst]', twoDays))).toEqual(['assess/missing-field: `precision` names the run field `analyst`, which dataset `precision` does not map'])
  })

  test('runs and nested runs cannot both be asked for', () => {
    expect(troubleOf(study('runs: day, nested: [day, run]', twoDays))).toEqual(['definition/contradiction: `characteristics.precision` has both `runs` and `nested`'])
  })

  test('runs of the same name on two days are two runs', () => {
    // By hand: Σ within = 4 × 0.00005, over 4 degrees of freedom; as two runs over both days it would be far larger.
    const finding = study('nested: [day, run]', twoDays).record?.findings.find((each) => each.metric === 'repeatability-sd')
    expect(finding?.df).toBe(4)
    expect(finding?.value).toBeCloseTo(Math.sqrt(0.00005), 12)
  })
})

describe('too little for components is told, never thrown', () => {
  test.each([
    ['one run on each day', 'nested: [day, run]', 'a,1,0.98\na,1,0.99\nb,1,1.01\nb,1,1.00\n'],
    ['one result in each run', 'runs: day', 'a,1,0.98\nb,1,1.01\nc,1,0.97\n'],
    ['replicates that do not scatter', 'runs: day', 'a,1,0.98\na,1,0.98\nb,1,1.01\nb,1,1.01\n'],
    ['one result', 'runs: day', 'a,1,0.98\n'],
  ])('%s', (_name, options, rows) => {
    const checked = study(options, rows)
    expect(verdictsOf(checked)).toEqual({ [intermediate]: 'not evaluable' })
    expect(troubleOf(checked).map((each) => each.split(':')[0])).toEqual(['assess/too-few-values'])
  })

  test('one run gives repeatability and says why there is no more', () => {
    const { record } = study('runs: day', 'a,1,0.98\na,1,0.99\na,1,1.00\n')
    // By hand: the standard deviation of 0.98, 0.99, 1.00.
    expect(record?.findings.find((each) => each.metric === 'repeatability-sd')?.value).toBeCloseTo(0.01, 12)
    expect(record?.verdicts.map((each) => [each.verdict, each.because])).toEqual([['not evaluable', 'the data hold one run only']])
  })
})
