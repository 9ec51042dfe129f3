// Spikes and blanks → method detection limit of 40 CFR 136, Appendix B, revision 2: the larger of a limit from spikes and one from blanks.
// A blank that was not detected is no zero, a negative blank stays negative, and Student's t is one-sided at 99 % with n - 1.
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean, standardDeviation, standardDeviationInterval } from '../../statistics/describe.ts'
import { mdl as methodDetectionLimit, type MethodDetectionLimit } from '../../statistics/detection.ts'
import type { DefinitionDetail, MdlDetail } from './detail.ts'
import { mdlChecks, mdlSchedule } from './mdl-design.ts'
import { limitsFound, nothingFound, type Outcome, type Setting } from './outcome.ts'

export interface MdlOutcome extends Outcome {
  readonly mdl?: MdlDetail | undefined
}

const about = { definition: 'MDL', method: 'larger of t × s of spikes (one-sided 99 %, n - 1) and the limit from method blanks', source: '40 CFR 136, Appendix B, revision 2' } as const
const leastOfEach = 7

export function mdlLimits(setting: Setting): MdlOutcome {
  const { spikes, blanks, options } = setting
  if (spikes === undefined || blanks === undefined) return nothing(setting, `dataset ${spikes === undefined ? options.spikes : options.blanks} gave no values`)
  const spiked = spikes.concentrations
  const numericBlanks = blanks.concentrations
  if (spiked === undefined || numericBlanks === undefined) return nothing(setting, setting.calibration.because ?? 'spikes or blanks are responses, and no calibration turns them into concentrations')
  const unidentified = spikes.measurements.censored
  if (unidentified.length > 0) return nothing(setting, `${unidentified.length} spikes hold no number (${unidentified[0]?.cell.text ?? ''}): the procedure asks for a higher spike`)
  if (spiked.some((value) => value <= 0)) return nothing(setting, 'a spike result is zero or negative: the procedure asks for a higher spike')
  if (spiked.length < 2) return nothing(setting, `${spiked.length} spikes are too few for a standard deviation`)
  const blankCount = numericBlanks.length + blanks.measurements.censored.length
  if (standardDeviation(spiked) === 0) return nothing(setting, 'the spikes have no scatter')
  const limits = methodDetectionLimit({ spikes: spiked, blanks: [...numericBlanks, ...blanks.measurements.censored.map(() => undefined)] })
  const short = shortage(spiked.length, blankCount)
  const levels = [...new Set(spikes.measurements.values.flatMap((each) => each.level ?? []))].sort((left, right) => left - right)
  const detail: MdlDetail = {
    spikes: { ...limits.spikes, levels },
    blanks: { ...limits.blanks, ...(numericBlanks.length < 2 ? {} : { mean: mean(numericBlanks), standardDeviation: standardDeviation(numericBlanks) }) },
    ...(short === undefined ? { mdl: limits.limit } : {}),
    ...(levels[0] === undefined ? {} : { spikeRatio: { lowest: levels[0] / limits.limit, highest: (levels.at(-1) ?? levels[0]) / limits.limit } }),
    checks: mdlChecks(spikes, blanks, levels, limits.limit), schedule: mdlSchedule(spikes, blanks),
  }
  warnOfDesign(setting, detail)
  const evidence = [...evidenceOf(spikes.measurements), ...evidenceOf(blanks.measurements, [...blanks.measurements.values, ...blanks.measurements.censored])]
  const parts = partFindings(setting, detail, evidence)
  if (short !== undefined) return { ...nothing(setting, short), findings: parts, mdl: detail }
  const governs = governingSide(limits)
  const whole: FindingDraft = { metric: 'method-detection-limit', value: limits.limit, n: governs.n, ...(governs.df === undefined ? {} : { df: governs.df }), method: `${about.method}; here ${governs.from}`, source: about.source, evidence }
  return {
    ...limitsFound({ ...about, ...governs.detail, detectionLimit: limits.limit, n: governs.n, ...(governs.df === undefined ? {} : { df: governs.df }) }, evidence, [whole, ...parts]),
    notEvaluable: limits.blanks.limit === undefined ? [{ metric: 'mdl-blanks', because: 'no method blank gave a numeric result' }] : [],
    mdl: detail,
  }
}

