// The exhibits and sentences of precision, from its detail alone.
import { column, excludedRow, figure, joined, paragraph, row, sentence, table, textOf } from '../../present/build.ts'
import { componentBarsChart } from '../../present/charts/component-bars-chart.ts'
import { groupedValuesChart } from '../../present/charts/grouped-values-chart.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asMeasured, asTyped, columnDecimals, count, degreesOfFreedom, printed } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { PrecisionDetail, PrecisionLevel } from './detail.ts'

type Shown = Presented<PrecisionDetail>

export function presentPrecision(shown: Shown): readonly ReportBlock[] {
  const { levels } = shown.detail
  return [summary(shown), overview(shown), ...levels.flatMap((level) => [valuesFigure(shown, level), valuesTable(shown, level), ...anova(shown, level)]), ...components(shown), ...horwitz(shown)]
}

function unit(text: string): string {
  return text === '' ? '' : `\u00a0${text}`
}

function at({ measurand }: Shown, level: PrecisionLevel): readonly Inline[] {
  return level.level === undefined ? textOf('over all results') : sentence`at ${asTyped(level.level)}${unit(measurand.unit)}`
}

function prefixOf({ prefix, detail }: Shown, level: PrecisionLevel): string {
  return `${prefix}-level-${detail.levels.indexOf(level) + 1}`
}

function summary(shown: Shown): ReportBlock {
  const { detail, measurand } = shown
  return paragraph(
    ...detail.levels.map((level) => joined([
      sentence`${count(level.n)} results in ${count(level.runs.length)} ${level.runs.length === 1 ? 'run' : 'runs'} ${at(shown, level)} have a repeatability standard deviation of ${printed(level.repeatability.value)}${unit(measurand.unit)}`,
      level.intermediate === undefined ? [] : sentence`and an intermediate-precision standard deviation of ${printed(level.intermediate.value)}${unit(measurand.unit)}`,
    ], ' ').concat(textOf('.'))),
    ...(detail.levels.some((level) => level.truncated) ? [textOf('A negative component of variance was estimated and is taken as zero; the estimate stands in the table.')] : []),
    ...(detail.confounded.length > 0 ? [textOf(`Contributions that cannot be separated: ${detail.confounded.join('; ')}.`)] : []),
  )
}

function overview({ detail, measurand, prefix }: Shown): ReportBlock {
  return table({
    id: `${prefix}-spreads`, caption: 'Standard deviations by level, with intervals',
    columns: [
      column('Level', { unit: measurand.unit, rowHeader: true }), column('n'), column('Mean', { unit: measurand.unit }), column('Kind', { align: 'text' }), column('Standard deviation', { unit: measurand.unit }),
      column('Interval', { align: 'text', unit: measurand.unit }), column('df'), column('Relative', { unit: '%' }),
    ],
    groups: detail.levels.map((level) => [
      row(level.level === undefined ? 'all' : asTyped(level.level), count(level.n), printed(level.mean, { significant: 5 }), 'repeatability', printed(level.repeatability.value), sentence`${printed(level.repeatability.low)} to ${printed(level.repeatability.high)}`, degreesOfFreedom(level.repeatability.df), level.repeatability.relative === undefined ? '' : printed(level.repeatability.relative, { decimals: 2 })),
      ...(level.intermediate === undefined ? [] : [row('', '', '', 'intermediate', printed(level.intermediate.value), sentence`${printed(level.intermediate.low)} to ${printed(level.intermediate.high)}`, degreesOfFreedom(level.intermediate.satterthwaiteDf), level.intermediate.relative === undefined ? '' : printed(level.intermediate.relative, { decimals: 2 }))]),
    ]),
    notes: ['Repeatability: chi-square interval. Intermediate precision: modified large sample interval; degrees of freedom by Satterthwaite.'],
  })
}

function valuesFigure(shown: Shown, level: PrecisionLevel): ReportBlock {
  const { measurand } = shown
  return figure({
    id: `${prefixOf(shown, level)}-values`, caption: [...sentence`Single results of ${measurand.name} by run `, ...at(shown, level), ...sentence`, n = ${count(level.n)}, with run means and the grand mean`],
    alternative: `${level.n} single results of ${measurand.name} in ${level.runs.length} runs with the mean of each run.`,
    chart: groupedValuesChart({
      groupTitle: shown.detail.runFields.length === 0 ? 'run' : shown.detail.runFields.join(' · '), yTitle: `result / ${measurand.unit}`, values: level.runs.flatMap((run) => run.values.map((value) => ({ group: run.run === '' ? 'all' : run.run, value }))),
      excluded: level.excluded.map((each) => ({ group: each.run === '' ? 'all' : each.run, value: each.value, label: `excluded (${each.exclusion})` })), means: level.runs.map((run) => ({ group: run.run === '' ? 'all' : run.run, mean: run.mean })), overall: level.mean, limits: [],
    }),
  })
}

