// The exhibits and sentences of precision, from its detail alone.
import { axisTitle, column, excludedRow, figure, joined, paragraph, row, secondary, sentence, table, textOf, type Words } from '../../present/build.ts'
import { componentBarsChart } from '../../present/charts/component-bars-chart.ts'
import { groupedValuesChart } from '../../present/charts/grouped-values-chart.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asMeasured, asTyped, columnDecimals, count, degreesOfFreedom, printed } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { PrecisionDetail, PrecisionLevel } from './detail.ts'

type Shown = Presented<PrecisionDetail>

export function presentPrecision(shown: Shown): readonly ReportBlock[] {
  return [summary(shown), overview(shown), valuesFigure(shown), ...secondary(shown, () => [valuesTable(shown), ...anova(shown), ...components(shown)]), ...horwitz(shown)]
}

function unit(text: string): string {
  return text === '' ? '' : `\u00a0${text}`
}

function squared(text: string): string {
  return text.includes('/') ? `(${text})²` : text === '' || text === '1' ? text : `${text}²`
}

/** Nested groups by the fields that make them: `between outer groups (day)`. */
function componentName({ isNested, runFields }: PrecisionDetail, name: string): string {
  const fields = { 'between outer groups': runFields.slice(0, -1), 'between inner groups': runFields.slice(-1) }[name]
  return !isNested || fields === undefined ? name : `${name} (${fields.join(', ')})`
}

function at({ measurand }: Shown, level: PrecisionLevel): readonly Inline[] {
  return level.level === undefined ? [] : sentence`at ${asTyped(level.level)}${unit(measurand.unit)}`
}

function summary(shown: Shown): ReportBlock {
  const { detail, measurand } = shown
  return paragraph(
    ...detail.levels.map((level) => joined([
      sentence`${count(level.n)} results${detail.runFields.length === 0 ? [] : sentence` in ${count(level.runs.length)} ${level.runs.length === 1 ? 'run' : 'runs'}`}${level.level === undefined ? [] : [...textOf(' '), ...at(shown, level)]} have a repeatability standard deviation of ${printed(level.repeatability.value)}${unit(measurand.unit)}`,
      level.intermediate === undefined ? [] : sentence`and an intermediate-precision standard deviation of ${printed(level.intermediate.value)}${unit(measurand.unit)}`,
    ], ' ').concat(textOf('.'))),
    ...(detail.levels.some((level) => level.truncated) ? [textOf('A negative component of variance was estimated and is taken as zero; the estimate stands in the table.')] : []),
    ...(detail.confounded.length > 0 ? [textOf(`Contributions that cannot be separated: ${detail.confounded.join('; ')}.`)] : []),
  )
}

function overview({ detail, measurand, prefix }: Shown): ReportBlock {
  const methods = [...new Set(detail.levels.flatMap((level) => level.intermediate?.intervalMethod ?? []))]
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
    notes: [
      `Repeatability: chi-square interval.${methods.length === 0 ? '' : ` Intermediate precision: interval by ${methods.join(' or ')}; degrees of freedom by Satterthwaite.`}`,
      ...(detail.levels.some((level) => level.intermediate !== undefined && new Set(level.runs.map((run) => run.values.length)).size > 1) ? ['Runs differ in size: the interval and the degrees of freedom of the intermediate precision are approximate.'] : []),
    ],
  })
}

function panelOf({ measurand, detail }: Shown, level: PrecisionLevel): { readonly panel?: string } {
  return detail.levels.length < 2 ? {} : { panel: level.level === undefined ? 'all' : `${level.level} ${measurand.unit}` }
}

function valuesFigure(shown: Shown): ReportBlock {
  const { measurand, detail, prefix } = shown
  const named = (run: string): string => (run === '' ? 'all' : run)
  const single = detail.levels.length === 1 ? detail.levels[0] : undefined
  return figure({
    id: `${prefix}-values`, caption: [...textOf(`Single results of ${measurand.name} by run, with run means; n = `), ...joined(detail.levels.map((level) => [count(level.n)]), ', ')],
    alternative: `Single results of ${measurand.name} by run at ${detail.levels.length} ${detail.levels.length === 1 ? 'level' : 'levels'}, with the mean of each run.`,
    chart: groupedValuesChart({
      groupTitle: detail.runFields.length === 0 ? 'run' : detail.runFields.join(' · '), yTitle: axisTitle('result', measurand.unit), limits: [], ...(single === undefined ? {} : { overall: single.mean }),
      values: detail.levels.flatMap((level) => level.runs.flatMap((run) => run.values.map((value) => ({ group: named(run.run), value, ...panelOf(shown, level) })))),
      excluded: detail.levels.flatMap((level) => level.excluded.map((each) => ({ group: named(each.run), value: each.value, label: `E${each.exclusion}`, ...panelOf(shown, level) }))),
      means: detail.levels.flatMap((level) => level.runs.map((run) => ({ group: named(run.run), mean: run.mean, ...panelOf(shown, level) }))),
    }),
  })
}