function partFindings(setting: Setting, detail: MdlDetail, evidence: Outcome['evidence']): readonly FindingDraft[] {
  const { spikes, blanks } = detail
  const [spikeEvidence, blankEvidence] = [evidence.slice(0, 1), evidence.slice(1)]
  const spread = standardDeviationInterval(spikes.standardDeviation, spikes.n - 1, setting.input.confidence)
  const fromSpikes: FindingDraft = {
    metric: 'mdl-spikes', value: spikes.limit, n: spikes.n, df: spikes.n - 1, method: 't × s of spikes, one-sided 99 %', source: about.source, evidence: spikeEvidence,
    interval: { low: spikes.t * spread.low, high: spikes.t * spread.high, confidence: setting.input.confidence, method: 'chi-square interval of the standard deviation' },
  }
  if (blanks.limit === undefined) return [fromSpikes]
  return [fromSpikes, { metric: 'mdl-blanks', value: blanks.limit, n: blanks.n, ...(blanks.rule === 'mean plus t s' ? { df: blanks.numeric - 1 } : {}), method: blanks.rule, source: about.source, evidence: blankEvidence }]
}

/** Which of the two limits is the larger one, and the scatter it rests on. */
function governingSide({ spikes, blanks, limit }: MethodDetectionLimit): { readonly from: string; readonly n: number; readonly df?: number; readonly detail: Pick<DefinitionDetail, 'scatter' | 'basis' | 'detectionFactor'> } {
  if (limit === spikes.limit) {
    return { from: 'from spikes', n: spikes.n, df: spikes.n - 1, detail: { scatter: { kind: 'standard deviation of spikes', value: spikes.standardDeviation, unit: 'measurand' }, detectionFactor: spikes.t } }
  }
  if (blanks.standardDeviation === undefined) return { from: `from blanks, ${blanks.rule}`, n: blanks.n, detail: { basis: `${blanks.rule} of ${blanks.n}` } }
  return { from: `from blanks, ${blanks.rule}`, n: blanks.n, df: blanks.n - 1, detail: { scatter: { kind: 'standard deviation of blanks', value: blanks.standardDeviation, unit: 'measurand' } } }
}

function shortage(spikes: number, blanks: number): string | undefined {
  const short = [spikes < leastOfEach ? `${spikes} spikes` : '', blanks < leastOfEach ? `${blanks} blanks` : ''].filter((each) => each !== '')
  return short.length === 0 ? undefined : `${short.join(' and ')} are too few: the procedure asks for at least seven of each`
}

function warnOfDesign(setting: Setting, { checks }: MdlDetail): void {
  const { place } = setting.input.block
  const missed = checks.filter((each) => each.met === false && !each.rule.startsWith('number of'))
  const unshown = checks.filter((each) => each.met === undefined)
  if (missed.length > 0) {
    setting.notice(diagnostic('assess/design-gap', `The design behind the MDL of \`${setting.input.measurand.id}\` falls short`, {
      place, actual: missed.map((each) => `${each.rule}: ${each.found === undefined ? 'none' : Number(each.found.toPrecision(3))}`).join('; '), expected: [...new Set(missed.map((each) => `${each.rule}: ${each.needed}`))].join('; '),
      mend: 'Complete the design, or justify the deviation in the study',
    }))
  }
  if (unshown.length > 0) {
    setting.notice(diagnostic('assess/design-gap', `Part of the design behind the MDL of \`${setting.input.measurand.id}\` cannot be shown`, {
      place, actual: `no column for: ${unshown.map((each) => each.rule).join(', ')}`, expected: 'columns for `batch`, `prepared`, `analysed`, and a `level` for spikes', mend: 'Map the columns that show it',
    }))
  }
}

function nothing(setting: Setting, because: string): MdlOutcome {
  setting.notice(diagnostic('assess/too-few-values', `No MDL for \`${setting.input.measurand.id}\`: ${because}`, {
    place: setting.input.block.place, actual: because, expected: 'at least seven numeric spikes and seven method blanks', mend: 'Complete the data, or take `MDL` out of `by` for this measurand',
  }))
  const falls: readonly NotEvaluable[] = [{ metric: 'method-detection-limit', because }]
  return nothingFound({ ...about, because }, falls)
}
