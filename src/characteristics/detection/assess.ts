// Blanks, spikes, calibration and trace → every lower limit asked for, side by side, and the one that governs. A computed quantitation
// limit that lies outside every tested level is a guess until results confirm it, and is not evaluable.
import type { AssessInput, AssessOutput } from '../../assess/assessment-part.ts'
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { grubbs } from '../../statistics/outliers.ts'
import { calibrationLine } from './calibration-line.ts'
import { confirmation, type ConfirmationOutcome } from './confirmation.ts'
import { confirmedLevel, type DefinitionName, detectionOnly, type QuantitationName } from './definitions.ts'
import type { DetectionDetail, DistributionDetail, MdlDetail, TraceDetail } from './detail.ts'
import { criticalValue, isoLimits } from './error-rate-limits.ts'
import { mdlLimits } from './method-detection-limit.ts'
import { type DetectionOptions, governing } from './options.ts'
import { type Outcome, quantitationInterval, type Setting } from './outcome.ts'
import { blankScatter, calibrationScatter, type Curves, curvesOf, interceptScatter } from './scatter-limits.ts'
import { readSeries } from './series.ts'
import { signalToNoise } from './signal-to-noise.ts'

type Computed = Outcome & {
  readonly mdl?: MdlDetail | undefined
  readonly trace?: TraceDetail | undefined
  readonly distribution?: DistributionDetail | undefined
  readonly curves?: Curves | undefined
}

export function assessDetection(input: AssessInput<DetectionOptions>): AssessOutput<DetectionDetail> {
  const { options, place } = input.block
  const diagnostics: Diagnostic[] = []
  const notice = (found: Diagnostic): void => {
    if (!diagnostics.some((each) => each.code === found.code && each.message === found.message)) diagnostics.push(found)
  }
  for (const [key, asked] of [['levels-up-to', options['levels-up-to']], ['trace.level', options.trace?.level]] as const) {
    if (asked === undefined || asked.unit === input.measurand.unit) continue
    notice(diagnostic('assess/unsuitable-data', `Unexpected unit \`${asked.unit}\` for \`${key}\` of \`${input.block.id}\``, { place, actual: asked.unit, expected: input.measurand.unit, mend: `Write the level in ${input.measurand.unit}` }))
    return { detail: undefined, findings: [], notEvaluable: [], design: {}, diagnostics }
  }
  const calibration = calibrationLine(input, notice)
  const blanks = readSeries(input, options.blanks, calibration.line)
  const spikes = readSeries(input, options.spikes, calibration.line)
  const setting: Setting = { input, options, calibration, blanks, spikes, notice }
  flagOutliers(setting)
  const confirmed = confirmation(setting)
  const asked = [...new Set<DefinitionName>(options.by.flatMap((name): readonly DefinitionName[] => (name === 'calibration scatter' ? [name, 'intercept standard error'] : [name])))]
  const computed = asked.map((name) => compute(name, setting))
  const tested = testedLevels(setting, confirmed)
  const reported = reportedLimits(setting, computed, confirmed, tested)
  const limits = computed.flatMap((each) => each.detail.detectionLimit ?? [])
  const line = calibration.line?.detail
  const curves = computed.flatMap((each) => each.curves ?? [])
  const [mdl, trace] = [computed.find((each) => each.mdl !== undefined)?.mdl, computed.find((each) => each.trace !== undefined)?.trace]
  const detail: DetectionDetail = {
    definitions: computed.map((each) => each.detail), governing: reported.governing, reported: reported.values,
    ...(limits.length < 2 ? {} : { spread: { lowest: Math.min(...limits), highest: Math.max(...limits), ratio: Math.max(...limits) / Math.min(...limits) } }),
    ...(line === undefined ? {} : { line: { ...line, ...(curves.length === 0 ? {} : { curves }) } }),
    ...(blanks === undefined ? {} : { blanks: blanks.detail }), ...(spikes === undefined ? {} : { spikes: spikes.detail }),
    ...(mdl === undefined ? {} : { mdl }), ...(trace === undefined ? {} : { trace }),
    distributions: computed.flatMap((each) => each.distribution ?? []), ...(confirmed.detail === undefined ? {} : { confirmation: confirmed.detail }), ...(tested === undefined ? {} : { tested }),
    settings: {
      convention: options.convention, alpha: options.alpha, beta: options.beta, sampleReplicates: options['sample-replicates'], replicates: options.replicates,
      ...(options['blank-replicates'] === undefined ? {} : { blankReplicates: options['blank-replicates'] }),
    },
  }
  return {
    detail, diagnostics, design: designFound(setting, mdl, confirmed),
    findings: [...reported.findings, ...withoutRepeats(computed.flatMap((each) => each.findings)), ...confirmed.findings],
    notEvaluable: [...reported.notEvaluable, ...computed.flatMap((each) => each.notEvaluable), ...confirmed.notEvaluable],
  }
}

