// The range is a rule over verdicts, so its cases are verdicts by level and the interval that follows. Source of the rule: ICH Q2(R2),
// 2023, section 3.2 (accuracy, precision and response all suitable over the range); splitting at a failing inner level and ending at
// tested levels are the project's own strict reading of it. Every expected interval is read off the verdicts by hand.
import { describe, expect, test } from 'vitest'
import type { PriorAssessment } from '../../src/assess/assessment-part.ts'
import type { Finding, Verdict, VerdictWord } from '../../src/assess/finding.ts'
import { range } from '../../src/characteristics/range/index.ts'
import type { RangeOptions } from '../../src/characteristics/range/options.ts'
import type { Reading } from '../../src/definition/fields.ts'
import type { Diagnostic } from '../../src/diagnostics/diagnostic.ts'

const place = { file: 'study.yaml', line: 1, column: 1 }

/** Level → verdicts there: `+` meets, `-` misses, `?` not evaluable, `.` tested and nothing required. `all` has no level. */
type Said = Readonly<Record<string, '+' | '-' | '?' | '.'>>

interface Case {
  readonly name: string
  readonly accuracy?: Said
  readonly precision?: Said
  readonly linearity?: Said | readonly Said[]
  /** Value found for `straight-to`, and the verdict on it. */
  readonly straightTo?: readonly [number, '+' | '-']
  readonly tolerance?: number
  readonly expected: readonly [number, number] | string
}

const words: Readonly<Record<string, VerdictWord>> = { '+': 'meets', '-': 'misses', '?': 'not evaluable' }
const good = { 1: '+', 2: '+', 5: '+', 10: '+' } as const

const cases: readonly Case[] = [
  { name: 'everything holds', expected: [1, 10] },
  { name: 'the lowest level fails for accuracy', accuracy: { ...good, 1: '-' }, expected: [2, 10] },
  { name: 'the highest level fails for precision', precision: { ...good, 10: '-' }, expected: [1, 5] },
  { name: 'an inner level fails and the wider part remains', accuracy: { ...good, 2: '-' }, expected: [5, 10] },
  { name: 'an inner level is not evaluable', precision: { ...good, 5: '?' }, expected: [1, 2] },
  { name: 'of two equally wide parts the lower one counts', accuracy: { 1: '+', 2: '+', 3: '-', 4: '+', 5: '+' }, precision: { 1: '+', 2: '+', 3: '+', 4: '+', 5: '+' }, linearity: { 1: '+', 5: '+' }, expected: [1, 2] },
  { name: 'one level alone', accuracy: { 5: '+' }, expected: [5, 5] },
  { name: 'ends are tested for both', accuracy: { 1: '+', 2: '+', 5: '+' }, precision: { 2: '+', 5: '+', 10: '+' }, expected: [2, 5] },
  { name: 'a level tested for one only does not split while it meets', accuracy: good, precision: { 1: '+', 10: '+' }, expected: [1, 10] },
  { name: 'a level tested for one only splits when it misses', accuracy: { ...good, 5: '-' }, precision: { 1: '+', 2: '+', 10: '+' }, expected: [1, 2] },
  { name: 'a failing standard between tested levels splits', accuracy: { 1: '+', 5: '+', 10: '+' }, precision: { 1: '+', 5: '+', 10: '+' }, linearity: { ...good, 2: '-' }, expected: [5, 10] },
  { name: 'the lowest standard fails', linearity: { ...good, 1: '-' }, expected: [2, 10] },
  { name: 'a tested level beside a failing standard is not accepted', accuracy: { 1.5: '+', 5: '+', 10: '+' }, precision: { 1.5: '+', 5: '+', 10: '+' }, linearity: { 1: '-', 2: '+', 10: '+' }, expected: [5, 10] },
  { name: 'a tested level between two good standards is accepted', accuracy: { 1.5: '+', 7: '+' }, precision: { 1.5: '+', 7: '+' }, expected: [1.5, 7] },
  { name: 'levels beyond the standards are never reached', linearity: { 2: '+', 5: '+' }, expected: [2, 5] },
  { name: 'standards without criteria still bound the range', linearity: { 2: '.', 5: '.', 10: '.' }, expected: [2, 10] },
  { name: 'a standard at zero has no relative error and no say', linearity: { 0: '?', ...good }, expected: [1, 10] },
  { name: 'a missed criterion without level speaks of every level', linearity: { ...good, all: '-' }, expected: 'at no tested level is everything met that is required' },
  { name: 'a missed overall recovery speaks of every level', accuracy: { ...good, all: '-' }, expected: 'at no tested level is everything met that is required' },
  { name: 'a met criterion without level is enough', accuracy: { 1: '.', 5: '.', all: '+' }, expected: [1, 5] },
  { name: 'the range ends where the line is required to be straight', straightTo: [5, '-'], expected: [1, 5] },
  { name: 'two calibrations, each over its part', linearity: [{ 1: '+', 2: '+' }, { 2: '+', 10: '+' }], expected: [1, 10] },
  { name: 'two calibrations that leave a gap', linearity: [{ 1: '+', 2: '+' }, { 6: '+', 10: '+' }], accuracy: { 1: '+', 2: '+', 5: '+', 10: '+' }, expected: [1, 2] },
  { name: 'a calibration that gave nothing', linearity: {}, expected: 'at no tested level is everything met that is required' },
  { name: 'levels match exactly unless said otherwise', accuracy: { 1: '+', 10: '+' }, precision: { 1.01: '+', 10.1: '+' }, linearity: { 0.5: '+', 20: '+' }, expected: 'accuracy and precision share no tested level' },
  { name: 'matched levels end the range at the innermost of them', accuracy: { 1: '+', 10.1: '+' }, precision: { 1.01: '+', 10: '+' }, linearity: { 0.5: '+', 20: '+' }, tolerance: 0.02, expected: [1.01, 10] },
  { name: 'a level matched to the highest standard does not reach beyond it', accuracy: { 1: '+', 10.1: '+' }, precision: { 1: '+', 10.1: '+' }, tolerance: 0.02, expected: [1, 10] },
  { name: 'accuracy without criteria', accuracy: { 1: '.', 10: '.' }, expected: 'nothing is required of accuracy' },
  { name: 'neither has criteria', accuracy: { 1: '.' }, precision: { 1: '.' }, expected: 'nothing is required of accuracy and of precision' },
  { name: 'no precision at all', precision: {}, expected: 'there is no precision' },
]

