// Lower limits as exhibits: what was measured in blanks and spikes, every definition side by side with the governing one named, and the
// confirmation. It computes nothing; a limit never stands without the name of its definition.
import type { FindingInterval } from '../../assess/finding.ts'
import { column, excludedRow, figure, intervalWords, joined, paragraph, row, secondary, sentence, table, textOf, type Words } from '../../present/build.ts'
import { definitionsChart } from '../../present/charts/definitions-chart.ts'
import { distributionsChart } from '../../present/charts/distributions-chart.ts'
import { dotPlotChart } from '../../present/charts/dot-plot-chart.ts'
import { traceChart } from '../../present/charts/trace-chart.ts'
import type { ExhibitRow, Inline, NumberNode, ReportBlock } from '../../present/document.ts'
import { asTyped, columnDecimals, count, degreesOfFreedom, numberText, printed } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { DefinitionDetail, DetectionDetail, MdlDetail, SeriesDetail, SeriesPoint, TraceDetail } from './detail.ts'

type Detection = Presented<DetectionDetail>

export function presentDetection(presented: Detection): readonly ReportBlock[] {
  const { detail } = presented
  return [
    summary(presented),
    ...definitionExhibits(presented),
    ...secondary(presented, () => [
      ...lineExhibits(presented),
      ...seriesTable(presented, detail.blanks, 'blanks'), ...seriesTable(presented, detail.spikes, 'spikes'),
      ...dotPlot(presented),
      ...distributionFigures(presented),
      ...(detail.mdl === undefined ? [] : mdlExhibits(presented, detail.mdl)),
      ...(detail.trace === undefined ? [] : traceExhibits(presented, detail.trace)),
      ...confirmationTable(presented),
    ]),
  ]
}

function summary({ detail, measurand }: Detection): ReportBlock {
  const { governing, reported, spread, tested, confirmation } = detail
  const because = governing.named ? 'the definition that the study names as governing' : 'the only definition that the study asks for'
  const untested = reported.quantitation !== undefined && governing.quantitation !== 'confirmed level' && confirmation === undefined
  return paragraph(
    reported.detection === undefined ? textOf('No detection limit can be reported.') : sentence`The detection limit is ${printed(reported.detection, three)} ${measurand.unit} by ${governing.detection ?? ''}, ${because}.`,
    reported.quantitation === undefined ? textOf('No quantitation limit can be reported.') : sentence`The quantitation limit is ${printed(reported.quantitation, three)} ${measurand.unit}, ${governing.quantitation === 'confirmed level' ? 'the lowest level with confirming results' : `by ${governing.quantitation ?? ''}`}.`,
    untested && tested !== undefined ? sentence`It lies within the tested levels, ${asTyped(tested.lowest)} to ${asTyped(tested.highest)} ${measurand.unit}; no dataset of results at this limit was given to confirm it.` : [],
    spread === undefined ? [] : sentence`The definitions give detection limits from ${printed(spread.lowest, three)} to ${printed(spread.highest, three)} ${measurand.unit}, a factor of ${printed(spread.ratio, { significant: 2 })} apart, because they multiply different measures of scatter.`,
  )
}

