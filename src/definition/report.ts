// The keys `report`, `method` and `rules`: what the document is, what it is about, and how numbers are decided.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { date, defaulted, located, number, object, oneOf, optional, type ReadBy, type Reader, required, text, unexpected } from './fields.ts'
import type { NumericRules, ReportIdentity } from './study.ts'

export const reportReader = object({
  number: required(text({ describe: 'Number of the report, unique in the laboratory', example: 'VR-014' })),
  revision: required(number({ describe: 'Revision of the report, from 1', integer: true, minimum: 1, example: 1 })),
  title: required(text({ describe: 'Title of the report', example: 'Dye in rinse water by photometry' })),
  kind: required(oneOf(['full validation', 'partial validation', 'verification', 'transfer'], { describe: 'What kind of study this is' })),
  date: required(date({ describe: 'Date of the report, the only date the document knows', example: '2026-04-17' })),
  language: defaulted(oneOf(['en'], { describe: 'Language of the report' }), 'en'),
  template: defaulted(located(text({ describe: 'Name of a shipped template, or the path of your own beside the study', example: 'validation-report' })), { value: 'validation-report', place: { file: '' } }, 'validation-report'),
  organisation: optional(text({ describe: 'Name of the laboratory, printed on the cover' })),
  supersedes: optional(located(text({ describe: 'From revision 2 on: record.json of the revision before', example: '../revision-1/record.json' }))),
  reason: optional(text({ describe: 'From revision 2 on: why there is a new revision' })),
}, { describe: 'What the report is' })

export function checkReport(report: ReportIdentity, place: Diagnostic['place']): readonly Diagnostic[] {
  if (report.revision > 1 && (report.supersedes === undefined || report.reason === undefined)) {
    return [diagnostic('definition/contradiction', `Revision ${report.revision} needs \`supersedes\` and \`reason\``, { place, actual: `revision ${report.revision}`, expected: '`supersedes:` with the earlier record and `reason:`', mend: 'Add both keys to `report`' })]
  }
  if (report.revision === 1 && report.supersedes !== undefined) {
    return [diagnostic('definition/contradiction', 'Revision 1 supersedes nothing', { place: report.supersedes.place, actual: report.supersedes.value, expected: 'no `supersedes`', mend: 'Raise `revision`, or remove `supersedes`' })]
  }
  return []
}

export const methodReader = object({
  number: required(text({ describe: 'Number of the method', example: 'M-031' })),
  revision: optional(text({ describe: 'Revision of the method' })),
  title: optional(text({ describe: 'Title of the method' })),
  technique: required(text({ describe: 'Measuring technique', example: 'ion chromatography' })),
  scope: optional(text({ describe: 'Matrix and field of use', example: 'recirculated process water' })),
  principle: optional(text({ describe: 'The principle in a sentence or two' })),
}, { describe: 'The method that is validated' })

const confidence: Reader<number> = {
  schema: { type: ['string', 'number'], description: 'Two-sided confidence of intervals, in percent', examples: ['95 %'] },
  read(node, reading) {
    const match = node.kind === 'scalar' ? /^(\d+(?:\.\d+)?) ?%$/.exec(node.text) : null
    const value = Number(match?.[1])
    return match !== null && value >= 50 && value < 100 ? Number((value / 100).toPrecision(12)) : unexpected(node, reading, 'a percentage from 50 % to below 100 %, such as 95 %')
  },
}

const rules = object({
  confidence: defaulted(confidence, 0.95, '95 %'),
  'decide-on': defaulted(oneOf(['unrounded values', 'rounded values'], { describe: 'Whether verdicts are taken on unrounded or rounded values' }), 'unrounded values'),
  rounding: defaulted(oneOf(['half up', 'half even'], { describe: 'What happens to a tie when a value is rounded to its limit' }), 'half up'),
  to: defaulted(oneOf(['decimals of the limit', 'significant figures of the limit'], { describe: 'How far a value is rounded before it is decided' }), 'decimals of the limit'),
}, { describe: 'How numbers are decided' })

export const rulesReader = rules

export function numericRules(read: ReadBy<typeof rules>): NumericRules {
  return { confidence: read.confidence, decideOn: read['decide-on'], rounding: read.rounding, to: read.to }
}
