// The conformity table: one row per measurand and criterion, with the finding that decides it, its verdict and the page of its section.
import type { Verdict } from '../../assess/finding.ts'
import { column, row, sentence, table } from '../build.ts'
import type { ExhibitRow, ReportBlock } from '../document.ts'
import { byCriterion, deciding, resultWords } from '../verdict-rows.ts'
import { blockTitle, measurandOf, metricLabel, type Section } from './section.ts'
import { assessmentSectionId, borderlineNotes } from './assessments.ts'

export function conformityTable(section: Section): readonly ReportBlock[] {
  const { record } = section
  const groups = record.study.measurands.flatMap((measurand): readonly (readonly ExhibitRow[])[] => {
    const judged = byCriterion(record.verdicts.filter((verdict) => verdict.measurand === measurand.id)).map((verdicts) => conformityRow(section, verdicts))
    const free = record.assessments
      .filter((each) => each.measurand === measurand.id && !record.verdicts.some((verdict) => verdict.block === each.block && verdict.measurand === each.measurand))
      .map((each) => row(measurand.name, `${blockTitle(section, each.block)}: no criterion stated`, '', '', '', { type: 'verdict', word: 'information only' }, { type: 'pageReference', target: assessmentSectionId(each.block, each.measurand) }))
    return judged.length + free.length === 0 ? [] : [[...judged, ...free]]
  })
  const omitted = record.study.notPerformed.map((each) => row('all', `${each.characteristic}: ${each.justification}`, '', '', '', { type: 'verdict', word: 'not performed' }, ''))
  return [table({
    id: 'conformity', caption: sentence`Conformity with the acceptance criteria. For a criterion that holds at several levels the deciding one is shown`,
    columns: [
      column('Measurand', { align: 'text', rowHeader: true }), column('Criterion', { align: 'text' }), column('Limit', { align: 'text' }), column('Source', { align: 'text' }),
      column('Result', { align: 'text' }), column('Verdict', { align: 'text' }), column('Page', { align: 'text' }),
    ],
    groups: omitted.length === 0 ? groups : [...groups, omitted],
    notes: borderlineNotes(record.verdicts),
  })]
}

function conformityRow(section: Section, verdicts: readonly Verdict[]): ExhibitRow {
  const verdict = deciding(verdicts)
  const measurand = measurandOf(section, verdict.measurand)
  return row(
    measurand.name, `${blockTitle(section, verdict.block)}: ${metricLabel(section, verdict.characteristic, verdict.metric)}`, verdict.criterion, verdict.source ?? 'not stated',
    verdict.unrounded === undefined ? (verdict.because ?? '') : resultWords(verdict, section.findings.get(verdict.finding), measurand.unit),
    { type: 'verdict', word: verdict.verdict }, { type: 'pageReference', target: assessmentSectionId(verdict.block, verdict.measurand) },
  )
}