function definitionExhibits(presented: Detection): readonly ReportBlock[] {
  const { detail, measurand, prefix } = presented
  const { definitions, settings } = detail
  const confirmed = detail.governing.quantitation === 'confirmed level' ? detail.reported.quantitation : undefined
  const items = [...definitions.flatMap(({ definition, criticalValue, detectionLimit, quantitationLimit }) => [
    ...(criticalValue === undefined ? [] : [{ label: definition, value: criticalValue, kind: 'critical value', governing: false }]),
    ...(detectionLimit === undefined ? [] : [{ label: definition, value: detectionLimit, kind: 'detection limit', governing: detail.governing.detection === definition }]),
    ...(quantitationLimit === undefined ? [] : [{ label: definition, value: quantitationLimit, kind: 'quantitation limit', governing: detail.reported.quantitation !== undefined && detail.governing.quantitation === definition }]),
  ]), ...(confirmed === undefined ? [] : [{ label: 'confirmed level', value: confirmed, kind: 'quantitation limit', governing: true }])]
  const exhibit = table({
    id: `${prefix}-definitions`, caption: `Lower limits of ${measurand.name} by each definition`,
    columns: [
      column('Definition', { align: 'text', rowHeader: true }), column('Scatter it rests on', { align: 'text' }), column('Critical value', { unit: measurand.unit }), column('Detection limit', { unit: measurand.unit }),
      column(`${asPercent(presented.confidence)} interval`, { unit: measurand.unit, align: 'text' }), column('Quantitation limit', { unit: measurand.unit }), column('n'), column('df'),
    ],
    rows: [...definitions.map((each) => definitionRow(presented, each)), ...(confirmed === undefined ? [] : [row(governingName('confirmed level', 'quantitation'), 'lowest level with confirming results', '', '', '', number(confirmed), '', '')])],
    notes: [
      ...definitions.map((each) => `${each.definition}: ${each.method}${each.quantitationMethod === undefined ? '' : `; quantitation: ${each.quantitationMethod}`} (${each.source}).`),
      ...[...new Set(definitions.flatMap((each) => each.interval?.method ?? []))].map((method) => `Interval of the detection limit: ${method}.`),
      ...(definitions.some((each) => each.criticalValue !== undefined) ? [sentence`Risk of a false detection ${asTyped(settings.alpha)}, of a missed one ${asTyped(settings.beta)}${definitions.every((each) => each.criticalValue !== undefined) ? '' : '; the other definitions state no risk'}.`] : []),
      ...netNote(detail),
    ],
  })
  if (items.length < 2) return [exhibit]
  return [exhibit, ...secondary(presented, () => [figure({
    id: `${prefix}-definitions-chart`, caption: `Lower limits of ${measurand.name} by each definition; filled marks govern`,
    alternative: `Limits in ${measurand.unit}. ${items.map((each) => `${each.label}, ${each.kind}: ${numberText(each.value, three)}${each.governing ? ', governing' : ''}`).join('; ')}.`,
    chart: definitionsChart({ xTitle: axis(measurand), items, lines: [...criterionLines(presented, 'detection'), ...criterionLines(presented, 'quantitation')] }),
  })])]
}

function definitionRow({ detail, measurand }: Detection, each: DefinitionDetail): ExhibitRow {
  const { governing, reported } = detail
  const roles = [governing.detection === each.definition && reported.detection !== undefined ? 'detection' : '', governing.quantitation === each.definition && reported.quantitation !== undefined ? 'quantitation' : ''].filter((role) => role !== '')
  const name = roles.length === 0 ? each.definition : governingName(each.definition, roles.join(' and '))
  if (each.because !== undefined) return row(name, `not evaluable: ${each.because}`, '', '', '', '', '', '')
  const scatter = each.scatter === undefined ? each.basis ?? '' : sentence`${each.scatter.kind}, ${printed(each.scatter.value)} ${each.scatter.unit === 'response' ? measurand.responseUnit ?? '' : measurand.unit}`
  return row(name, scatter, number(each.criticalValue), number(each.detectionLimit), intervalWords(each.interval, three), number(each.quantitationLimit), each.n === undefined ? '' : count(each.n), each.df === undefined ? '' : degreesOfFreedom(each.df))
}

function governingName(definition: string, roles: string): readonly Inline[] {
  return [{ type: 'strong', children: [{ type: 'text', value: definition }] }, { type: 'text', value: ` (governs ${roles})` }]
}

