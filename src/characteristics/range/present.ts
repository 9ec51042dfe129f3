// The exhibits and sentences of the range, from its detail alone.
import { column, paragraph, row, sentence, table, textOf } from '../../present/build.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asTyped } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { RangeDetail } from './assess.ts'

export function presentRange({ detail, measurand, prefix }: Presented<RangeDetail>): readonly ReportBlock[] {
  const unit = measurand.unit === '' ? '' : `\u00a0${measurand.unit}`
  const shown: readonly Inline[] = detail.low === undefined || detail.high === undefined
    ? textOf('No tested level meets everything that is required, so no range is shown.')
    : sentence`Accuracy, precision and linearity hold together from ${asTyped(detail.low)} to ${asTyped(detail.high)}${unit}. The range ends at tested levels; nothing is said beyond them.`
  return [
    paragraph(
      shown, detail.claim === undefined ? [] : sentence`The range claimed is ${asTyped(detail.claim.low)} to ${asTyped(detail.claim.high)}${unit}.`,
      detail.fitLow === undefined || detail.fitHigh === undefined ? [] : sentence`The accepted range of the fit is ${asTyped(detail.fitLow)} to ${asTyped(detail.fitHigh)}${unit}.`,
    ),
    table({
      id: `${prefix}-levels`, caption: 'Levels tested for accuracy and precision, and what holds at each',
      columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Accuracy', { align: 'text' }), column('Precision', { align: 'text' }), column('Linearity', { align: 'text' }), column('All hold', { align: 'text' })],
      rows: detail.levels.map((level) => row(asTyped(level.level), { type: 'verdict', word: level.accuracy }, { type: 'verdict', word: level.precision }, { type: 'verdict', word: level.linearity }, level.holds ? 'yes' : 'no')),
      notes: ['“Information only” stands where the study states no criterion at the level.'],
    }),
  ]
}
