// Verdicts of accuracy, precision and linearity by level → the longest interval of tested levels at which all that is required is met.
// It never extrapolates: its ends are tested levels, and a failing inner level splits it.
import type { AssessInput, AssessOutput } from '../../assess/assessment-part.ts'
import type { Evidence, Finding, NotEvaluable } from '../../assess/finding.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { acceptedFit, longestInterval, type Priors, type RangeLevel, rangeLevels } from './levels.ts'
import type { RangeOptions } from './options.ts'

export interface RangeDetail {
  readonly levels: readonly RangeLevel[]
  readonly tolerance: number
  readonly low?: number
  readonly high?: number
  readonly claim?: { readonly low: number; readonly high: number }
  readonly fitLow?: number
  readonly fitHigh?: number
}

const metrics = ['range-low', 'range-high']

export function assessRange(input: AssessInput<RangeOptions>): AssessOutput<RangeDetail> {
  const { options, place } = input.block
  const tolerance = options['level-tolerance']
  const priors: Priors = { accuracy: input.prior('accuracy'), precision: input.prior('precision'), linearity: input.prior('linearity') }
  const nothing = (because: string, diagnostics: readonly Diagnostic[], detail?: RangeDetail): AssessOutput<RangeDetail> => ({
    detail, findings: [], notEvaluable: metrics.map((metric): NotEvaluable => ({ metric, because })), design: { levels: (detail?.levels ?? []).filter(isShared).length }, diagnostics,
  })
  const told = (because: string, expected: string, mend: string): readonly Diagnostic[] => [diagnostic('assess/too-few-values', `The range of \`${input.measurand.id}\` cannot be shown: ${because}`, { place, actual: because, expected, mend })]
  const absent = Object.entries(priors).filter(([, prior]) => prior.length === 0).map(([name]) => name)
  if (absent.length > 0) {
    const because = `there is no ${absent.join(' and no ')}`
    return nothing(because, told(because, 'linearity, accuracy and precision of the same measurand', `Add ${absent.join(' and ')} under \`characteristics:\`, or leave out \`range\``))
  }
  // Without a criterion nothing can be met: a range of levels that were only tested would claim more than was shown.
  const free = (['accuracy', 'precision'] as const).filter((name) => !priors[name].some((prior) => prior.verdicts.some((verdict) => verdict.required)))
  if (free.length > 0) {
    const because = `nothing is required of ${free.join(' and of ')}`
    return nothing(because, told(because, 'criteria that a level can meet', `State them under \`require:\` of ${free.join(' and ')}`))
  }
  const same = (left: number, right: number): boolean => left === right || Math.abs(left - right) <= tolerance * Math.max(Math.abs(left), Math.abs(right))
  const levels = rangeLevels(priors, same)
  const start: RangeDetail = {
    levels, tolerance, ...(options.claim === undefined ? {} : { claim: { low: options.claim.low.value, high: options.claim.high.value } }), ...acceptedFit(priors.linearity, same),
  }
  const empty = (['accuracy', 'precision'] as const).filter((name) => priors[name].every((prior) => prior.findings.length === 0))
  if (empty.length > 0) {
    const because = `${empty.join(' and ')} could not be evaluated at any level`
    return nothing(because, told(because, 'accuracy and precision that can be evaluated', `See what is said of ${empty.join(' and ')} of this measurand`), start)
  }
  if (!levels.some(isShared)) {
    const because = 'accuracy and precision share no tested level'
    return nothing(because, told(because, 'levels tested for both accuracy and precision', 'Test accuracy and precision at the same levels, or declare `level-tolerance`'), start)
  }
  const longest = longestInterval(levels)
  // The verdicts that are missed tell why; there is nothing wrong with the files.
  if (longest === undefined) return nothing('at no tested level is everything met that is required', [], start)
  const evidence = merged(Object.values(priors).flat().flatMap((prior) => prior.findings))
  const draft = { n: longest.levels, method: 'longest interval of tested levels at which accuracy, precision and linearity hold', source: 'ICH Q2(R2), 2023, section 3.2', evidence }
  return {
    detail: { ...start, low: longest.low, high: longest.high }, design: { levels: levels.filter(isShared).length }, diagnostics: [], notEvaluable: [],
    findings: [{ ...draft, metric: 'range-low', value: longest.low }, { ...draft, metric: 'range-high', value: longest.high }],
  }
}

function isShared({ accuracy, precision }: RangeLevel): boolean {
  return accuracy !== 'not tested' && precision !== 'not tested'
}

function merged(findings: readonly Finding[]): readonly Evidence[] {
  const rows = new Map<string, Set<number>>()
  for (const evidence of findings.flatMap((finding) => finding.evidence)) {
    const key = `${evidence.dataset}\u0000${evidence.field}`
    const known = rows.get(key) ?? new Set<number>()
    for (const row of evidence.rows) known.add(row)
    rows.set(key, known)
  }
  return [...rows].map(([key, set]) => {
    const [dataset = '', field = ''] = key.split('\u0000')
    return { dataset, field, rows: [...set].sort((left, right) => left - right) }
  })
}