function compute(name: DefinitionName, setting: Setting): Computed {
  switch (name) {
    case 'blank scatter': return blankScatter(setting)
    case 'calibration scatter': return calibrationScatter(setting, name)
    case 'intercept standard error': return calibrationScatter(setting, name)
    case 'intercept scatter': {
      const found = curvesOf(setting)
      return { ...interceptScatter(setting, found), curves: found.curves }
    }
    case 'signal to noise': return signalToNoise(setting)
    case 'critical value': return criticalValue(setting)
    case 'ISO 11843-2': return isoLimits(setting)
    case 'MDL': return mdlLimits(setting)
  }
}

/** Levels above zero at which something was measured: between the lowest and the highest of them a limit is not extrapolated. */
function testedLevels({ calibration, spikes, options }: Setting, confirmed: ConfirmationOutcome): DetectionDetail['tested'] {
  const levels = [
    ...(calibration.line?.levels ?? []), ...(spikes?.measurements.values.flatMap((each) => each.level ?? []) ?? []),
    ...(confirmed.detail?.levels.map((each) => each.level) ?? []), ...(options.trace === undefined ? [] : [options.trace.level.value]),
  ].filter((level) => level > 0)
  return levels.length === 0 ? undefined : { lowest: Math.min(...levels), highest: Math.max(...levels) }
}

interface Reported {
  readonly governing: DetectionDetail['governing']
  readonly values: DetectionDetail['reported']
  readonly findings: readonly FindingDraft[]
  readonly notEvaluable: readonly NotEvaluable[]
}

/** The governing limits under their own names, so that a criterion judges them and not every definition. */
function reportedLimits(setting: Setting, computed: readonly Computed[], confirmed: ConfirmationOutcome, tested: DetectionDetail['tested']): Reported {
  const { options } = setting
  const detection = governing(options)
  const quantitation = options['govern-quantitation'] ?? detection
  const named = { ...(detection === undefined ? {} : { detection }), ...(quantitation === undefined ? {} : { quantitation }), named: options.govern !== undefined }
  const detected = detectionFinding(computed.find((each) => each.detail.definition === detection), detection)
  const quantified = quantitation === confirmedLevel ? confirmedFinding(setting, computed.find((each) => each.detail.definition === detection), confirmed) : quantitationFinding(setting, computed.find((each) => each.detail.definition === quantitation), quantitation, confirmed, tested)
  const both = [detected, quantified]
  return {
    governing: named,
    values: { ...('value' in detected ? { detection: detected.value } : {}), ...('value' in quantified ? { quantitation: quantified.value } : {}) },
    findings: both.flatMap((each) => ('value' in each ? [each] : [])), notEvaluable: both.flatMap((each) => ('value' in each ? [] : [each])),
  }
}

function detectionFinding(governs: Computed | undefined, name: DefinitionName | undefined): FindingDraft | NotEvaluable {
  const metric = 'detection-limit'
  const limit = governs?.detail.detectionLimit
  if (governs === undefined || limit === undefined) return { metric, because: governs?.detail.because ?? `no definition governs (${name ?? 'none named'})` }
  return { metric, value: limit, ...governingParts(governs), ...(governs.detail.interval === undefined ? {} : { interval: governs.detail.interval }) }
}

function quantitationFinding(setting: Setting, governs: Computed | undefined, name: QuantitationName | undefined, confirmed: ConfirmationOutcome, tested: DetectionDetail['tested']): FindingDraft | NotEvaluable {
  const metric = 'quantitation-limit'
  const limit = governs?.detail.quantitationLimit
  if (governs === undefined || limit === undefined) {
    const silent = detectionOnly.some((each) => each === name) && governs?.detail.because === undefined
    return { metric, because: governs?.detail.because ?? (silent ? `${name ?? ''} gives no quantitation limit, and the study names no other definition for it` : 'no definition governs') }
  }
  const inside = tested !== undefined && limit >= tested.lowest && limit <= tested.highest
  if (!inside && !confirmed.confirmed.some((level) => level <= limit)) {
    const because = `the computed value ${Number(limit.toPrecision(4))} ${setting.input.measurand.unit} lies ${tested === undefined || limit < tested.lowest ? 'below' : 'above'} every tested level and no results confirm it`
    setting.notice(diagnostic('assess/too-few-values', `The quantitation limit of \`${setting.input.measurand.id}\` is computed and not tested`, {
      place: setting.input.block.place, actual: because, expected: `levels that reach it${tested === undefined ? '' : ` (tested: ${[...new Set([tested.lowest, tested.highest])].join(' to ')} ${setting.input.measurand.unit})`}`,
      mend: `Measure at or near it (\`confirmation:\`), or write \`govern-quantitation: ${confirmedLevel}\``,
    }))
    return { metric, because }
  }
  return { metric, value: limit, ...governingParts(governs, governs.detail.quantitationMethod), ...quantitationInterval(governs.detail) }
}

