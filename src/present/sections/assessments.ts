// One section per block and, inside it, per measurand: what the characteristic presents, then its criteria with every decision, then
// what could not be evaluated and why. Sections know no characteristic by name.
import type { RecordedAssessment } from '../../assess/record.ts'
import type { Finding, Verdict } from '../../assess/finding.ts'
import { column, joined, paragraph, row, secondary, sentence, table, textOf } from '../build.ts'
import type { Inline, NumberNode, ReportBlock } from '../document.ts'
import { asFound, asPercent, asTyped, count, degreesOfFreedom, printed, probability } from '../numbers.ts'
import { byCriterion, deciding, resultWords, unitWords } from '../verdict-rows.ts'
import { blockTitle, measurandOf, metricLabel, outcomeKey, type Section, slug } from './section.ts'

export function assessmentSectionId(block: string, measurand: string): string {
  return `section-${slug(block)}-${slug(measurand)}`
}

export function assessments(section: Section): readonly ReportBlock[] {
  const everything = isEverythingTold(section)
  return section.record.study.blocks.flatMap((block): readonly ReportBlock[] => {
    const own = section.record.assessments.filter((each) => each.block === block.id)
    return [
      { type: 'sectionHeading', id: `section-${slug(block.id)}`, depth: 1, children: textOf(blockTitle(section, block.id)) },
      ...(everything ? [] : [paragraph(textOf('The main exhibits of each measurand are shown here; every other number stands in the attached record.json.'))]),
      ...own.flatMap((assessment) => oneAssessment(section, assessment, everything)),
    ]
  })
}

/** Above this number of measurands a section keeps its main exhibits unless the study asks for all: five hundred pages are read by no one. */
const fullUpTo = 12

export function isEverythingTold({ record }: Section): boolean {
  return (record.study.report.detail ?? (record.study.measurands.length > fullUpTo ? 'main' : 'all')) === 'all'
}

function oneAssessment(section: Section, assessment: RecordedAssessment, everything: boolean): readonly ReportBlock[] {
  const measurand = measurandOf(section, assessment.measurand)
  const part = section.catalogue.find((each) => each.id === assessment.characteristic)
  if (part === undefined) throw new Error(`the catalogue holds no ${assessment.characteristic}`)
  const prefix = `${slug(assessment.block)}-${slug(assessment.measurand)}`
  const { findings, verdicts } = section.outcomes.get(outcomeKey(assessment)) ?? { findings: [], verdicts: [] }
  const told = assessment.detail === null ? [] : part.present({
    title: part.title, block: assessment.block, measurand, prefix, detail: assessment.detail, findings, verdicts,
    notEvaluable: assessment.notEvaluable, metrics: part.metrics, confidence: section.record.study.rules.confidence, everything,
  })
  return [
    { type: 'sectionHeading', id: assessmentSectionId(assessment.block, assessment.measurand), depth: 2, children: textOf(measurand.name) },
    ...decisions(section, everything ? verdicts : byCriterion(verdicts).map(deciding), prefix, measurand.unit),
    ...(assessment.detail === null ? [paragraph(textOf('Nothing could be computed from the data given.'))] : []),
    ...notEvaluable(section, assessment, verdicts, measurand.unit),
    ...told,
    ...secondary({ everything }, () => findingsTable(section, findings, prefix, measurand.unit)),
  ]
}

function decisions(section: Section, verdicts: readonly Verdict[], prefix: string, levelUnit: string): readonly ReportBlock[] {
  if (verdicts.length === 0) return [paragraph(textOf('The study states no criterion here; what follows is information only.'))]
  return [table({
    id: `${prefix}-decisions`, caption: 'Acceptance criteria and decisions',
    columns: [column('Criterion', { align: 'text', rowHeader: true }), column('Limit', { align: 'text' }), column('Source of the limit', { align: 'text' }), column('Decided on', { align: 'text' }), column('Result', { align: 'text' }), column('Verdict', { align: 'text' })],
    rows: verdicts.map((verdict) => row(
      metricLabel(section, verdict.characteristic, verdict.metric), verdict.criterion, verdict.source ?? 'not stated', verdict.decideBy,
      verdict.unrounded === undefined ? (verdict.because ?? '') : resultWords(verdict, section.findings.get(verdict.finding), levelUnit), { type: 'verdict', word: verdict.verdict },
    )),
    notes: borderlineNotes(verdicts),
  })]
}