describe('range', () => {
  test.each(cases)('$name', ({ accuracy = good, precision = good, linearity = good, straightTo, tolerance = 0, expected }) => {
    const fits = Array.isArray(linearity) ? (linearity as readonly Said[]) : [linearity as Said]
    const output = assessed({
      accuracy: [prior('accuracy', 'recovery', accuracy)], precision: Object.keys(precision).length === 0 ? [] : [prior('precision', 'repeatability-rsd', precision)],
      linearity: fits.map((said) => withStraightTo(prior('linearity', 'back-calculation-error', said), straightTo)),
    }, { 'level-tolerance': tolerance, claim: undefined })
    if (typeof expected === 'string') expect(output.notEvaluable.map((each) => each.because)).toEqual([expected, expected])
    else expect(output.findings.map((each) => each.value)).toEqual(expected)
  })

  test('tells a lack in the files, and leaves a missed criterion to its verdict', () => {
    const priors = { accuracy: [prior('accuracy', 'recovery', { 1: '-' })], precision: [prior('precision', 'repeatability-rsd', { 1: '+' })], linearity: [prior('linearity', 'back-calculation-error', good)] }
    expect(assessed(priors).diagnostics).toEqual([])
    expect(assessed({ ...priors, precision: [] }).diagnostics.map((each) => each.code)).toEqual(['assess/too-few-values'])
  })

  test('rests on every cell that its verdicts rest on', () => {
    const output = assessed({ accuracy: [prior('accuracy', 'recovery', good)], precision: [prior('precision', 'repeatability-rsd', good)], linearity: [prior('linearity', 'back-calculation-error', good)] })
    expect(output.findings[0]?.evidence.map((each) => `${each.dataset} ${each.rows.join(',')}`)).toEqual(['accuracy 1,2,5,10', 'precision 1,2,5,10', 'linearity 1,2,5,10'])
  })
})