/** The lowest level at which enough results were obtained; their recovery and scatter are judged by their own criteria. */
function confirmedFinding({ options, input, notice }: Setting, governs: Computed | undefined, { confirmed, findings }: ConfirmationOutcome): FindingDraft | NotEvaluable {
  const metric = 'quantitation-limit'
  const [level] = confirmed
  const results = findings.find((each) => each.level === level)
  if (level === undefined || results === undefined) return { metric, because: `no level of dataset ${options.confirmation ?? ''} is confirmed` }
  const calculated = governs?.detail.quantitationLimit
  if (calculated !== undefined && calculated > level) {
    notice(diagnostic('assess/method-note', `The confirmed quantitation limit of \`${input.measurand.id}\` lies below the one computed by ${governs?.detail.definition ?? ''}`, {
      place: input.block.place, actual: `${level} ${input.measurand.unit} confirmed, ${Number(calculated.toPrecision(4))} ${input.measurand.unit} computed`, expected: 'a confirmed level at or above the computed limit, or a reason', mend: 'Discuss the difference under `texts:`',
    }))
  }
  return { metric, value: level, n: results.n ?? 0, method: 'lowest level with confirming results', source: results.source, evidence: results.evidence }
}

function governingParts({ detail, evidence }: Computed, method = detail.method): Pick<FindingDraft, 'method' | 'source' | 'evidence' | 'n' | 'df'> {
  return { method: `${detail.definition}: ${method}`, source: detail.source, evidence, ...(detail.n === undefined ? {} : { n: detail.n }), ...(detail.df === undefined ? {} : { df: detail.df }) }
}

function withoutRepeats(findings: readonly FindingDraft[]): readonly FindingDraft[] {
  const same = (one: FindingDraft, other: FindingDraft): boolean => one.metric === other.metric && one.level === other.level && one.condition === other.condition
  return findings.filter((each, index) => findings.findIndex((other) => same(each, other)) === index)
}

/** A flag is a note: nothing is removed. */
function flagOutliers({ input, blanks, spikes, notice }: Setting): void {
  for (const series of [blanks, spikes]) {
    const levels = [...new Set(series?.measurements.values.map((each) => each.level))]
    for (const level of levels) {
      const values = series?.values.filter((_, index) => series.measurements.values[index]?.level === level) ?? []
      if (values.length < 3 || Math.max(...values) === Math.min(...values)) continue
      const { G, index, critical05, critical01 } = grubbs(values)
      if (G <= critical05) continue
      notice(diagnostic('assess/outlier-flag', `Grubbs' test flags \`${values[index]}\` among ${values.length} values of \`${input.measurand.id}\` in dataset \`${series?.detail.dataset ?? ''}\``, {
        place: input.block.place, actual: `G = ${Number(G.toPrecision(4))}`, expected: `at most ${Number((G > critical01 ? critical01 : critical05).toPrecision(4))} (two-sided, ${G > critical01 ? '1 %' : '5 %'})`, mend: 'Look for a cause; nothing is removed',
      }))
    }
  }
}

function designFound({ blanks, spikes, calibration }: Setting, mdl: MdlDetail | undefined, confirmed: ConfirmationOutcome): Readonly<Record<string, number>> {
  const count = (series: typeof blanks): number => (series === undefined ? 0 : series.values.length + series.measurements.censored.length)
  const smallest = Math.min(...(confirmed.detail?.levels.map((each) => each.n) ?? []))
  return {
    ...(calibration.line === undefined ? {} : { levels: calibration.line.levels.length }), ...(blanks === undefined ? {} : { blanks: count(blanks) }), ...(spikes === undefined ? {} : { spikes: count(spikes) }),
    ...(mdl === undefined ? {} : { batches: mdl.schedule.batches.filter((each) => each !== '').length, dates: mdl.schedule.dates.filter((each) => each !== '').length }), ...(Number.isFinite(smallest) ? { replicates: smallest } : {}),
  }
}