function netNote({ definitions, settings }: DetectionDetail): readonly Words[] {
  const factor = definitions.find((each) => each.netFactor !== undefined)?.netFactor
  if (factor === undefined) return []
  const measured = settings.sampleReplicates === 1 ? textOf('A result is one measurement') : sentence`A result is the mean of ${count(settings.sampleReplicates)} measurements`
  const subtracted = settings.blankReplicates === undefined ? [] : sentence`, from which a mean of ${count(settings.blankReplicates)} blanks is subtracted`
  return [joined([measured, subtracted, sentence`: the scatter of blanks is multiplied by ${printed(factor)}.`], '')]
}

function lineExhibits({ detail, measurand, prefix }: Detection): readonly ReportBlock[] {
  const { line } = detail
  if (line === undefined) return []
  const unit = measurand.responseUnit ?? ''
  const origin = line.block === undefined ? `a straight line fitted to dataset ${line.dataset}` : `the line of ${line.block}`
  const converts = [detail.blanks, detail.spikes].some((series) => series?.quantity === 'response')
  return [
    paragraph(
      !converts ? [] : sentence`Responses become concentrations through ${origin}, slope ${printed(line.slope)} and intercept ${printed(line.intercept)} ${unit}.`,
      sentence`The scatter of calibration is that of an unweighted straight line through ${count(line.own.n)} responses from ${asTyped(line.own.lowest)} to ${asTyped(line.own.highest)} ${measurand.unit}: residual standard deviation ${printed(line.own.residualStandardDeviation)} ${unit} (df ${count(line.own.df)}), standard error of the intercept ${printed(line.own.interceptStandardError)} ${unit}.`,
    ),
    ...(line.curves === undefined ? [] : [table({
      id: `${prefix}-curves`, caption: `Independent calibration curves of ${measurand.name} behind the intercept scatter`,
      columns: [column('Curve', { align: 'text', rowHeader: true }), column('n'), column('Slope'), column('Intercept', { unit })],
      rows: line.curves.map((each) => row(each.run, count(each.n), printed(each.slope), printed(each.intercept))),
    })]),
  ]
}

function seriesTable({ measurand, prefix }: Detection, series: SeriesDetail | undefined, name: 'blanks' | 'spikes'): readonly ReportBlock[] {
  if (series === undefined) return []
  const { points, excluded, censored, quantity, summary: found } = series
  const fields = [...new Set([...points, ...excluded, ...censored].flatMap((each) => Object.keys(each.factors)))].sort()
  const levels = [...points, ...excluded].some((each) => each.level !== undefined)
  const read = quantity === 'response' && points.some((each) => each.concentration !== undefined)
  const decimals = columnDecimals([...points, ...excluded].flatMap((each) => each.concentration ?? []))
  const cells = (each: SeriesPoint): readonly Words[] => [
    short(each.value), ...(read ? [each.concentration === undefined ? '' : printed(each.concentration, { decimals })] : []), ...(levels ? [each.level === undefined ? '' : asTyped(each.level)] : []), ...fields.map((field) => each.factors[field] ?? ''),
  ]
  const gap: readonly Words[] = [...(read ? [''] : []), ...(levels ? [''] : [])]
  return [table({
    id: `${prefix}-${name}`, caption: `${name === 'blanks' ? 'Blanks' : 'Spikes'} of ${measurand.name} (dataset ${series.dataset})`,
    columns: [
      column(quantity === 'response' ? 'Response' : 'Result', { unit: quantity === 'response' ? measurand.responseUnit : measurand.unit }), ...(read ? [column('Concentration', { unit: measurand.unit })] : []),
      ...(levels ? [column('Level', { unit: measurand.unit })] : []), ...fields.map((field) => column(field, { align: 'text' })),
    ],
    groups: [[...points.map((each) => row(...cells(each))), ...censored.map((each) => row(each.text, ...gap, ...fields.map((field) => each.factors[field] ?? '')))], excluded.map((each) => excludedRow(...cells(each)))].filter((group) => group.length > 0),
    notes: [
      ...(found === undefined ? [] : [sentence`n ${count(found.n)}${censored.length === 0 ? [] : sentence`, without number ${count(censored.length)}`}; mean ${printed(found.mean)}, standard deviation ${printed(found.standardDeviation)}, lowest ${asTyped(found.lowest)}, highest ${asTyped(found.highest)} ${(quantity === 'response' ? measurand.responseUnit : measurand.unit) ?? ''}.`]),
      ...(read ? ['Concentrations follow from the calibration line, also below its lowest standard; negative values are kept.'] : []),
      ...(excluded.length === 0 ? [] : ['Rows set apart are excluded, see the list of exclusions.']),
    ],
  })]
}

