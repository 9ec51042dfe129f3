// Verdicts of accuracy, precision and linearity by level → the longest interval of tested levels at which all that is required is met.
// It never extrapolates: its ends are tested levels, and a failing inner level splits it.
import type { AssessInput, AssessOutput, PriorAssessment } from '../../assess/assessment-part.ts'
import type { Evidence, Finding, NotEvaluable, Verdict, VerdictWord } from '../../assess/finding.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import type { RangeOptions } from './options.ts'

export interface RangeLevel {
  readonly level: number
  readonly accuracy: VerdictWord
  readonly precision: VerdictWord
  /** Inside the accepted range of the fit. */
  readonly linearity: VerdictWord
  readonly holds: boolean
}

export interface RangeDetail {
  readonly levels: readonly RangeLevel[]
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
  const [accuracy, precision, linearity] = ['accuracy', 'precision', 'linearity'].map((characteristic) => input.prior(characteristic)) as [readonly PriorAssessment[], readonly PriorAssessment[], readonly PriorAssessment[]]
  const nothing = (because: string, detail?: RangeDetail): AssessOutput<RangeDetail> => ({
    detail, findings: [], notEvaluable: metrics.map((metric): NotEvaluable => ({ metric, because })), design: { levels: detail?.levels.length ?? 0 },
    diagnostics: [diagnostic('assess/too-few-values', `The range of \`${input.measurand.id}\` cannot be shown: ${because}`, { place, actual: because, expected: 'levels tested for both accuracy and precision, inside the calibrated range', mend: 'Test accuracy and precision at the same levels, or declare `level-tolerance`' })],
  })
  const absent = [['accuracy', accuracy], ['precision', precision], ['linearity', linearity]].filter(([, prior]) => prior?.length === 0).map(([name]) => String(name))
  if (absent.length > 0) return nothing(`there is no ${absent.join(' and no ')}`)
  const same = (left: number, right: number): boolean => Math.abs(left - right) <= tolerance * Math.max(Math.abs(left), Math.abs(right))
  const tested = levelsOf(accuracy)
  const common = tested.filter((level) => levelsOf(precision).some((other) => same(level, other)))
  if (common.length === 0) return nothing('accuracy and precision share no tested level')
  const fit = fitRange(linearity)
  const levels = common.map((level): RangeLevel => {
    const words = {
      accuracy: wordAt(accuracy, level, same), precision: wordAt(precision, level, same),
      linearity: fit === undefined ? 'not evaluable' as const : level >= fit.low && level <= fit.high ? linearityWord(linearity, level) : 'misses' as const,
    }
    return { level, ...words, holds: Object.values(words).every((word) => word === 'meets' || word === 'information only') }
  })
  const longest = longestRun(levels)
  const claim = options.claim === undefined ? {} : { claim: { low: options.claim.low.value, high: options.claim.high.value } }
  const ends = fit === undefined ? {} : { fitLow: fit.low, fitHigh: fit.high }
  const [first, last] = [longest[0], longest.at(-1)]
  if (first === undefined || last === undefined) return nothing('no tested level meets everything that is required', { levels, ...claim, ...ends })
  const detail: RangeDetail = { levels, low: first.level, high: last.level, ...claim, ...ends }
  const evidence = merged([...accuracy, ...precision, ...linearity].flatMap((prior) => prior.findings))
  const draft = { n: longest.length, method: 'longest interval of tested levels at which accuracy, precision and linearity hold', source: 'ICH Q2(R2), 2023, section 3.2', evidence }
  return {
    detail, design: { levels: levels.length }, diagnostics: [], notEvaluable: [],
    findings: [{ ...draft, metric: 'range-low', value: first.level }, { ...draft, metric: 'range-high', value: last.level }],
  }
}

function levelsOf(prior: readonly PriorAssessment[]): readonly number[] {
  const levels = prior.flatMap((each) => [...each.findings, ...each.verdicts]).flatMap((each) => each.level ?? [])
  return [...new Set(levels)].sort((left, right) => left - right)
}

/** Gravest required verdict at a level; `information only` where nothing is required there. */
function wordAt(prior: readonly PriorAssessment[], level: number, same: (left: number, right: number) => boolean): VerdictWord {
  return gravest(prior.flatMap((each) => each.verdicts).filter((verdict) => verdict.required && verdict.level !== undefined && same(verdict.level, level)))
}

function gravest(verdicts: readonly Verdict[]): VerdictWord {
  if (verdicts.some((verdict) => verdict.verdict === 'misses')) return 'misses'
  if (verdicts.some((verdict) => verdict.verdict === 'not evaluable')) return 'not evaluable'
  return verdicts.length === 0 ? 'information only' : 'meets'
}

/**
 * The accepted range of the fit: from the lowest to the highest standard whose own criteria hold, shrunk from both ends; a `straight-to`
 * below the highest level ends it where the study requires one.
 */
function fitRange(linearity: readonly PriorAssessment[]): { readonly low: number; readonly high: number } | undefined {
  const levels = levelsOf(linearity).filter((level) => level > 0)
  const good = levels.filter((level) => linearityWord(linearity, level) !== 'misses')
  const [low, high] = [good[0], good.at(-1)]
  return low === undefined || high === undefined ? undefined : { low, high }
}

/** Criteria of a standard at exactly this level; between standards the fit is accepted when the standards around it are. */
function linearityWord(linearity: readonly PriorAssessment[], level: number): VerdictWord {
  const verdicts = linearity.flatMap((each) => each.verdicts).filter((verdict) => verdict.required && verdict.level !== undefined)
  const levels = [...new Set(verdicts.map((verdict) => verdict.level ?? 0))].sort((left, right) => left - right)
  const around = levels.includes(level) ? [level] : [levels.filter((each) => each < level).at(-1), levels.find((each) => each > level)].filter((each) => each !== undefined)
  return gravest(verdicts.filter((verdict) => around.includes(verdict.level ?? 0)))
}

function longestRun(levels: readonly RangeLevel[]): readonly RangeLevel[] {
  let best: readonly RangeLevel[] = []
  let current: RangeLevel[] = []
  for (const level of levels) {
    current = level.holds ? [...current, level] : []
    const length = (run: readonly RangeLevel[]): number => (run.at(-1)?.level ?? 0) - (run[0]?.level ?? 0)
    if (current.length > 0 && (best.length === 0 || length(current) > length(best))) best = current
  }
  return best
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
