// The exhibits and sentences of the range, from its detail alone.
import { column, paragraph, row, sentence, table, textOf, type Words } from '../../present/build.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asPercent, asTyped } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { RangeDetail } from './assess.ts'
import type { LevelWord } from './levels.ts'

export function presentRange({ detail, measurand, prefix }: Presented<RangeDetail>): readonly ReportBlock[] {
  const unit = measurand.unit === '' ? '' : `\u00a0${measurand.unit}`
  return [
    paragraph(
      shown(detail, unit), detail.claim === undefined ? [] : sentence`The range claimed is ${asTyped(detail.claim.low)} to ${asTyped(detail.claim.high)}${unit}.`,
      detail.fitLow === undefined || detail.fitHigh === undefined ? [] : sentence`The outermost standards at which the fit is accepted stand at ${asTyped(detail.fitLow)} and ${asTyped(detail.fitHigh)}${unit}.`,
    ),
    table({
      id: `${prefix}-levels`, caption: 'Levels tested for accuracy and precision, and what holds at each',
      columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Accuracy', { align: 'text' }), column('Precision', { align: 'text' }), column('Linearity', { align: 'text' }), column('All hold', { align: 'text' })],
      rows: detail.levels.map((level) => row(asTyped(level.level), cell(level.accuracy), cell(level.precision), cell(level.linearity), level.holds ? 'yes' : 'no')),
      notes: notes(detail),
    }),
  ]
}

function shown({ low, high }: RangeDetail, unit: string): readonly Inline[] {
  if (low === undefined || high === undefined) return textOf('At no tested level is everything met that is required, so no range is shown.')
  if (low === high) return sentence`Accuracy, precision and linearity hold together at ${asTyped(low)}${unit} alone; nothing is said of other levels.`
  return sentence`Accuracy, precision and linearity hold together from ${asTyped(low)} to ${asTyped(high)}${unit}. The range ends at tested levels; nothing is said beyond them.`
}

function cell(word: LevelWord): Words {
  return word === 'not tested' || word === 'outside the fit' ? word : { type: 'verdict', word }
}

function notes({ levels, tolerance, low = -Infinity, high = Infinity }: RangeDetail): readonly (readonly Inline[])[] {
  const has = (word: LevelWord): boolean => levels.some((level) => [level.accuracy, level.precision, level.linearity].includes(word))
  return [
    ...(levels.some((level) => level.accuracy === 'not tested' && level.precision === 'not tested') ? [textOf('A standard at which the fit does not hold stands here although nothing else was tested there: the range cannot pass it.')] : []),
    ...(levels.some((level) => level.holds && (level.low < low || level.high > high)) ? [textOf('Everything holds at other levels too, but a level at which it does not stands between; the widest interval counts.')] : []),
    ...(has('information only') ? [textOf('“Information only” stands where the study states no criterion at the level.')] : []),
    ...(tolerance === 0 ? [] : [sentence`Levels that differ by up to ${asPercent(tolerance)}\u202f% count as one; the range then ends at the innermost of them.`]),
  ]
}