function dotPlot(presented: Detection): readonly ReportBlock[] {
  const { detail, measurand, prefix } = presented
  const groups = [['blanks', detail.blanks], ['spikes', detail.spikes]] as const
  const placed = (group: string, points: readonly SeriesPoint[]): readonly { readonly group: string; readonly value: number }[] => points.flatMap((each) => (each.concentration === undefined ? [] : [{ group, value: each.concentration }]))
  const dots = groups.flatMap(([group, series]) => (series === undefined ? [] : [...placed(group, series.points), ...placed(`${group} (excluded)`, series.excluded)]))
  if (dots.length === 0) return []
  const censored = groups.flatMap(([group, series]) => (series?.censored ?? []).flatMap((each) => (each.bound === undefined || each.direction === undefined ? [] : [{ group, bound: each.bound, direction: each.direction }])))
  const lines = limitLines(detail)
  const shown = groups.flatMap(([name, series]) => (series?.concentrations === undefined ? [] : [[name, { concentrations: series.concentrations }] as const]))
  const silent = groups.reduce((sum, [, series]) => sum + (series?.censored.filter((each) => each.bound === undefined).length ?? 0), 0)
  return [figure({
    id: `${prefix}-dots`, caption: `${detail.spikes === undefined ? 'Blanks' : detail.blanks === undefined ? 'Spikes' : 'Blanks and spikes'} of ${measurand.name} with the lower limits${silent === 0 ? '' : '; values that were not detected have no place on the axis and stand in the table'}`,
    alternative: `Single values in ${measurand.unit}. ${[...shown.map(([name, { concentrations }]) => `${name}: ${numberText(concentrations.lowest, three)} to ${numberText(concentrations.highest, three)}`), ...lines.map((line) => `${line.label}: ${numberText(line.value, three)}`)].join('; ')}.`,
    chart: dotPlotChart({ xTitle: axis(measurand), dots, censored, lines }),
  })]
}

function distributionFigures({ detail, measurand, prefix }: Detection): readonly ReportBlock[] {
  return detail.distributions.map((each, index) => figure({
    id: `${prefix}-distributions-${index + 1}`, caption: `Net values of a blank and of a sample at the detection limit, by ${each.definition}; normal curves with the estimated scatter`,
    alternative: `Two normal curves in ${measurand.unit}, centred on zero and on ${numberText(each.detectionLimit, three)}, each with standard deviation ${numberText(each.standardDeviation, three)}; the critical value ${numberText(each.criticalValue, three)} lies between them.`,
    chart: distributionsChart({ xTitle: `Net ${axis(measurand)}`, curves: each.curves, lines: [{ value: each.criticalValue, label: 'critical value' }, { value: each.detectionLimit, label: 'detection limit' }] }),
  }))
}

