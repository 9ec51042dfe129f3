// Cover, sign-off block and the list of open items: who says what about which record, and whether it may be signed.
import type { VerdictWord } from '../../assess/finding.ts'
import { paragraph, sentence, textOf } from '../build.ts'
import type { Inline, ReportBlock } from '../document.ts'
import { count } from '../numbers.ts'
import { type Section, status } from './section.ts'

export function cover(section: Section): readonly ReportBlock[] {
  const { report, method } = section.record.study
  return [{
    type: 'cover', organisation: report.organisation, title: report.title, subtitle: `Report of ${article(report.kind)} of an analytical method`,
    facts: [
      { label: 'Report', text: report.number },
      { label: 'Revision', text: String(report.revision) },
      { label: 'Date', text: report.date },
      { label: 'Method', text: [method.number, method.revision === undefined ? '' : `revision ${method.revision}`].filter((part) => part !== '').join(', ') },
      { label: 'Technique', text: method.technique },
      { label: 'Status', text: status(section.record) },
      { label: 'Record digest', text: `SHA-256 ${section.digest}` },
    ],
    overall: { type: 'verdict', word: section.record.overall.verdict },
    overallSentence: overallSentence(section),
  }]
}

function article(kind: string): string {
  return `a ${kind}`
}

export function overallSentence(section: Section): readonly Inline[] {
  const { verdicts, overall } = section.record
  const of = (word: VerdictWord): number => verdicts.filter((verdict) => verdict.verdict === word).length
  const counts = sentence`Of ${count(verdicts.length)} decisions against acceptance criteria, ${count(of('meets'))} meet, ${count(of('misses'))} miss and ${count(of('not evaluable'))} are not evaluable.`
  const meaning: Readonly<Record<VerdictWord, string>> = {
    meets: 'Every acceptance criterion that the study states is met by the data shown here.',
    misses: 'At least one acceptance criterion that the study states is missed by the data shown here.',
    'not evaluable': 'No criterion is missed, but at least one could not be evaluated from the data shown here.',
    'information only': 'The study states no acceptance criterion; this report gives information only.',
    'not performed': 'Nothing was performed.',
  }
  return [...textOf(`${meaning[overall.verdict]} `), ...(verdicts.length === 0 ? [] : counts)]
}

export function signOff(section: Section): readonly ReportBlock[] {
  const { people } = section.record.study
  const meaning = { prepared: 'Prepared: the data and their evaluation are complete and correct', reviewed: 'Reviewed: the report was checked against the data and the plan', approved: 'Approved: the statement of fitness for the intended use is adopted' } as const
  const roles = ['prepared', 'reviewed', 'approved'] as const
  return [{
    type: 'signOff',
    people: roles.flatMap((role) => people[role].map((person) => ({ role, meaning: meaning[role], name: person.name, position: person.position }))),
    note: sentence`Signatures refer to the record with the SHA-256 digest printed on the cover; its first characters stand on every page. Each signature needs the date and the time with its zone.`,
  }]
}

export function openItems(section: Section): readonly ReportBlock[] {
  const { openItems: open } = section.record
  if (open.length === 0) return []
  return [paragraph(textOf('This report is a draft and must not be signed. Open items:')), {
    type: 'list', ordered: false, spread: false,
    children: open.map((item) => ({ type: 'listItem', spread: false, children: [{ type: 'paragraph', children: [{ type: 'text', value: item }] }] })),
  }]
}