function levelCell(level: PrecisionLevel, isFirst: boolean): Words {
  return isFirst ? (level.level === undefined ? 'all' : asTyped(level.level)) : ''
}

function valuesTable(shown: Shown): ReportBlock {
  const { measurand, detail, prefix } = shown
  return table({
    id: `${prefix}-results`, caption: 'Results by run',
    columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Run', { align: 'text' }), column('n'), column('Results', { align: 'text', unit: measurand.unit }), column('Mean', { unit: measurand.unit })],
    groups: detail.levels.map((level) => [
      ...level.runs.map((run, index) => row(levelCell(level, index === 0), run.run === '' ? 'all' : run.run, count(run.values.length), joined(run.values.map((value) => [asMeasured(value)]), '; '), printed(run.mean, { decimals: columnDecimals([level.mean], 5) }))),
      ...level.excluded.map((each) => excludedRow('', `${each.run}, excluded`, '', asMeasured(each.value), '')),
    ]),
  })
}

function anova({ measurand, detail, prefix }: Shown): readonly ReportBlock[] {
  const levels = detail.levels.filter((level) => level.anova.length > 0)
  if (levels.length === 0) return []
  return [table({
    id: `${prefix}-anova`, caption: 'Analysis of variance',
    columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Source', { align: 'text' }), column('df'), column('Sum of squares', { align: 'text', unit: squared(measurand.unit) }), column('Mean square', { align: 'text', unit: squared(measurand.unit) }), column('Effective number in a run')],
    groups: levels.map((level) => level.anova.map((each, index) => row(levelCell(level, index === 0), componentName(detail, each.source), count(each.df), printed(each.sumOfSquares, { significant: 6 }), printed(each.meanSquare, { significant: 6 }), index === 0 && level.n0 !== undefined ? printed(level.n0, { significant: 5 }) : ''))),
  })]
}

function components(shown: Shown): readonly ReportBlock[] {
  const { detail, measurand, prefix } = shown
  const levels = detail.levels.filter((level) => level.components.length > 0)
  if (levels.length === 0) return []
  return [
    table({
      id: `${prefix}-components`, caption: 'Components of variance',
      columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Component', { align: 'text' }), column('Variance as estimated', { unit: squared(measurand.unit) }), column('Standard deviation used', { unit: measurand.unit }), column('Share', { unit: '%' })],
      groups: levels.map((level) => level.components.map((each, index) => row(index === 0 ? (level.level === undefined ? 'all' : asTyped(level.level)) : '', componentName(detail, each.component), printed(each.raw), printed(each.standardDeviation), printed(each.share, { decimals: 1 })))),
      ...(levels.some((level) => level.truncated) ? { notes: [`A negative estimate is taken as zero for the standard deviation${detail.isNested ? '' : '; the mean square within runs then stands alone'}.`] } : {}),
    }),
    ...levels.slice(-1).map((level) => figure({
      id: `${prefix}-components-chart`, caption: [...textOf(`Components of the spread of ${measurand.name}${level.level === undefined ? '' : ' '}`), ...at(shown, level), ...sentence`, n = ${count(level.n)}`],
      alternative: `Standard deviations of the components ${level.components.map((each) => componentName(detail, each.component)).join(', ')} and of the whole.`,
      chart: componentBarsChart({
        xTitle: axisTitle('standard deviation', measurand.unit),
        bars: [
          { component: 'within runs', value: level.repeatability.value, low: level.repeatability.low, high: level.repeatability.high },
          ...level.components.filter((each) => each.component !== 'within runs').map((each) => ({ component: componentName(detail, each.component), value: each.standardDeviation })),
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