function mdlExhibits({ measurand, prefix }: Detection, mdl: MdlDetail): readonly ReportBlock[] {
  const { spikes, blanks, schedule } = mdl
  const side = (value: number | undefined): Words => (value === undefined ? '' : printed(value))
  const rules: Readonly<Record<typeof blanks.rule, string>> = {
    'no blank gives a number': 'no blank gives a number: blanks set no limit', 'highest blank': 'some blanks give a number: the highest of them',
    'mean plus t s': 'all blanks give a number: mean (not below zero) plus t × s', '99th percentile': 'a hundred blanks or more: the value at the upper percentile',
  }
  return [
    table({
      id: `${prefix}-mdl`, caption: `Method detection limit of ${measurand.name}`,
      columns: [column('From', { align: 'text', rowHeader: true }), column('n'), column('With a number'), column('Mean', { unit: measurand.unit }), column('s', { unit: measurand.unit }), column('t'), column('Limit', { unit: measurand.unit }), column('Rule', { align: 'text' })],
      rows: [
        row('spikes', count(spikes.n), count(spikes.n), printed(spikes.mean), printed(spikes.standardDeviation), printed(spikes.t), printed(spikes.limit), 't × s'),
        row('blanks', count(blanks.n), count(blanks.numeric), side(blanks.mean), side(blanks.standardDeviation), side(blanks.t), side(blanks.limit), rules[blanks.rule]),
        ...(mdl.mdl === undefined ? [] : [{ ...row('method detection limit', '', '', '', '', '', printed(mdl.mdl), 'the larger one'), tone: 'total' as const }]),
      ],
      notes: ['t is one-sided at the 99 % level with n - 1 degrees of freedom. A blank without a number counts as no zero.'],
    }),
    table({
      id: `${prefix}-mdl-design`, caption: `Design of the method detection limit of ${measurand.name}`,
      columns: [column('Rule', { align: 'text', rowHeader: true }), column('Found'), column('Needed', { align: 'text' }), column('Met', { align: 'text' })],
      rows: mdl.checks.map((check) => row(check.rule, check.found === undefined ? '' : whole(check.found), check.needed, check.met === undefined ? 'cannot be shown' : check.met ? 'yes' : 'no')),
    }),
    table({
      id: `${prefix}-mdl-schedule`, caption: `Spikes + blanks by date (${schedule.dateField}) and batch`,
      columns: [column('Date', { align: 'text', rowHeader: true }), ...schedule.batches.map((batch) => column(batch === '' ? 'no batch mapped' : `batch ${batch}`, { align: 'text' }))],
      rows: schedule.dates.map((date) => row(date === '' ? 'no date mapped' : date, ...schedule.batches.map((batch): Words => {
        const here = schedule.counts.find((each) => each.date === date && each.batch === batch)
        return here === undefined || here.spikes + here.blanks === 0 ? '' : sentence`${count(here.spikes)} + ${count(here.blanks)}`
      }))),
    }),
  ]
}

function traceExhibits({ measurand, prefix }: Detection, trace: TraceDetail): readonly ReportBlock[] {
  const unit = measurand.responseUnit ?? ''
  const convention = trace.convention === 'rms' ? 'height over the standard deviation of the baseline (H/s)' : 'twice the height over the peak-to-peak noise (2H/h)'
  return [
    paragraph(
      sentence`At ${asTyped(trace.level)} ${measurand.unit} the peak stands ${printed(trace.height)} ${unit} above the baseline and the noise over ${count(trace.baselinePoints)} baseline points is ${printed(trace.noise)} ${unit}.`,
      sentence`The signal-to-noise ratio, ${convention}, is ${printed(trace.ratio)}.`,
      trace.halfWidth === undefined ? [] : sentence`The peak is ${printed(trace.halfWidth, three)} wide at half height.`,
      textOf('The baseline is a straight line through the baseline windows, drawn on under the peak.'),
    ),
    figure({
      id: `${prefix}-trace`, caption: `Signal trace of ${measurand.name} with the windows of baseline and peak (dataset ${trace.dataset})`,
      alternative: `Trace of ${trace.points.length} points. Baseline ${trace.baseline.map((each) => `${each.from} to ${each.to}`).join(' and ')}, peak ${trace.peak.from} to ${trace.peak.to}; height ${numberText(trace.height, three)}, noise ${numberText(trace.noise, three)}, ratio ${numberText(trace.ratio, three)}.`,
      chart: traceChart({
        xTitle: 'Time', yTitle: `Signal${unit === '' ? '' : ` (${unit})`}`, points: trace.points,
        windows: [...trace.baseline.map((each) => ({ ...each, label: 'baseline' })), { ...trace.peak, label: 'peak' }], lines: [{ value: trace.baselineAtPeak, label: 'baseline' }, { value: trace.apex.signal, label: 'apex' }],
      }),
    }),
  ]
}

