// Exclusions and every result they touch, with and without: a reviewer must see what each one changed.
import { column, paragraph, row, table, textOf } from '../build.ts'
import type { Inline, ReportBlock } from '../document.ts'
import { count, printed } from '../numbers.ts'
import { unitWords, whereWords } from '../verdict-rows.ts'
import { blockTitle, measurandOf, metricLabel, type Section } from './section.ts'

export function exclusions(section: Section): readonly ReportBlock[] {
  const { record } = section
  if (record.study.exclusions.length === 0) return [paragraph(textOf('No row was excluded.'))]
  const flips = record.withExcluded.flatMap((each) => each.verdicts).filter((each) => each.with !== each.without).length
  return [
    table({
      id: 'exclusions', caption: 'Excluded rows, with reason and approval',
      columns: [column('No.'), column('Dataset', { align: 'text', rowHeader: true }), column('Row', { align: 'text' }), column('Class', { align: 'text' }), column('Reason', { align: 'text' }), column('Reference', { align: 'text' }), column('Requested by', { align: 'text' }), column('Approved by', { align: 'text' }), column('Date', { align: 'text' })],
      rows: record.study.exclusions.map((each) => row(
        count(each.number), each.dataset.value, [...each.row.matches.map((match) => `${match.column} = ${match.text}`), ...(each.measurands === undefined ? [] : [`only ${each.measurands.join(', ')}`])].join(', '),
        each.class, each.reason, each.reference ?? 'none', nameOf(section, each.requestedBy), nameOf(section, each.approvedBy), each.date,
      )),
    }),
    paragraph(textOf(flips === 0 ? 'No verdict changes when the excluded rows are put back.' : 'Some verdicts change when the excluded rows are put back; they are marked in the table that follows.')),
    ...effects(section),
  ]
}

function nameOf({ record }: Section, id: string): string {
  return Object.values(record.study.people).flat().find((person) => person.id === id)?.name ?? id
}

/** Measurand, block and metric with level and condition; the id itself where a finding exists only with the rows put back. */
function findingWords(section: Section, id: string): readonly Inline[] {
  const finding = section.findings.get(id)
  if (finding === undefined) return textOf(id)
  const measurand = measurandOf(section, finding.measurand)
  return [...textOf(`${measurand.name}, ${blockTitle(section, finding.block)}: ${metricLabel(section, finding.characteristic, finding.metric)}`), ...whereWords(finding, measurand.unit)]
}

function effects(section: Section): readonly ReportBlock[] {
  const { withExcluded } = section.record
  if (withExcluded.length === 0) return []
  const value = (number: number | null, unit: string): readonly Inline[] => (number === null ? textOf('not evaluable') : [printed(number), ...unitWords(unit)])
  return [table({
    id: 'exclusion-effects', caption: 'Every result that an exclusion touches, without and with the excluded rows',
    columns: [column('Finding', { align: 'text', rowHeader: true }), column('Exclusions', { align: 'text' }), column('Without the rows', { align: 'text' }), column('With the rows', { align: 'text' }), column('Verdict without', { align: 'text' }), column('Verdict with', { align: 'text' })],
    rows: withExcluded.map((each) => row(
      findingWords(section, each.finding), each.exclusions.join(', '), value(each.without, each.unit), value(each.with, each.unit),
      each.verdicts.map((verdict): Inline => ({ type: 'verdict', word: verdict.without })), each.verdicts.map((verdict): Inline => ({ type: 'verdict', word: verdict.with })),
    )),
    notes: ['“Without the rows” is what this report decides on.'],
  })]
}
