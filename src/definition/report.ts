// The keys `report`, `method` and `rules`: what the document is, what it is about, and how numbers are decided.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import { date, defaulted, located, number, object, oneOf, optional, quantity, type ReadBy, type Reader, type Reading, required, text, unexpected } from './fields.ts'
import { nameOrPathInside, pathBeside } from './paths.ts'
import type { NumericRules, ReportIdentity } from './study.ts'

export const reportReader = object({
  number: required(text({ describe: 'Number of the report, unique in the laboratory', example: 'VR-014' })),
  revision: required(number({ describe: 'Revision of the report, from 1', integer: true, minimum: 1, example: 1 })),
  title: required(text({ describe: 'Title of the report', example: 'Dye in rinse water by photometry' })),
  kind: required(oneOf(['full validation', 'partial validation', 'verification', 'transfer'], { describe: 'What kind of study this is' })),
  date: required(date({ describe: 'Date of the report, the only date the document knows', example: '2026-04-17' })),
  language: defaulted(oneOf(['en'], { describe: 'Language of the report' }), 'en'),
  template: defaulted(located(nameOrPathInside('Name of a shipped template, or the path of your own beside the study', 'validation-report')), { value: 'validation-report', place: { file: '' } }, 'validation-report'),
  organisation: optional(text({ describe: 'Name of the laboratory, printed on the cover' })),
  detail: optional(oneOf(['all', 'main'], { describe: 'Every exhibit of each measurand, or the main ones; all up to twelve measurands, the main ones above, when absent' })),
  supersedes: optional(located(pathBeside('From revision 2 on: record.json of the revision before', '../revision-1/record.json'))),
  reason: optional(text({ describe: 'From revision 2 on: why there is a new revision' })),
}, { describe: 'What the report is' })

export function checkReport(report: ReportIdentity, reading: Reading, place: Place): void {
  if (report.revision > 1) {
    for (const [key, value, what] of [['supersedes', report.supersedes, 'the path of the earlier record.json'], ['reason', report.reason, 'why there is a new revision']] as const) {
      if (value === undefined) reading.report(diagnostic('definition/missing-key', `Expected key \`${key}\` in \`report\`, since this is revision ${report.revision}`, { place, actual: 'no such key', expected: `\`${key}\`: ${what}`, mend: `Add \`${key}:\` to \`report\`` }))
    }
  } else if (report.supersedes !== undefined) {
    reading.report(diagnostic('definition/contradiction', 'Unexpected `supersedes` in revision 1', { place: report.supersedes.place, actual: report.supersedes.value, expected: 'a revision above 1', mend: 'Raise `revision`, or remove `supersedes`' }))
  }
}

export const methodReader = object({
  number: required(text({ describe: 'Number of the method', example: 'M-031' })),
  revision: optional(text({ describe: 'Revision of the method' })),
  title: optional(text({ describe: 'Title of the method' })),
  technique: required(text({ describe: 'Measuring technique', example: 'ion chromatography' })),
  scope: optional(text({ describe: 'Matrix and field of use', example: 'recirculated process water' })),
  principle: optional(text({ describe: 'The principle in a sentence or two' })),
}, { describe: 'The method that is validated' })

const percentage = quantity({ describe: 'Two-sided confidence of intervals', unit: '%', example: '95 %' })

const confidence: Reader<number> = {
  schema: percentage.schema,
  read(node, reading) {
    const typed = percentage.read(node, reading)
    if (typed === undefined) return undefined
    if (typed.value < 50 || typed.value >= 100) return unexpected(node, reading, 'a percentage from 50 % to below 100 %, such as 95 %')
    return Number(`${typed.text}e-2`) // 99.9 / 100 would not be 0.999
  },
}

export const rulesReader = object({
  confidence: defaulted(confidence, 0.95, '95 %'),
  'decide-on': defaulted(oneOf(['unrounded values', 'rounded values'], { describe: 'Whether verdicts are taken on unrounded or rounded values' }), 'unrounded values'),
  rounding: defaulted(oneOf(['half up', 'half even'], { describe: 'What happens to a tie when a value is rounded to its limit' }), 'half up'),
  to: defaulted(oneOf(['decimals of the limit', 'significant figures of the limit'], { describe: 'How far a value is rounded before it is decided' }), 'decimals of the limit'),
}, { describe: 'How numbers are decided' })

export function numericRules(read: ReadBy<typeof rulesReader>): NumericRules {
  return { confidence: read.confidence, decideOn: read['decide-on'], rounding: read.rounding, to: read.to }
}
