// What a directive of a template can draw on: the record, its digest, and what the catalogue says of each characteristic.
import type { Finding, Verdict } from '../../assess/finding.ts'
import type { StudyRecord } from '../../assess/record.ts'
import type { DefinitionPart } from '../../definition/definition-part.ts'
import type { Measurand } from '../../definition/study.ts'
import type { PresentationPart } from '../presentation-part.ts'

export type PresentableCharacteristic = DefinitionPart & PresentationPart

export interface Section {
  readonly record: StudyRecord
  readonly digest: string
  readonly catalogue: readonly PresentableCharacteristic[]
  readonly findings: ReadonlyMap<string, Finding>
  readonly measurands: ReadonlyMap<string, Measurand>
  /** Findings and verdicts of one block and measurand, by `outcomeKey`. */
  readonly outcomes: ReadonlyMap<string, { readonly findings: readonly Finding[]; readonly verdicts: readonly Verdict[] }>
}

export function outcomeKey(each: { readonly block: string; readonly measurand: string }): string {
  return `${each.block}/${each.measurand}`
}

export function sectionOf(record: StudyRecord, digest: string, catalogue: readonly PresentableCharacteristic[]): Section {
  const outcomes = new Map<string, { readonly findings: Finding[]; readonly verdicts: Verdict[] }>(record.assessments.map((each) => [outcomeKey(each), { findings: [], verdicts: [] }]))
  for (const finding of record.findings) outcomes.get(outcomeKey(finding))?.findings.push(finding)
  for (const verdict of record.verdicts) outcomes.get(outcomeKey(verdict))?.verdicts.push(verdict)
  return {
    record, digest, catalogue, outcomes,
    findings: new Map(record.findings.map((finding) => [finding.id, finding])),
    measurands: new Map(record.study.measurands.map((measurand) => [measurand.id, plainNumber(measurand)])),
  }
}

export function titleOf(section: Section, characteristic: string): string {
  return section.catalogue.find((part) => part.id === characteristic)?.title ?? characteristic
}

export function metricLabel(section: Section, characteristic: string, metric: string): string {
  return section.catalogue.find((part) => part.id === characteristic)?.metrics[metric]?.label ?? metric
}

/** `1` is the unit of a plain number and is not printed. */
function plainNumber(measurand: Measurand): Measurand {
  return measurand.unit === '1' ? { ...measurand, unit: '' } : measurand
}

export function measurandOf(section: Section, id: string): Measurand {
  const measurand = section.measurands.get(id)
  if (measurand === undefined) throw new Error(`the record holds no measurand ${id}`)
  return measurand
}

/** Block id as the reader sees it: `Precision`, or `Precision: low range` when the block has a name. */
export function blockTitle(section: Section, block: string): string {
  const dot = block.indexOf('.')
  return dot < 0 ? titleOf(section, block) : `${titleOf(section, block.slice(0, dot))}: ${block.slice(dot + 1)}`
}

/** A text as part of ids and file names: letters, digits and hyphens. */
export function slug(text: string): string {
  const plain = text.toLowerCase().replace(/[^\p{L}\p{N}]+/gu, '-').replace(/^-|-$/g, '')
  return plain === '' ? 'x' : plain
}

export const status = (record: StudyRecord): string => (record.openItems.length > 0 ? 'DRAFT' : 'FOR SIGNATURE')
