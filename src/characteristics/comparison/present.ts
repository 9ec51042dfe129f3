// The exhibits and sentences of a comparison. A difference that is not significant is never called equality.
import { axisTitle, column, excludedRow, figure, paragraph, row, secondary, sentence, table, textOf } from '../../present/build.ts'
import { differenceChart } from '../../present/charts/difference-chart.ts'
import { groupedValuesChart } from '../../present/charts/grouped-values-chart.ts'
import { sequenceChart } from '../../present/charts/sequence-chart.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asMeasured, asPercent, asTyped, count, degreesOfFreedom, printed, probability } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { ComparisonDetail, EffectLine } from './detail.ts'

type Shown = Presented<ComparisonDetail>

export function presentComparison(shown: Shown): readonly ReportBlock[] {
  return [summary(shown), ...secondary(shown, () => [conditions(shown), ...figures(shown)]), effects(shown), ...secondary(shown, () => [...equivalenceTable(shown), ...spreads(shown), ...blocks(shown)])]
}

function unit(text: string): string {
  return text === '' ? '' : `\u00a0${text}`
}

const designs = { replicates: 'from replicate readings under each condition', 'alternating blocks': 'from alternating blocks, with a straight drift in the model', pairs: 'from pairs of readings' } as const

function summary({ detail, measurand }: Shown): ReportBlock {
  return paragraph(...detail.effects.flatMap((effect): readonly (readonly Inline[])[] => {
    const start = sentence`The difference ${effect.condition} − ${detail.reference} is ${printed(effect.difference)}${unit(measurand.unit)} (${printed(effect.low)} to ${printed(effect.high)} at ${asPercent(effect.confidence)}\u202f%), ${designs[detail.design]}.`
    if (detail.question === 'difference') {
      const zeroOutside = effect.low > 0 || effect.high < 0
      return [start, textOf(zeroOutside ? 'The interval does not contain zero: the conditions differ by more than chance.' : 'The interval contains zero: these data do not show a difference, which does not mean that there is none.')]
    }
    const test = detail.equivalence.find((each) => each.condition === effect.condition)
    return test === undefined || detail.margin === undefined ? [start] : [start, sentence`Against the margin of ±${asTyped(detail.margin)}${unit(measurand.unit)}, the larger probability of the two one-sided tests is ${probability(test.probability)}; equivalence within the margin is shown when it lies below ${{ type: 'number', value: detail.alpha, text: String(Number(detail.alpha.toPrecision(6))) }}.`]
  }))
}

function conditions({ detail, measurand, prefix, confidence }: Shown): ReportBlock {
  return table({
    id: `${prefix}-conditions`, caption: 'Readings under each condition',
    columns: [column('Condition', { align: 'text', rowHeader: true }), column('n'), column('Mean', { unit: measurand.unit }), column('Standard deviation', { unit: measurand.unit }), column('Interval of the mean', { align: 'text', unit: measurand.unit })],
    rows: [
      ...detail.conditions.map((each) => row(each.condition, count(each.n), printed(each.mean, { significant: 5 }), each.standardDeviation === undefined ? '' : printed(each.standardDeviation), each.low === undefined || each.high === undefined ? '' : sentence`${printed(each.low, { significant: 5 })} to ${printed(each.high, { significant: 5 })}`)),
      ...detail.excluded.map((each) => excludedRow(`${each.condition}, excluded`, '', asMeasured(each.value), '', '')),
    ],
    notes: [sentence`Intervals of means at ${asPercent(confidence)}\u202f%.${detail.design === 'replicates' ? '' : ' They take each reading as independent and are for orientation; the comparison follows the design.'}`],
  })
}

function figures({ detail, measurand, prefix, verdicts }: Shown): readonly ReportBlock[] {
  const axis = axisTitle('result', measurand.unit)
  const limits = verdicts.some((verdict) => verdict.metric === 'difference') && detail.margin !== undefined ? { low: -detail.margin, high: detail.margin, label: 'margin' } : undefined
  return [
    figure({
      id: `${prefix}-sequence`, caption: sentence`Readings of ${measurand.name} in the order ${detail.orderIsKnown ? 'in which they were made' : 'of the file'}, n = ${count(detail.readings.length)}`,
      alternative: `${detail.readings.length} readings of ${measurand.name} in ${detail.orderIsKnown ? 'the order of measuring' : 'the order of the file'}, under ${detail.conditions.map((each) => each.condition).join(', ')}.`,
      chart: sequenceChart({ orderTitle: detail.orderIsKnown ? 'order of measuring' : 'order in the file', yTitle: axis, points: detail.readings }),
    }),
    figure({
      id: `${prefix}-side-by-side`, caption: sentence`Readings of ${measurand.name} under each condition, with their means, n = ${count(detail.readings.length)}`,
      alternative: `Readings of ${measurand.name} side by side under ${detail.conditions.map((each) => each.condition).join(', ')}.`,
      chart: groupedValuesChart({ groupTitle: 'condition', yTitle: axis, values: detail.readings.map((each) => ({ group: each.condition, value: each.value })), excluded: detail.excluded.map((each) => ({ group: each.condition, value: each.value, label: `excluded (${each.exclusion})` })), means: detail.conditions.map((each) => ({ group: each.condition, mean: each.mean })), limits: [] }),
    }),
    figure({
      id: `${prefix}-difference`, caption: sentence`Difference from ${detail.reference} with its interval at ${asPercent(detail.effects[0]?.confidence ?? 0)}\u202f%${limits === undefined ? '' : ', and the margin'}`,
      alternative: `Difference of ${detail.effects.map((each) => each.condition).join(', ')} from ${detail.reference} with interval${limits === undefined ? '' : ' and margin'}.`,
      chart: differenceChart({ xTitle: axisTitle('difference', measurand.unit), items: detail.effects.map((each) => ({ label: each.condition, estimate: each.difference, low: each.low, high: each.high })), ...(limits === undefined ? {} : { margins: limits }), zero: true }),
    }),
  ]
}

