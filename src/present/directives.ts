// Which directive of a template puts what into the report. The table is closed: a name that is not here is an error with its place.
import type { ReportBlock } from './document.ts'
import { defaults, diagnostics, files, rawData } from './sections/annexes.ts'
import { assessments } from './sections/assessments.ts'
import { conformityTable } from './sections/conformity.ts'
import { exclusions } from './sections/exclusions.ts'
import { cover, openItems, overallSentence, signOff } from './sections/front.ts'
import type { Section } from './sections/section.ts'
import { design, method, namedText, notPerformed, purpose, register, rules } from './sections/study.ts'

export type Directive = (section: Section, attributes: Readonly<Record<string, string>>) => readonly ReportBlock[]

export const directives: Readonly<Record<string, Directive>> = {
  cover,
  'sign-off': signOff,
  'open-items': openItems,
  contents: (_, attributes) => [{ type: 'contents', title: attributes['title'] ?? 'Contents' }],
  'page-break': () => [{ type: 'pageBreak' }],
  overall: (section) => [{ type: 'textBlock', origin: 'program', children: [{ type: 'verdict', word: section.record.overall.verdict }, { type: 'text', value: '. ' }, ...overallSentence(section)] }],
  conformity: conformityTable,
  purpose,
  method,
  design,
  rules,
  assessments,
  equipment: (section) => register('equipment', 'Equipment', section.record.study.equipment),
  materials: (section) => register('materials', 'Materials', section.record.study.materials),
  deviations: (section) => register('deviations', 'Deviations from the plan', section.record.study.deviations),
  'not-performed': notPerformed,
  exclusions,
  text: (section, attributes) => namedText(section, attributes['name'] ?? ''),
  'raw-data': rawData,
  files,
  defaults,
  diagnostics,
}