function confirmationTable({ detail, measurand, prefix, confidence }: Detection): readonly ReportBlock[] {
  const { confirmation } = detail
  if (confirmation === undefined) return []
  const interval = (found: FindingInterval | undefined): readonly Inline[] => intervalWords(found, { decimals: 1 })
  return [table({
    id: `${prefix}-confirmation`, caption: `Results of ${measurand.name} at the quantitation limit (dataset ${confirmation.dataset})`,
    columns: [
      column('Level', { unit: measurand.unit, rowHeader: true }), column('Results', { unit: measurand.unit, align: 'text' }), column('n'), column('Mean', { unit: measurand.unit }), column('RSD', { unit: '%' }),
      column('Recovery', { unit: '%' }), column(`${asPercent(confidence)} interval of the recovery`, { unit: '%', align: 'text' }), column('Note', { align: 'text' }),
    ],
    rows: confirmation.levels.map((each) => row(
      asTyped(each.level), joined(each.values.map((value) => [short(value)]), '; '), count(each.n), number(each.mean), each.relativeStandardDeviation === undefined ? '' : printed(each.relativeStandardDeviation, { decimals: 1 }),
      each.recovery === undefined ? '' : printed(each.recovery, { decimals: 1 }), interval(each.recoveryInterval), each.because === undefined ? '' : `not evaluable: ${each.because}`,
    )),
    notes: ['Recovery: mean result over the level, with the Student t interval of the mean. RSD: standard deviation over the mean.', ...(confirmation.excluded.length === 0 ? [] : [sentence`Excluded and not counted: ${joined(confirmation.excluded.map((each) => [asTyped(each.value)]), '; ')}.`])],
  })]
}

const three = { significant: 3 } as const

function number(value: number | undefined): Words {
  return value === undefined ? '' : printed(value, three)
}

/** Counts plain, ratios with three digits. */
function whole(value: number): Words {
  return Number.isInteger(value) ? count(value) : printed(value, three)
}

/** As typed, unless a computation left many digits. */
function short(value: number): NumberNode {
  return String(value).length <= 9 ? asTyped(value) : printed(value)
}

function axis(measurand: Detection['measurand']): string {
  return `${measurand.name} (${measurand.unit})`
}

function asPercent(fraction: number): string {
  return `${Number((fraction * 100).toPrecision(6))} %`
}

function limitLines({ reported, definitions, governing }: DetectionDetail): readonly { readonly value: number; readonly label: string }[] {
  const critical = (definitions.find((each) => each.definition === governing.detection && each.criticalValue !== undefined) ?? definitions.find((each) => each.criticalValue !== undefined))?.criticalValue
  return [
    ...(critical === undefined ? [] : [{ value: critical, label: 'critical value' }]), ...(reported.detection === undefined ? [] : [{ value: reported.detection, label: 'detection limit' }]),
    ...(reported.quantitation === undefined ? [] : [{ value: reported.quantitation, label: 'quantitation limit' }]),
  ]
}

function criterionLines({ verdicts }: Detection, kind: 'detection' | 'quantitation'): readonly { readonly value: number; readonly label: string }[] {
  const found = verdicts.filter((each) => each.metric === `${kind}-limit`)
  return found.flatMap(({ limit, criterion }) => (limit.kind === 'between' ? [limit.low.value, limit.high.value] : [limit.bound.value]).map((value) => ({ value, label: `${kind} ${criterion}` })))
}