function effects({ detail, measurand, prefix }: Shown): ReportBlock {
  const line = (each: EffectLine): ReturnType<typeof row> => row(
    `${each.condition} − ${detail.reference}`, each.method, printed(each.difference), printed(each.standardError), degreesOfFreedom(each.df), printed(each.t), probability(each.probability), sentence`${printed(each.low)} to ${printed(each.high)}`,
  )
  return table({
    id: `${prefix}-effects`, caption: 'Differences with their tests',
    columns: [column('Difference', { align: 'text', rowHeader: true }), column('Method', { align: 'text' }), column('Value', { unit: measurand.unit }), column('Standard error', { unit: measurand.unit }), column('df'), column('t'), column('Probability'), column('Interval', { align: 'text', unit: measurand.unit })],
    groups: [detail.effects.map(line), detail.besides.map(line)].filter((group) => group.length > 0),
    notes: [
      sentence`Two-sided probabilities; intervals at ${asPercent(detail.effects[0]?.confidence ?? 0)}\u202f%.${detail.besides.length > 0 ? ' The decision rests on the method named first; the other stands beside it.' : ''}`,
      ...(detail.effects.length < 2 ? [] : ['Each difference stands by itself; probabilities and intervals are not adjusted for the number of conditions.']),
      ...(detail.drift === undefined ? [] : [sentence`Drift of a block mean from block to block: ${printed(detail.drift.value)}${unit(measurand.unit)}, standard error ${printed(detail.drift.standardError)}.`]),
    ],
  })
}

function equivalenceTable({ detail, measurand, prefix }: Shown): readonly ReportBlock[] {
  if (detail.equivalence.length === 0 || detail.margin === undefined) return []
  return [table({
    id: `${prefix}-equivalence`, caption: sentence`Two one-sided tests against ±${asTyped(detail.margin)}${unit(measurand.unit)}`,
    columns: [column('Condition', { align: 'text', rowHeader: true }), column('t, lower margin'), column('Probability'), column('t, upper margin'), column('Probability'), column('Larger probability')],
    rows: detail.equivalence.map((each) => row(each.condition, printed(each.lowerT), probability(each.lowerProbability), printed(each.upperT), probability(each.upperProbability), probability(each.probability))),
  })]
}

function spreads({ detail, prefix }: Shown): readonly ReportBlock[] {
  if (detail.spreads.length === 0) return []
  return [table({
    id: `${prefix}-spreads`, caption: 'Spreads under the conditions compared',
    columns: [column('Test', { align: 'text', rowHeader: true }), column('Condition', { align: 'text' }), column('F'), column('df 1'), column('df 2'), column('Probability')],
    rows: detail.spreads.map((each) => row(each.test, each.condition ?? 'all', printed(each.F), count(each.df1), count(each.df2), probability(each.probability))),
    ...(detail.design === 'alternating blocks' ? { notes: ['Single readings; a drift widens the spread of every condition alike.'] } : {}),
  })]
}

function blocks({ detail, measurand, prefix }: Shown): readonly ReportBlock[] {
  if (detail.blocks.length === 0) return []
  return [table({
    id: `${prefix}-blocks`, caption: detail.orderIsKnown ? 'Blocks in the order of measuring' : 'Blocks in the order of the file',
    columns: [column('Block', { align: 'text', rowHeader: true }), column('Order'), column('Condition', { align: 'text' }), column('n'), column('Mean', { unit: measurand.unit })],
    rows: detail.blocks.map((each) => row(each.block, count(each.order), each.condition, count(each.n), printed(each.mean, { significant: 5 }))),
    notes: ['One block is one independent value; readings within a block are averaged.'],
  })]
}
