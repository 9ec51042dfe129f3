// Purpose, method, design, rules and registers: what the study states, told without adding to it.
import type { DesignLine } from '../../assess/record.ts'
import type { RegisterEntry } from '../../definition/study.ts'
import { column, paragraph, row, sentence, table, textOf } from '../build.ts'
import type { Inline, ReportBlock } from '../document.ts'
import { asPercent, count } from '../numbers.ts'
import { blockTitle, measurandOf, metricLabel, type Section, titleOf } from './section.ts'

export function purpose(section: Section): readonly ReportBlock[] {
  const { study } = section.record
  return [
    userText(study.intendedUse),
    paragraph(textOf(`The study covers ${listed(study.measurands.map((each) => each.unit === '' || each.unit === '1' ? each.name : `${each.name} (${each.unit})`))}${study.method.scope === undefined ? '' : ` in ${study.method.scope}`}.`)),
  ]
}

/** The user's own words, one block per paragraph typed. */
export function userText(text: string): ReportBlock {
  return { type: 'textBlock', origin: 'user', children: textOf(text.trim().replace(/\s+/g, ' ')) }
}

export function namedText(section: Section, name: string): readonly ReportBlock[] {
  const text = section.record.study.texts[name]
  return text === undefined ? [] : text.split(/\n\s*\n/).filter((part) => part.trim() !== '').map(userText)
}

export function method(section: Section): readonly ReportBlock[] {
  const { method: stated } = section.record.study
  const facts: readonly (readonly [string, string | undefined])[] = [['Method', stated.number], ['Revision', stated.revision], ['Title', stated.title], ['Technique', stated.technique], ['Scope', stated.scope], ['Principle', stated.principle]]
  return [
    table({ id: 'method', caption: 'The method as stated', columns: [column('', { align: 'text', rowHeader: true }), column('Stated', { align: 'text' })], rows: facts.flatMap(([label, value]) => (value === undefined ? [] : [row(label, value)])) }),
    ...resultChains(section),
  ]
}

/** How each dataset becomes results: columns, independent unit, what is averaged. */
function resultChains(section: Section): readonly ReportBlock[] {
  const rows = section.record.study.sources.map((source) => row(
    source.name, listed(source.files.map((file) => file.path)),
    source.replicate === undefined ? (source.average.length === 0 ? 'each row' : `all rows alike but for ${listed(source.average.map((each) => each.value))}, averaged`) : `each ${source.replicate.value}, its rows averaged`,
    source.through === undefined ? 'as read' : `response through ${source.through.value}${source.subtractBlank === undefined ? '' : `, after subtracting the mean of ${source.subtractBlank.value}`}`,
  ))
  return [table({ id: 'datasets', caption: 'Datasets and what counts as one independent value', columns: [column('Dataset', { align: 'text', rowHeader: true }), column('Files', { align: 'text' }), column('Independent value', { align: 'text' }), column('Result', { align: 'text' })], rows })]
}

export function design(section: Section): readonly ReportBlock[] {
  const { record } = section
  const merged = new Map<string, { readonly line: DesignLine; readonly measurands: string[] }>()
  for (const line of record.design) {
    const key = JSON.stringify([line.block, line.word, line.planned, line.found])
    const known = merged.get(key)
    if (known === undefined) merged.set(key, { line, measurands: [measurandOf(section, line.measurand).name] })
    else known.measurands.push(measurandOf(section, line.measurand).name)
  }
  if (merged.size === 0) return []
  const unmet = record.design.filter((line) => !line.met)
  return [
    table({
      id: 'design', caption: 'Design planned and found',
      columns: [column('Characteristic', { align: 'text', rowHeader: true }), column('Count of', { align: 'text' }), column('Planned'), column('Found'), column('Measurands', { align: 'text' }), column('Design', { align: 'text' })],
      rows: [...merged.values()].map(({ line, measurands }) => row(
        blockTitle(section, line.block), line.word, line.planned === undefined ? 'not stated' : count(line.planned), line.found === undefined ? 'none' : count(line.found),
        measurands.length === record.study.measurands.length ? 'all' : listed(measurands), line.planned === undefined ? '' : line.met ? 'met' : 'not met',
      )),
      notes: ['Replicates are the smallest number found in any cell of the design. Whether the design is met is apart from whether a criterion is met.'],
    }),
    ...(unmet.length === 0 ? [] : [paragraph(textOf('The design is not met everywhere; see the deviations. Degrees of freedom were taken from what was found, never from what was planned.'))]),
  ]
}

export function rules(section: Section): readonly ReportBlock[] {
  const { rules: stated } = section.record.study
  const confidence: readonly Inline[] = [asPercent(stated.confidence), ...textOf('\u202f%')]
  const rounding = stated.decideOn === 'unrounded values'
    ? 'Decisions are taken on unrounded values; a printed value may show fewer digits than were compared.'
    : `Decisions are taken on values rounded ${stated.rounding} to the ${stated.to}.`
  return [paragraph(
    sentence`Unless a table says otherwise, intervals are two-sided at a confidence of ${confidence}.`, textOf(rounding),
    textOf('The limits of “at most”, “at least” and “between” belong to what is accepted; those of “above” and “below” do not. Before a comparison, binary noise beyond twelve significant digits is removed. A test that finds no significant difference does not show that two things are equal.'),
  ), ...methodsTable(section)]
}

function methodsTable(section: Section): readonly ReportBlock[] {
  const seen = new Map<string, readonly string[]>()
  for (const finding of section.record.findings) {
    const key = JSON.stringify([finding.characteristic, finding.metric, finding.method, finding.source, finding.interval?.method])
    if (!seen.has(key)) seen.set(key, [`${titleOf(section, finding.characteristic)}: ${metricLabel(section, finding.characteristic, finding.metric)}`, finding.method, finding.interval?.method ?? 'none', finding.source])
  }
  if (seen.size === 0) return []
  return [table({ id: 'methods', caption: 'Statistical methods used, with their sources', columns: [column('Finding', { align: 'text', rowHeader: true }), column('Method', { align: 'text' }), column('Interval', { align: 'text' }), column('Source', { align: 'text' })], rows: [...seen.values()].map((cells) => row(...cells)) })]
}

export function register(id: string, caption: string, entries: readonly RegisterEntry[]): readonly ReportBlock[] {
  if (entries.length === 0) return []
  const headers = [...new Set(entries.flatMap((entry) => Object.keys(entry)))]
  return [table({
    id, caption, columns: headers.map((header, index) => column(header, { align: 'text', ...(index === 0 ? { rowHeader: true as const } : {}) })),
    rows: entries.map((entry) => row(...headers.map((header) => entry[header] ?? ''))),
  })]
}

export function notPerformed(section: Section): readonly ReportBlock[] {
  return register('not-performed', 'Characteristics not performed, with the justification stated', section.record.study.notPerformed.map((each) => ({ Characteristic: each.characteristic, Justification: each.justification })))
}

export function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} and ${items.at(-1) ?? ''}`
}