describe('claim', () => {
  test('becomes two criteria', () => {
    const options = read('0.10 mg/L to 20 mg/L').value
    if (options === undefined) throw new Error('no options')
    expect(range.impliedCriteria?.(options).map((each) => `${each.metric} ${each.text}`)).toEqual(['range-low at most 0.10 mg/L', 'range-high at least 20 mg/L'])
  })

  test.each(['0.1 to 20 mg/L', '0.1 mg/L to 20 µg/L', '20 mg/L to 0.1 mg/L', '5 mg/L to 5 mg/L', '0,1 mg/L to 20 mg/L', 'up to 20 mg/L', '20 mg/L'])('%s is refused', (typed) => {
    const { value, diagnostics } = read(typed)
    expect(value).toBeUndefined()
    expect(diagnostics.map((each) => each.severity)).toEqual(['error'])
  })
})

function prior(characteristic: string, metric: string, said: Said): PriorAssessment {
  const about = (level: string): Pick<Verdict, 'finding' | 'measurand' | 'characteristic' | 'block' | 'metric'> & { level?: number } =>
    ({ finding: `${characteristic}/x/${metric}@${level}`, measurand: 'x', characteristic, block: characteristic, metric, ...(level === 'all' ? {} : { level: Number(level) }) })
  const entries = Object.entries(said)
  return {
    block: characteristic, detail: {},
    findings: entries.filter(([level, mark]) => level !== 'all' && mark !== '?').map(([level]): Finding => ({
      ...about(level), id: about(level).finding, value: 1, unit: '%', method: 'given', source: 'given', evidence: [{ dataset: characteristic, field: 'result', rows: [Number(level)] }],
    })),
    verdicts: entries.filter(([, mark]) => mark !== '.').map(([level, mark]) => verdict(about(level), words[mark] ?? 'not evaluable')),
  }
}

function verdict(about: Pick<Verdict, 'finding' | 'measurand' | 'characteristic' | 'block' | 'metric' | 'level'>, word: VerdictWord): Verdict {
  return { ...about, criterion: 'at most 5 %', limit: { kind: 'at most', bound: { value: 5, unit: '%', text: '5' } }, decideBy: 'estimate', verdict: word, required: true }
}

function withStraightTo(given: PriorAssessment, straightTo: Case['straightTo']): PriorAssessment {
  if (straightTo === undefined) return given
  const about = { finding: 'linearity/x/straight-to', measurand: 'x', characteristic: 'linearity', block: 'linearity', metric: 'straight-to' }
  return {
    ...given, findings: [...given.findings, { ...about, id: about.finding, value: straightTo[0], unit: 'mg/L', method: 'given', source: 'given', evidence: [] }],
    verdicts: [...given.verdicts, verdict(about, words[straightTo[1]] ?? 'not evaluable')],
  }
}

type Priors = Readonly<Record<'accuracy' | 'precision' | 'linearity', readonly PriorAssessment[]>>

function assessed(priors: Priors, options: RangeOptions = { 'level-tolerance': 0, claim: undefined }): ReturnType<typeof range.assess> {
  return range.assess({
    block: { id: 'range', characteristic: 'range', measurands: ['x'], options, decideBy: 'estimate', criteria: [], place }, measurand: { id: 'x', name: 'x', unit: 'mg/L', place }, confidence: 0.95,
    responses: () => undefined, results: () => undefined, observations: () => [], prior: (characteristic) => priors[characteristic as keyof Priors],
  })
}

function read(claim: string): { readonly value: RangeOptions | undefined; readonly diagnostics: readonly Diagnostic[] } {
  const diagnostics: Diagnostic[] = []
  const reading: Reading = { path: 'characteristics.range', report: (found) => diagnostics.push(found), took: () => undefined }
  const value = range.options.read({ kind: 'map', place, entries: [{ key: 'claim', keyPlace: place, value: { kind: 'scalar', text: claim, quoted: false, value: claim, place } }] }, reading)
  return { value, diagnostics }
}
