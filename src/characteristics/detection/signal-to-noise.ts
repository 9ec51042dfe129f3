// Signal-to-noise ratio of a standard → the levels at ratios of 3 and 10. Peak-to-peak noise h takes the ratio 2H/h, the standard
// deviation of the baseline takes H/s; mixing the two changes the limit several-fold, so the study must say which.
import type { FindingDraft } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import type { Observation } from '../../data/dataset.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean, standardDeviation } from '../../statistics/describe.ts'
import { fitPolynomial } from '../../statistics/regression.ts'
import { isNoiseOfArithmetic } from './calibration-line.ts'
import type { DefinitionDetail, TraceDetail } from './detail.ts'
import { blankProblem, limitsFound, nothingFound, type Outcome, type Setting } from './outcome.ts'

export interface SignalOutcome extends Outcome {
  readonly trace?: TraceDetail | undefined
}

type Point = { readonly x: number; readonly y: number }
type Convention = 'peak-to-peak' | 'rms'

const detectionRatio = 3
const quantitationRatio = 10

export function signalToNoise(setting: Setting): SignalOutcome {
  return setting.options.trace === undefined ? fromReplicates(setting) : fromTrace(setting, setting.options.trace)
}

function fromTrace(setting: Setting, trace: NonNullable<Setting['options']['trace']>): SignalOutcome {
  const observations = setting.input.observations(trace.data)
  const points = observations.flatMap((each): readonly (Point & { readonly row: number })[] => {
    const [time, signal] = [each.fields['time'], each.fields['signal']]
    return time?.kind === 'number' && signal?.kind === 'number' ? [{ x: time.value, y: signal.value, row: each.row }] : []
  })
  const problem = traceProblem(setting, observations, points)
  if (problem !== undefined) return nothing(setting, problem)
  const within = ({ from, to }: { readonly from: number; readonly to: number }): typeof points => points.filter((point) => point.x >= from && point.x <= to)
  const baseline = [...new Set(trace.baseline.flatMap(within))]
  const peak = within(trace.peak)
  if (baseline.length < 10 || peak.length < 3) return nothing(setting, `the windows hold ${baseline.length} baseline and ${peak.length} peak points: ten and three are the least`)
  const line = fitPolynomial({ x: baseline.map((point) => point.x), y: baseline.map((point) => point.y), degree: 1 })
  const at = (x: number): number => (line.coefficients[0] ?? 0) + (line.coefficients[1] ?? 0) * x
  const apex = peak.reduce((best, point) => (point.y - at(point.x) > best.y - at(best.x) ? point : best))
  const height = apex.y - at(apex.x)
  const convention: Convention = setting.options.noise ?? 'peak-to-peak'
  const noise = convention === 'rms' ? line.residualStandardDeviation : Math.max(...line.residuals) - Math.min(...line.residuals)
  const noiseless = isNoiseOfArithmetic(noise, baseline.map((point) => point.y))
  if (noiseless || height <= 0) return nothing(setting, noiseless ? 'the baseline has no noise' : 'the peak window holds no peak above the baseline')
  const ratio = (convention === 'rms' ? height : 2 * height) / noise
  const halfWidth = widthAtHalfHeight(peak.map((point) => ({ x: point.x, y: point.y - at(point.x) })), apex.x, height)
  const detail: TraceDetail = {
    dataset: trace.data, level: trace.level.value, points: points.map(({ x, y }) => ({ x, y })), baseline: trace.baseline, peak: trace.peak, baselineAtPeak: at(apex.x),
    apex: { time: apex.x, signal: apex.y }, height, noise, convention, ratio, baselinePoints: baseline.length, ...(halfWidth === undefined ? {} : { halfWidth }),
  }
  noteShortBaseline(setting, detail)
  const evidence = [{ dataset: trace.data, field: 'signal', rows: [...baseline, ...peak].map((point) => point.row).sort((left, right) => left - right) }]
  return { ...limits(trace.level.value, { ratio, convention, noise, n: baseline.length, df: convention === 'rms' ? line.df : undefined, kind: 'baseline of the trace' }, evidence), trace: detail }
}

function traceProblem(setting: Setting, observations: readonly Observation[], points: readonly Point[]): string | undefined {
  const { place } = setting.input.block
  if (observations.length === 0) return 'the trace has no points for this measurand'
  const stray = observations.flatMap((each) => [each.fields['time'], each.fields['signal']]).find((cell) => cell?.kind !== 'number')
  if (points.length === observations.length) return undefined
  if (stray === undefined) {
    setting.notice(diagnostic('assess/missing-field', `The trace dataset \`${setting.options.trace?.data ?? ''}\` must map \`time\` and \`signal\``, { place, expected: 'columns for `time` and `signal`', mend: 'Add both under `columns:`' }))
    return 'the trace maps no time or no signal'
  }
  setting.notice(diagnostic('assess/unsuitable-data', `Unexpected \`${stray.text}\` in the trace of \`${setting.input.measurand.id}\``, { place: stray.place, actual: stray.text, expected: 'a number', mend: 'Give time and signal as numbers in every row' }))
  return `the trace holds ${stray.text}`
}