/** Verdicts that would have been others, had the value been rounded or not been. */
export function borderlineNotes(verdicts: readonly Verdict[]): readonly string[] {
  return verdicts.filter((verdict) => verdict.otherwise !== undefined).map((verdict) =>
    `Borderline: ${verdict.finding} is decided on ${verdict.decisionValue ?? ''} (${isRounded(verdict) ? 'rounded' : 'unrounded'}): ${verdict.verdict}. ${isRounded(verdict) ? `Unrounded, on ${(verdict.unrounded ?? []).map((value) => Number(value.toPrecision(12))).join(' to ')}` : `Rounded, on ${(verdict.rounded ?? []).join(' to ')}`}: ${verdict.otherwise ?? ''}.`)
}

function isRounded(verdict: Verdict): boolean {
  return verdict.decisionValue === (verdict.rounded ?? []).join(' to ')
}

/** What has one reason at one place is told in one line. */
function notEvaluable(section: Section, assessment: RecordedAssessment, verdicts: readonly Verdict[], levelUnit: string): readonly ReportBlock[] {
  const told = assessment.notEvaluable.filter((each) => each.notAsked !== true || verdicts.some((verdict) => verdict.metric === each.metric))
  if (told.length === 0) return []
  const lines = new Map<string, string[]>()
  for (const each of told) {
    const at = `${each.level === undefined ? '' : ` at ${each.level}${textUnit(levelUnit)}`}${each.condition === undefined ? '' : ` (${each.condition})`}: ${each.because}`
    lines.set(at, [...(lines.get(at) ?? []), metricLabel(section, assessment.characteristic, each.metric)])
  }
  const items = [...lines].map(([rest, labels]) => `${labels.join(', ')}${rest}`)
  return [paragraph(textOf('Not evaluable:')), { type: 'list', ordered: false, spread: false, children: items.map((item) => ({ type: 'listItem', spread: false, children: [{ type: 'paragraph', children: [{ type: 'text', value: item }] }] })) }]
}

function textUnit(unit: string): string {
  return unit === '' ? '' : `${unit === '%' ? '\u202f' : '\u00a0'}${unit}`
}

/** Every finding with interval, n, df and method: the register from which everything above is told. */
function findingsTable(section: Section, findings: readonly Finding[], prefix: string, levelUnit: string): readonly ReportBlock[] {
  if (findings.length === 0) return []
  const isMixed = confidencesOf(findings).length > 1
  return [table({
    id: `${prefix}-findings`, caption: 'Findings with interval, number of values and degrees of freedom',
    columns: [
      column('Finding', { align: 'text', rowHeader: true }), column('Value', { align: 'text' }), column('Interval', { align: 'text' }),
      column('n'), column('df'),
    ],
    rows: findings.map((finding) => row(
      [...textOf(metricLabel(section, finding.characteristic, finding.metric)), ...where(finding, levelUnit)],
      [found(finding), ...unitWords(finding.unit)],
      finding.interval === undefined ? '' : sentence`${printed(finding.interval.low)} to ${printed(finding.interval.high)}${isMixed ? sentence` (${asPercent(finding.interval.confidence)}\u202f%)` : ''}`,
      finding.n === undefined ? '' : count(finding.n), finding.df === undefined ? '' : degreesOfFreedom(finding.df),
    )),
    notes: [...intervalNotes(findings), [...textOf('Methods and sources: '), { type: 'reference', target: 'methods' }, ...textOf('.')]],
  })]
}

/** A correlation of 0.99996 is not 1.000: as many digits as tell it from one; a probability is never said to be zero. */
function found(finding: Finding): NumberNode {
  const { value } = finding
  if (finding.metric.endsWith('-probability') && value < 0.0001) return probability(value)
  let significant = 4
  while (finding.unit === '' && Math.abs(value) < 1 && significant < 12 && Math.abs(Number(value.toPrecision(significant))) === 1) significant += 1
  return significant === 4 ? asFound(value) : printed(value, { significant })
}

function where(finding: Finding, levelUnit: string): readonly Inline[] {
  return joined([
    finding.level === undefined ? [] : sentence`, ${asTyped(finding.level)}${unitWords(levelUnit)}`,
    finding.condition === undefined ? [] : textOf(`, ${finding.condition}`),
  ], '')
}

function confidencesOf(findings: readonly Finding[]): readonly number[] {
  return [...new Set(findings.flatMap((finding) => finding.interval?.confidence ?? []))]
}

function intervalNotes(findings: readonly Finding[]): readonly (readonly Inline[])[] {
  const [confidence, ...others] = confidencesOf(findings)
  if (confidence === undefined) return []
  return others.length > 0 ? [textOf('Intervals are two-sided, at the confidence beside them.')] : [[...textOf('Intervals are two-sided at a confidence of '), asPercent(confidence), ...unitWords('%'), ...textOf('.')]]
}