function valuesTable(shown: Shown, level: PrecisionLevel): ReportBlock {
  const decimals = columnDecimals([level.mean], 5)
  return table({
    id: `${prefixOf(shown, level)}-results`, caption: [...textOf('Results by run '), ...at(shown, level)],
    columns: [column('Run', { align: 'text', rowHeader: true }), column('n'), column('Results', { align: 'text', unit: shown.measurand.unit }), column('Mean', { unit: shown.measurand.unit })],
    rows: [
      ...level.runs.map((run) => row(run.run === '' ? 'all' : run.run, count(run.values.length), joined(run.values.map((value) => [asMeasured(value)]), '; '), printed(run.mean, { decimals }))),
      ...level.excluded.map((each) => excludedRow(`${each.run}, excluded`, '', asMeasured(each.value), '')),
    ],
  })
}

function anova(shown: Shown, level: PrecisionLevel): readonly ReportBlock[] {
  if (level.anova.length === 0) return []
  return [table({
    id: `${prefixOf(shown, level)}-anova`, caption: [...textOf('Analysis of variance '), ...at(shown, level)],
    columns: [column('Source', { align: 'text', rowHeader: true }), column('df'), column('Sum of squares'), column('Mean square')],
    rows: level.anova.map((each) => row(each.source, count(each.df), printed(each.sumOfSquares, { significant: 6 }), printed(each.meanSquare, { significant: 6 }))),
    ...(level.n0 === undefined ? {} : { notes: [sentence`Effective number of results in a run: ${printed(level.n0, { significant: 5 })}.`] }),
  })]
}

function components(shown: Shown): readonly ReportBlock[] {
  const { detail, measurand, prefix } = shown
  const levels = detail.levels.filter((level) => level.components.length > 0)
  if (levels.length === 0) return []
  return [
    table({
      id: `${prefix}-components`, caption: 'Components of variance',
      columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Component', { align: 'text' }), column('Variance as estimated'), column('Standard deviation used', { unit: measurand.unit }), column('Share', { unit: '%' })],
      groups: levels.map((level) => level.components.map((each, index) => row(index === 0 ? (level.level === undefined ? 'all' : asTyped(level.level)) : '', each.component, printed(each.raw), printed(each.standardDeviation), printed(each.share, { decimals: 1 })))),
      ...(levels.some((level) => level.truncated) ? { notes: ['A negative estimate is taken as zero for the standard deviation; the mean square within runs then stands alone.'] } : {}),
    }),
    ...levels.slice(-1).map((level) => figure({
      id: `${prefix}-components-chart`, caption: [...textOf(`Components of the spread of ${measurand.name} `), ...at(shown, level), ...sentence`, n = ${count(level.n)}`],
      alternative: `Standard deviations of the components ${level.components.map((each) => each.component).join(', ')} and of the whole.`,
      chart: componentBarsChart({
        xTitle: `standard deviation / ${measurand.unit}`,
        bars: [
          { component: 'within runs', value: level.repeatability.value, low: level.repeatability.low, high: level.repeatability.high },
          ...level.components.filter((each) => each.component !== 'within runs').map((each) => ({ component: each.component, value: each.standardDeviation })),
          ...(level.intermediate === undefined ? [] : [{ component: 'intermediate precision', value: level.intermediate.value, low: level.intermediate.low, high: level.intermediate.high }]),
        ],
      }),
    })),
  ]
}

function horwitz({ detail, measurand, prefix }: Shown): readonly ReportBlock[] {
  const levels = detail.levels.filter((level) => level.horwitz !== undefined)
  if (levels.length === 0) return []
  return [table({
    id: `${prefix}-horwitz`, caption: 'Relative standard deviations beside the reproducibility predicted from the mass fraction',
    columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Mass fraction', { align: 'text' }), column('Predicted', { unit: '%' }), column('Ratio, repeatability'), column('Ratio, intermediate')],
    rows: levels.flatMap((level) => (level.horwitz === undefined ? [] : [row(level.level === undefined ? 'all' : asTyped(level.level), printed(level.horwitz.massFraction), printed(level.horwitz.predicted), printed(level.horwitz.ratioRepeatability), level.horwitz.ratioIntermediate === undefined ? '' : printed(level.horwitz.ratioIntermediate))])),
    notes: ['The denominator is always the predicted reproducibility, for repeatability too.'],
  })]
}
