// Limits as a multiple of a standard deviation over the slope. Which standard deviation it is (of blanks, of residuals, of one intercept,
// of several intercepts) changes the limit several-fold, so each is its own definition; neither 3 s nor 3.3 s states a risk of missing.
import type { Evidence, FindingDraft } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean, standardDeviation, standardDeviationInterval } from '../../statistics/describe.ts'
import { fitPolynomial } from '../../statistics/regression.ts'
import type { CalibrationLine } from './calibration-line.ts'
import type { LineDetail } from './detail.ts'
import { blankProblem, limitsFound, nothingFound, type Outcome, type Setting } from './outcome.ts'

const quantitationFactor = 10

const scatterKinds = {
  'blank scatter': 'standard deviation of blanks',
  'calibration scatter': 'residual standard deviation of the calibration line',
  'intercept standard error': 'standard error of the intercept of one calibration line',
  'intercept scatter': 'standard deviation of the intercepts of several calibration lines',
} as const

type ScatterDefinition = keyof typeof scatterKinds

interface Scatter {
  readonly definition: ScatterDefinition
  readonly value: number
  readonly unit: 'response' | 'measurand'
  /** The scatter in the unit of the measurand: over the slope, dilution included. */
  readonly concentration: number
  readonly slope?: number | undefined
  readonly n: number
  readonly df: number
  readonly evidence: readonly Evidence[]
}

/** Square root of 1/m + 1/n_b: the scatter of a mean of m measurements from which a mean of n_b blanks is subtracted. */
export function netFactorOf(setting: Setting): number {
  const subtracted = setting.options['blank-replicates']
  return Math.sqrt(1 / setting.options['sample-replicates'] + (subtracted === undefined ? 0 : 1 / subtracted))
}

export function blankScatter(setting: Setting): Outcome {
  const { blanks, calibration } = setting
  const because = blankProblem(setting, 'blank scatter')
  if (because !== undefined || blanks?.concentrations === undefined) return nothing(setting, 'blank scatter', because ?? 'no blanks')
  const slope = blanks.quantity === 'response' ? calibration.line?.detail.slope : undefined
  return limits(setting, {
    definition: 'blank scatter', value: standardDeviation(blanks.values), unit: blanks.quantity === 'response' ? 'response' : 'measurand',
    concentration: standardDeviation(blanks.concentrations), n: blanks.values.length, df: blanks.values.length - 1,
    evidence: [...evidenceOf(blanks.measurements), ...(slope === undefined ? [] : calibration.line?.evidence ?? [])], ...(slope === undefined ? {} : { slope }),
  })
}

export function calibrationScatter(setting: Setting, definition: 'calibration scatter' | 'intercept standard error'): Outcome {
  const { line, because } = setting.calibration
  if (line === undefined) return nothing(setting, definition, because ?? 'no calibration')
  if (line.isExact) return nothing(setting, definition, 'the calibration line has no scatter', 'degenerate')
  const { own } = line.detail
  const value = definition === 'calibration scatter' ? own.residualStandardDeviation : own.interceptStandardError
  noteWideRange(setting, line)
  return limits(setting, { definition, value, unit: 'response', concentration: value / Math.abs(own.slope), slope: own.slope, n: own.n, df: own.df, evidence: line.evidence })
}

export type Curves = NonNullable<LineDetail['curves']>

/** Each run's own line; a run too small for one is named in `problem`. */
export function curvesOf(setting: Setting): { readonly curves: Curves; readonly problem?: string } {
  const { line, because } = setting.calibration
  const fields = setting.options.runs ?? []
  if (line === undefined) return { curves: [], problem: because ?? 'no calibration' }
  const runs = new Map<string, { x: number[]; y: number[] }>()
  for (const each of line.used) {
    const words = fields.map((field) => each.factors[field] ?? (each.numbers[field] === undefined ? undefined : String(each.numbers[field])))
    const unmapped = fields[words.indexOf(undefined)]
    if (unmapped !== undefined) {
      setting.notice(diagnostic('assess/missing-field', `The calibration dataset \`${line.detail.dataset}\` maps no column for \`${unmapped}\``, { place: setting.input.block.place, actual: unmapped, expected: 'a mapped field', mend: 'Map the column that tells the curves apart, or change `runs`' }))
      return { curves: [], problem: `no field ${unmapped} tells the calibration curves apart` }
    }
    const key = words.join(', ')
    const run = runs.get(key) ?? { x: [], y: [] }
    runs.set(key, run)
    run.x.push(each.level ?? 0)
    run.y.push(each.value)
  }
  const small = [...runs].find(([, { x }]) => x.length < 3 || new Set(x).size < 2)
  if (small !== undefined) return { curves: [], problem: `the calibration curve of ${small[0]} has too few responses for a line` }
  return {
    curves: [...runs].map(([run, { x, y }]) => {
      const [intercept = 0, slope = 0] = fitPolynomial({ x, y, degree: 1 }).coefficients
      return { run, slope, intercept, n: x.length }
    }),
  }
}

