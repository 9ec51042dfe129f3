// The exhibits and sentences of accuracy, from its detail alone.
import { axisTitle, column, excludedRow, figure, paragraph, row, secondary, sentence, table, textOf, type Words } from '../../present/build.ts'
import { levelIntervalChart } from '../../present/charts/level-interval-chart.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asMeasured, asTyped, columnDecimals, count, type NumberFormat, numberText, printed, probability } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { AccuracyDetail, AccuracyLevel } from './detail.ts'

type Shown = Presented<AccuracyDetail>

export function presentAccuracy(shown: Shown): readonly ReportBlock[] {
  return [summary(shown), levels(shown), chart(shown), ...secondary(shown, () => [preparations(shown)])]
}

function unitOf({ detail, measurand }: Shown): string {
  return detail.mode === 'recovery' ? '%' : measurand.unit
}

function spaced(unit: string): string {
  return unit === '' ? '' : unit === '%' ? '\u202f%' : `\u00a0${unit}`
}

function at(level: AccuracyLevel, unit: string): readonly Inline[] {
  return level.level === undefined ? [] : sentence` at ${asTyped(level.level)}${spaced(unit)}`
}

function summary(shown: Shown): ReportBlock {
  const { detail, measurand, verdicts } = shown
  const unit = spaced(unitOf(shown))
  const word = detail.mode === 'recovery' ? 'mean recovery' : 'bias'
  const sorted = [...detail.levels].sort((left, right) => left.mean - right.mean)
  const [lowest, highest] = [sorted[0], sorted.at(-1)]
  const basis = verdicts.some((verdict) => verdict.decideBy === 'interval') ? 'Criteria are held against the whole interval of the mean.' : 'Criteria are held against the mean.'
  return paragraph(
    ...(lowest === undefined || highest === undefined ? [] : lowest === highest
      ? [sentence`The ${word} is ${printed(lowest.mean)}${unit}${at(lowest, measurand.unit)}.`]
      : [sentence`The lowest ${word} is ${printed(lowest.mean)}${unit}${at(lowest, measurand.unit)}, the highest ${printed(highest.mean)}${unit}${at(highest, measurand.unit)}.`]),
    ...(detail.mode === 'recovery' ? [textOf(detail.nativeCorrected ? 'The native content was taken off before the recovery was computed.' : 'No native content was taken off.')] : []),
    ...(verdicts.length === 0 ? [] : [textOf(basis)]),
    ...(detail.agreement === undefined ? [] : [sentence`Analysis of variance between the levels: F = ${printed(detail.agreement.F)} with ${count(detail.agreement.df1)} and ${count(detail.agreement.df2)} degrees of freedom, probability ${probability(detail.agreement.probability)}; ${detail.agreement.agree ? 'no difference between levels is seen, and a mean over all levels is given.' : 'the levels differ, and no mean over all levels is given.'}`]),
  )
}

function levels(shown: Shown): ReportBlock {
  const { detail, measurand, prefix } = shown
  const unit = unitOf(shown)
  const line = (level: AccuracyLevel, name: readonly Inline[]): ReturnType<typeof row> => row(
    name, count(level.n), printed(level.mean, digits(level)), level.standardDeviation === undefined ? '' : printed(level.standardDeviation), level.relative === undefined ? '' : printed(level.relative, { decimals: 2 }),
    level.low === undefined || level.high === undefined ? '' : sentence`${printed(level.low, digits(level))} to ${printed(level.high, digits(level))}`, level.intervalMethod ?? '',
  )
  return table({
    id: `${prefix}-levels`, caption: detail.mode === 'recovery' ? 'Recovery by level' : 'Bias by level',
    columns: [
      column('Level', { unit: measurand.unit, rowHeader: true }), column('n'), column('Mean', { unit }), column('Standard deviation', { unit }), column(detail.mode === 'recovery' ? 'Relative standard deviation' : 'Relative bias', { unit: '%' }),
      column('Interval of the mean', { align: 'text', unit }), column('Interval by', { align: 'text' }),
    ],
    groups: [detail.levels.map((level) => line(level, level.level === undefined ? textOf('all') : [asTyped(level.level)])), ...(detail.overall === undefined || detail.levels.length < 2 ? [] : [[line(detail.overall, textOf('all levels'))]])],
  })
}