/** Replicates of a low standard against blanks, when there is no trace. */
function fromReplicates(setting: Setting): SignalOutcome {
  const { blanks, spikes, options } = setting
  const problem = blankProblem(setting, 'signal to noise')
  if (problem !== undefined || blanks === undefined) return nothing(setting, problem ?? 'no blanks')
  const levels = [...new Set(spikes?.measurements.values.flatMap((each) => each.level ?? []))]
  const [level] = levels
  if (spikes === undefined || level === undefined || levels.length !== 1 || level <= 0) return nothing(setting, `the spikes stand at ${levels.length} levels: one level above zero is needed`)
  if (spikes.quantity !== blanks.quantity || spikes.measurements.censored.length > 0) return nothing(setting, spikes.quantity === blanks.quantity ? 'a spike holds no number' : 'spikes and blanks are given in different quantities')
  const signal = Math.abs(mean(spikes.values) - mean(blanks.values))
  const convention: Convention = options.noise ?? 'rms'
  const noise = convention === 'rms' ? standardDeviation(blanks.values) : Math.max(...blanks.values) - Math.min(...blanks.values)
  if (noise === 0 || signal === 0) return nothing(setting, noise === 0 ? 'the blanks have no scatter' : 'the spikes do not differ from the blanks')
  const ratio = (convention === 'rms' ? signal : 2 * signal) / noise
  const measured = { ratio, convention, noise, n: blanks.values.length, df: convention === 'rms' ? blanks.values.length - 1 : undefined, kind: 'blanks' }
  return limits(level, measured, [...evidenceOf(blanks.measurements), ...evidenceOf(spikes.measurements)])
}

interface MeasuredRatio {
  readonly ratio: number
  readonly convention: Convention
  readonly noise: number
  readonly n: number
  readonly df: number | undefined
  readonly kind: string
}

function limits(level: number, measured: MeasuredRatio, evidence: Outcome['evidence']): Outcome {
  const { ratio, convention, noise, n, df, kind } = measured
  const detail: DefinitionDetail = {
    ...about(convention), scatter: { kind: `${convention === 'rms' ? 'standard deviation' : 'peak-to-peak noise'} of ${kind}`, value: noise, unit: 'response' },
    detectionFactor: detectionRatio, quantitationFactor: quantitationRatio, detectionLimit: (level * detectionRatio) / ratio, quantitationLimit: (level * quantitationRatio) / ratio, n, ...(df === undefined ? {} : { df }),
  }
  const found: FindingDraft = { metric: 'signal-to-noise', level, value: ratio, n, ...(df === undefined ? {} : { df }), method: convention === 'rms' ? 'H/s' : '2H/h', source: detail.source, evidence }
  return limitsFound(detail, evidence, [found])
}

function about(convention: Convention | undefined): Pick<DefinitionDetail, 'definition' | 'method' | 'quantitationMethod' | 'source'> {
  const ratio = convention === 'rms' ? 'the ratio H/s (height H, standard deviation s of the noise)' : 'the ratio 2H/h (height H, peak-to-peak noise h)'
  return {
    definition: 'signal to noise', source: 'ICH Q2(R2), signal to noise of 3 and 10',
    method: `level × 3 over ${ratio}`, quantitationMethod: `level × 10 over ${ratio}`,
  }
}

/** Between the crossings of half the height on both flanks, by straight interpolation. */
function widthAtHalfHeight(peak: readonly Point[], apex: number, height: number): number | undefined {
  const half = height / 2
  const crossing = (left: Point | undefined, right: Point | undefined): number | undefined =>
    left === undefined || right === undefined || left.y === right.y ? undefined : left.x + ((half - left.y) * (right.x - left.x)) / (right.y - left.y)
  const rising = peak.findLastIndex((point) => point.x < apex && point.y < half)
  const falling = peak.findIndex((point) => point.x > apex && point.y < half)
  const [start, end] = [crossing(peak[rising], peak[rising + 1]), falling < 1 ? undefined : crossing(peak[falling - 1], peak[falling])]
  return start === undefined || end === undefined ? undefined : end - start
}

function noteShortBaseline(setting: Setting, detail: TraceDetail): void {
  const length = detail.baseline.reduce((sum, each) => sum + each.to - each.from, 0)
  if (detail.halfWidth === undefined || length >= 5 * detail.halfWidth) return
  setting.notice(diagnostic('assess/method-note', `The baseline windows of \`${setting.input.measurand.id}\` are shorter than five widths of the peak at half height`, {
    place: setting.input.block.place, actual: `${Number((length / detail.halfWidth).toPrecision(3))} widths`, expected: 'at least 5, customarily 20', mend: 'Widen `baseline`, so that the noise is not underestimated',
  }))
}

function nothing(setting: Setting, because: string): SignalOutcome {
  setting.notice(diagnostic('assess/too-few-values', `No limit by signal to noise for \`${setting.input.measurand.id}\`: ${because}`, {
    place: setting.input.block.place, actual: because, mend: 'Mend the data or the windows, or take `signal to noise` out of `by` for this measurand',
  }))
  return nothingFound({ ...about(setting.options.noise), because }, [{ metric: 'signal-to-noise', because }])
}