export function interceptScatter(setting: Setting, { curves, problem }: ReturnType<typeof curvesOf>): Outcome {
  if (problem !== undefined) return nothing(setting, 'intercept scatter', problem)
  if (curves.length < 3) return nothing(setting, 'intercept scatter', `${curves.length} calibration curves are too few: three are the least`)
  const slope = mean(curves.map((each) => each.slope))
  if (slope === 0) return nothing(setting, 'intercept scatter', 'the calibration curves have no slope')
  const value = standardDeviation(curves.map((each) => each.intercept))
  return limits(setting, {
    definition: 'intercept scatter', value, unit: 'response', concentration: value / Math.abs(slope), slope, n: curves.length, df: curves.length - 1, evidence: setting.calibration.line?.evidence ?? [],
  })
}

function limits(setting: Setting, scatter: Scatter): Outcome {
  const { convention } = setting.options
  if (scatter.concentration === 0) return nothing(setting, scatter.definition, `the ${scatterKinds[scatter.definition]} is zero`, 'degenerate')
  const detectionFactor = convention === '3 s' ? 3 : 3.3
  const netFactor = scatter.definition === 'blank scatter' ? netFactorOf(setting) : 1
  const unit = netFactor * scatter.concentration
  const spread = standardDeviationInterval(scatter.value, scatter.df, setting.input.confidence)
  const detectionLimit = detectionFactor * unit
  const detail = {
    definition: scatter.definition, ...about(setting, scatter.definition), scatter: { kind: scatterKinds[scatter.definition], value: scatter.value, unit: scatter.unit },
    detectionFactor, quantitationFactor, ...(netFactor === 1 ? {} : { netFactor }), ...(scatter.slope === undefined ? {} : { slope: scatter.slope }),
    detectionLimit, quantitationLimit: quantitationFactor * unit, n: scatter.n, df: scatter.df,
    interval: {
      low: (detectionLimit * spread.low) / scatter.value, high: (detectionLimit * spread.high) / scatter.value, confidence: setting.input.confidence,
      method: `chi-square interval of the standard deviation${hasSlope(setting, scatter.definition) ? ', slope taken as known' : ''}`,
    },
  }
  return limitsFound(detail, scatter.evidence, scatter.definition === 'blank scatter' ? blankFindings(scatter) : [])
}

/** The scatter of the blanks as findings of their own, in both units where both exist. */
export function blankFindings(scatter: Pick<Scatter, 'value' | 'unit' | 'concentration' | 'n' | 'df' | 'evidence'>): readonly FindingDraft[] {
  const about = { n: scatter.n, df: scatter.df, source: 'sample standard deviation', evidence: scatter.evidence }
  return [
    { ...about, metric: 'blank-standard-deviation', value: scatter.concentration, method: scatter.unit === 'response' ? 'standard deviation of blank responses over the slope' : 'standard deviation of blank results' },
    // The blanks stand first in the evidence; the slope has no part in their own scatter.
    ...(scatter.unit === 'response' ? [{ ...about, evidence: scatter.evidence.slice(0, 1), metric: 'blank-response-standard-deviation', value: scatter.value, method: 'standard deviation of blank responses' }] : []),
  ]
}

function about(setting: Setting, definition: ScatterDefinition): { readonly method: string; readonly quantitationMethod: string; readonly source: string } {
  const { convention } = setting.options
  const net = definition === 'blank scatter' && netFactorOf(setting) !== 1
  const scatter = `${scatterKinds[definition]}${net ? ' × net factor' : ''}${hasSlope(setting, definition) ? ' / slope' : ''}`
  return {
    method: `${convention === '3 s' ? '3' : '3.3'} × ${scatter}`, quantitationMethod: `10 × ${scatter}`,
    source: convention === '3 s' ? 'IUPAC convention of 3 s, quantitation 10 s' : `ICH Q2(R2), standard deviation of the ${hasSlope(setting, definition) ? 'response and slope' : 'blank'}`,
  }
}

/** Blanks given as results need no slope any more. */
function hasSlope({ blanks }: Setting, definition: ScatterDefinition): boolean {
  return definition !== 'blank scatter' || blanks?.quantity === 'response'
}

function nothing(setting: Setting, definition: ScatterDefinition, because: string, cause: 'too few' | 'degenerate' = 'too few'): Outcome {
  setting.notice(diagnostic(cause === 'degenerate' ? 'assess/degenerate-data' : 'assess/too-few-values', `No limit by ${definition} for \`${setting.input.measurand.id}\`: ${because}`, {
    place: setting.input.block.place, actual: because, expected: scatterKinds[definition], mend: `Mend the data, or take \`${definition}\` out of \`by\` for this measurand`,
  }))
  return nothingFound({ definition, ...about(setting, definition), because }, definition === 'blank scatter' ? [{ metric: 'blank-standard-deviation', because }] : [])
}

/** A line over more than two decades: its scatter is that of the top, not of the low end. */
export function noteWideRange(setting: Setting, line: CalibrationLine): void {
  const positive = line.points.x.filter((level) => level > 0)
  const [low, high] = [Math.min(...positive), Math.max(...positive)]
  if (positive.length === 0 || high / low <= 100) return
  setting.notice(diagnostic('assess/method-note', `The calibration line of \`${setting.input.measurand.id}\` behind the lower limits spans more than two decades`, {
    place: setting.input.block.place, actual: `levels from ${low} to ${high}`, expected: 'a line near the limit', mend: 'Write `levels-up-to:` so that the scatter near the limit is used',
  }))
}