/** Mean and interval of a level in one place of decimals, so that they can be held against a limit. */
function digits(level: AccuracyLevel): NumberFormat {
  return { decimals: columnDecimals([level.mean, level.low ?? 0, level.high ?? 0], 5) }
}

function chart(shown: Shown): ReportBlock {
  const { detail, measurand, prefix, verdicts } = shown
  const name = (level: number | undefined): string => (level === undefined ? 'all' : String(level))
  const metric = detail.mode === 'recovery' ? 'recovery' : 'bias'
  const limit = verdicts.find((verdict) => verdict.metric === metric)?.limit
  const limits = limit === undefined ? [] : limit.kind === 'between' ? [{ value: limit.low.value, label: 'lower limit' }, { value: limit.high.value, label: 'upper limit' }] : [{ value: limit.bound.value, label: 'limit' }]
  return figure({
    id: `${prefix}-by-level`, caption: sentence`${detail.mode === 'recovery' ? 'Recovery' : 'Bias'} of ${measurand.name} by level: single preparations, mean and interval${limits.length === 0 ? '' : ', and the limits'}, n = ${count(detail.preparations.length)}`,
    alternative: `${detail.preparations.length} ${detail.preparations.length === 1 ? 'preparation' : 'preparations'} of ${measurand.name} at ${levelsOf(detail).length} ${levelsOf(detail).length === 1 ? 'level' : 'levels'}; ${metric} by level: ${detail.levels.map((level) => `${name(level.level)}${spaced(measurand.unit)}, ${numberText(level.mean)}${spaced(unitOf(shown))}`).join('; ')}.`,
    chart: levelIntervalChart({
      xTitle: axisTitle('level', measurand.unit), yTitle: axisTitle(metric, unitOf(shown)), points: detail.preparations.map((each) => ({ level: name(each.level), value: each.value })),
      excluded: detail.excluded.map((each) => ({ level: name(each.level), value: each.value, label: `excluded (${each.exclusion})` })),
      means: detail.levels.map((level) => ({ level: name(level.level), mean: level.mean, ...(level.low === undefined || level.high === undefined ? {} : { low: level.low, high: level.high }) })), limits,
    }),
  })
}

/** Levels of every preparation, also of those at which nothing could be evaluated. */
function levelsOf(detail: AccuracyDetail): readonly (number | undefined)[] {
  return [...new Set([...detail.preparations, ...detail.excluded].map((each) => each.level))].sort((left, right) => (left ?? 0) - (right ?? 0))
}

function preparations(shown: Shown): ReportBlock {
  const { detail, measurand, prefix } = shown
  const level = (value: number | undefined): readonly Inline[] => (value === undefined ? [] : [asTyped(value)])
  // A column in which nothing stands is left out.
  const [named, native] = [detail.preparations.some((each) => each.sample !== ''), detail.nativeCorrected]
  const cells = (sample: string, own: Words, rest: readonly Words[]): readonly Words[] => [...(named ? [sample] : []), ...(native ? [own] : []), ...rest]
  const groups = levelsOf(detail).map((own) => [
    ...detail.preparations.filter((each) => each.level === own).map((each) => row(level(each.level), ...cells(each.sample, each.native === undefined ? '' : printed(each.native), [asTyped(each.target), asMeasured(each.found), printed(each.value, { significant: 4 })]))),
    ...detail.excluded.filter((each) => each.level === own).map((each) => excludedRow(named ? level(each.level) : [...level(each.level), ...textOf(' excluded')], ...cells('excluded', '', ['', asMeasured(each.found), printed(each.value, { significant: 4 })]))),
  ])
  return table({
    id: `${prefix}-preparations`, caption: 'Every preparation',
    columns: [
      column('Level', { unit: measurand.unit, rowHeader: true }), ...(named ? [column('Sample', { align: 'text' })] : []), ...(native ? [column('Native', { unit: measurand.unit })] : []),
      column(detail.mode === 'recovery' ? 'Added' : 'Reference', { unit: measurand.unit }), column('Found', { unit: measurand.unit }), column(detail.mode === 'recovery' ? 'Recovery' : 'Bias', { unit: unitOf(shown) }),
    ],
    groups,
  })
}
