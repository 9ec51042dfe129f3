// Accuracy with awkward designs: what stands for a level, what a run is, and which unspiked sample belongs to which result.
import { describe, expect, test } from 'vitest'
import { checkSmallStudy, troubleOf, verdictsOf } from '../support/small-study.ts'

const body = (columns: string, options: string): string => `data:
  spikes: { files: [spikes.csv], columns: { ${columns}, result: Found } }
characteristics:
  accuracy: { data: spikes, ${options} }
`

describe('a censored result makes its level not evaluable, whichever column tells the level', () => {
  const rows = '0.1,0.098\n0.1,<0.05\n0.1,0.102\n1,0.99\n1,1.02\n1,1.00\n'

  test.each([
    ['level', 'require: { recovery: between 90 % and 110 % }', 'recovery'],
    ['added', 'require: { recovery: between 90 % and 110 % }', 'recovery'],
    ['reference', 'mode: bias, require: { bias-relative: at most 10 % }', 'bias-relative'],
  ])('%s', (field, options, metric) => {
    const checked = checkSmallStudy(body(`${field}: Amount`, options), { 'spikes.csv': `Amount,Found\n${rows}` })
    expect(verdictsOf(checked)).toEqual({ [`accuracy/substance/${metric}@0.1`]: 'not evaluable', [`accuracy/substance/${metric}@1`]: 'meets' })
    expect(checked.record?.findings.filter((each) => each.level === 0.1)).toEqual([])
  })
})

describe('results nested in runs', () => {
  const study = (rows: string, columns = 'level: Level, day: Day'): ReturnType<typeof checkSmallStudy> =>
    checkSmallStudy(body(columns, 'runs: day, require: { recovery: between 90 % and 110 % }'), { 'spikes.csv': `Level,Day,Found\n${rows}` })

  test('the interval rests on the runs even where their results do not scatter', () => {
    const finding = study('1,a,0.98\n1,a,0.98\n1,b,1.02\n1,b,1.02\n1,c,1.01\n1,c,1.01\n').record?.findings.find((each) => each.id === 'accuracy/substance/recovery@1')
    // By hand: run means 98, 102, 101; standard deviation 2.0817; 100.333 ± 4.3027 (Student t, 2 degrees of freedom, printed tables) × 2.0817/√3.
    expect(finding?.df).toBe(2)
    expect(finding?.interval?.low).toBeCloseTo(95.16, 2)
    expect(finding?.interval?.high).toBeCloseTo(105.50, 2)
  })

  test('a single run is named as such', () => {
    expect(study('1,a,0.98\n1,a,0.99\n1,a,1.02\n').record?.findings.find((each) => each.metric === 'recovery')?.interval?.method).toBe('Student t within the only run')
  })

  test('a run field that is not mapped is refused', () => {
    expect(troubleOf(study('1,a,0.98\n1,a,0.99\n', 'level: Level'))).toEqual(['assess/missing-field: `accuracy` names the run field `day`, which dataset `spikes` does not map'])
  })

  test('a result that does not tell its run is refused, at its cell', () => {
    const { diagnostics, record } = study('1,a,0.98\n1,a,0.99\n1,,1.02\n1,b,1.01\n')
    expect(record).toBeUndefined()
    expect(diagnostics.map((each) => [each.code, each.place?.file, each.place?.line])).toEqual([['assess/missing-field', 'spikes.csv', 4]])
  })
})

describe('unspiked samples', () => {
  const study = (spikedColumns: string, options: string): ReturnType<typeof checkSmallStudy> => checkSmallStudy(`data:
  spikes: { files: [spikes.csv], columns: { level: Level, ${spikedColumns}result: Found } }
  unspiked: { files: [unspiked.csv], columns: { water: Water, result: Found } }
characteristics:
  accuracy: { data: spikes, native: unspiked, ${options}require: { recovery: between 90 % and 110 % } }
`, { 'spikes.csv': 'Water,Level,Found\nA,10,11.0\nA,10,11.2\nB,10,10.1\nB,10,10.3\n', 'unspiked.csv': 'Water,Found\nA,1.0\nA,1.1\nB,0.1\nB,0.2\n' })

  test('those of several waters that are pooled are told', () => {
    expect(study('water: Water, ', '').diagnostics.map((each) => each.message)).toContain('The native content of `substance` is the mean of all 4 results of dataset `unspiked`, over every water')
  })

  test('nothing is told where each water has its own', () => {
    const checked = study('water: Water, ', 'native-by: water, ')
    expect(checked.diagnostics).toEqual([])
    // By hand: (11.1 − 1.05) and (10.2 − 0.15) of 10 mg/L added.
    expect(checked.record?.findings.find((each) => each.metric === 'recovery')?.value).toBeCloseTo(100.5, 10)
  })

  test('a field that only one of the two datasets maps is refused', () => {
    expect(troubleOf(study('', 'native-by: water, '))).toEqual(['assess/missing-field: `accuracy` names the native field `water`, which dataset `spikes` does not map'])
  })
})
