// Studies made from a seed go through the whole pipeline. Every number of the report must be a number of the record, nothing of the demo may
// appear, each verdict is reached somewhere, and one changed raw cell changes exactly the findings whose evidence includes it.
import { describe, expect, test } from 'vitest'
import type { Finding } from '../src/assess/finding.ts'
import type { StudyRecord } from '../src/assess/record.ts'
import { check, type Checked, type World } from '../src/pipeline.ts'
import type { Inline, ReportBlock, ReportDocument } from '../src/present/document.ts'
import { generatedStudy, type GeneratedStudy } from './support/generated-study.ts'
import { shippedTemplate } from './support/shipped-template.ts'

const encoder = new TextEncoder()

function worldOf(study: GeneratedStudy, replaced: ReadonlyMap<string, string> = new Map()): World {
  return {
    program: { name: 'Assaywrit', version: '0.0.0-test' }, templates: ['validation-report'], template: shippedTemplate,
    read(path) {
      const text = replaced.get(path) ?? study.files.get(path)
      return text === undefined ? { problem: 'no such file', mend: '' } : { path, bytes: encoder.encode(text) }
    },
  }
}

function checked(study: GeneratedStudy, replaced?: ReadonlyMap<string, string>): Checked {
  return check({ path: 'study.yaml', bytes: encoder.encode(study.study) }, worldOf(study, replaced))
}

function complete(result: Checked): { readonly record: StudyRecord; readonly document: ReportDocument } {
  if (result.record === undefined || result.tell === undefined) throw new Error(result.diagnostics.map((each) => `${each.code} ${each.message} ${each.place?.file}:${each.place?.line}`).join('\n'))
  return { record: result.record, document: result.tell().document }
}

/** Every number and every text anywhere in the record. */
function contentsOf(value: unknown, numbers: Set<number>, texts: Set<string>): void {
  if (typeof value === 'number') numbers.add(value)
  else if (typeof value === 'string') texts.add(value)
  else if (Array.isArray(value)) for (const item of value) contentsOf(item, numbers, texts)
  else if (typeof value === 'object' && value !== null) for (const [key, member] of Object.entries(value)) {
    texts.add(key)
    contentsOf(member, numbers, texts)
  }
}

function inlinesOf(block: ReportBlock): readonly Inline[] {
  switch (block.type) {
    case 'textBlock': case 'sectionHeading': case 'formula': return block.children
    case 'exhibitFigure': return block.caption
    case 'exhibitTable': return [...block.caption, ...block.notes.flat(), ...block.groups.flat().flatMap((row) => row.cells.flat())]
    case 'cover': return block.overallSentence
    case 'signOff': return block.note
    default: return []
  }
}

function flattened(inline: Inline): readonly Inline[] {
  return 'children' in inline ? [inline, ...(inline.children as readonly Inline[]).flatMap(flattened)] : [inline]
}

/** Printed text back to a number, with the size of half a unit of its last digit. */
function readBack(text: string): { readonly value: number; readonly half: number } {
  const plain = text.replace('\u2212', '-').replace(/[\u00a0\u202f ]/g, '')
  const match = /^(-?)(\d+)(?:\.(\d+))?(?:×10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+))?$/.exec(plain)
  if (match === null) throw new Error(`not a printed number: ${text}`)
  const raised = match[4] === undefined ? 0 : Number([...match[4]].map((sign) => (sign === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(sign)))).join(''))
  const unit = 10 ** (raised - (match[3]?.length ?? 0))
  return { value: Number(`${match[1]}${match[2]}${match[3] === undefined ? '' : `.${match[3]}`}`) * 10 ** raised, half: unit / 2 }
}

/** Fixed phrases that hold digits and are no results; anything else with a digit must be in the record. */
const phrases = [/\bSHA-256\b/g, /\brecord\.json\b/g, /\bR²|χ²|x²|s²\b/g]

describe.each([
  { seed: 1, measurands: 1 }, { seed: 2, measurands: 2 }, { seed: 3, measurands: 7, shuffled: true }, { seed: 4, measurands: 2, without: ['detection', 'range'] },
  { seed: 5, measurands: 2, without: ['accuracy', 'comparison'] }, { seed: 6, measurands: 1, without: ['linearity', 'detection', 'range'] }, { seed: 7, measurands: 60 },
])('seed $seed, $measurands measurands', (choice) => {
  const study = generatedStudy(choice)
  const { record, document } = complete(checked(study))
  const numbers = new Set<number>()
  const texts = new Set<string>()
  contentsOf(record, numbers, texts)

  test('every number of the report is a number of the record, printed within half a unit of its last digit', () => {
    const strangers: string[] = []
    for (const block of document.blocks) for (const inline of inlinesOf(block).flatMap(flattened)) {
      if (inline.type !== 'number') continue
      const allowed = numbers.has(inline.value) || isCount(inline, block)
      if (!allowed) strangers.push(`${'id' in block ? block.id : block.type}: ${inline.value} is no number of the record`)
      else if (inline.text.startsWith('<')) continue
      else {
        // A confidence of 0.95 is printed as 95 %.
        const scale = inline.value > 0 && inline.value < 1 ? [1, 100] : [1]
        const shown = readBack(inline.text)
        if (!scale.some((factor) => Math.abs(shown.value - inline.value * factor) <= shown.half * (1 + 1e-9) + Math.abs(inline.value) * 1e-12)) strangers.push(`${'id' in block ? block.id : block.type}: ${inline.text} printed for ${inline.value}`)
      }
    }
    expect(strangers.slice(0, 10)).toEqual([])
  })

  test('every digit outside a number node stands in a text of the record', () => {
    const strangers: string[] = []
    const known = [...texts].join('\n')
    for (const block of document.blocks) for (const inline of inlinesOf(block).flatMap(flattened)) {
      if (inline.type !== 'text') continue
      const rest = phrases.reduce((text, phrase) => text.replace(phrase, ''), inline.value)
      for (const token of rest.match(/[^\s,;:()]*\d[^\s,;:()]*/g) ?? []) {
        const bare = token.replace(/[.”“"]+$/g, '').replace(/^[”“"]+/g, '')
        if (!known.includes(bare) && !numbers.has(Number(bare))) strangers.push(`${'id' in block ? block.id : block.type}: ${token} in “${inline.value.slice(0, 80)}”`)
      }
    }
    expect(strangers.slice(0, 10)).toEqual([])
  })

  test('every number of a chart is a number of the record', () => {
    const strangers: string[] = []
    for (const block of document.blocks) {
      if (block.type !== 'exhibitFigure') continue
      // `span` widens an axis to round ends, and other keys shift a dot or a label: that is layout, not data.
      for (const [name, rows] of Object.entries(block.chart.data).filter(([each]) => each !== 'span' && each !== 'key')) for (const row of rows.filter((each) => each['role'] !== 'span')) for (const [key, value] of Object.entries(row)) {
        // A limit on the size of an error is drawn on both sides of zero.
        if (typeof value === 'number' && /^(x|y|low|high|value|mean|estimate|bound|density|order|overall)$/.test(key) && !numbers.has(value) && !(/limit/i.test(name) && numbers.has(-value))) strangers.push(`${block.id} ${name}.${key}: ${value}`)
      }
    }
    expect(strangers.slice(0, 10)).toEqual([])
  })

  test('nothing of the demo appears', () => {
    expect(JSON.stringify(document)).not.toMatch(/chloride|nitrate|sulfate|greywater/i)
  })
})

/** Counts of the record's own entries (decisions, rows) are made by counting, and are whole. */
function isCount(inline: Inline & { readonly type: 'number' }, block: ReportBlock): boolean {
  return Number.isInteger(inline.value) && inline.value >= 0 && (block.type === 'textBlock' || block.type === 'cover')
}

test('each verdict is reached by some generated study', () => {
  const words = new Set([1, 2, 3, 8, 9, 10, 11, 12].flatMap((seed) => complete(checked(generatedStudy({ seed, measurands: 2 }))).record.verdicts.map((verdict) => verdict.verdict)))
  expect([...words].sort()).toEqual(expect.arrayContaining(['meets', 'misses']))
  const withFew = generatedStudy({ seed: 13, measurands: 1 })
  // A censored result makes its level not evaluable.
  const lines = (withFew.files.get('raw/spikes.csv') ?? '').split('\n')
  const separator = withFew.study.includes('delimiter: semicolon') ? ';' : ','
  lines[1] = [...(lines[1] ?? '').split(separator).slice(0, -1), '<1'].join(separator)
  const few = new Map([['raw/spikes.csv', lines.join('\n')]])
  expect(complete(checked(withFew, few)).record.verdicts.map((verdict) => verdict.verdict)).toContain('not evaluable')
})

test('row order changes no finding beyond the last bits', () => {
  const values = (shuffled: boolean): Map<string, number> => new Map(complete(checked(generatedStudy({ seed: 21, measurands: 2, shuffled }))).record.findings.map((finding) => [finding.id, finding.value]))
  const [straight, other] = [values(false), values(true)]
  expect([...other.keys()].sort()).toEqual([...straight.keys()].sort())
  for (const [id, value] of straight) expect(Math.abs((other.get(id) ?? NaN) - value), id).toBeLessThanOrEqual(Math.abs(value) * 1e-9 + 1e-12)
})

test.each([['raw/curve.csv', 4], ['raw/empties.csv', 3], ['raw/spikes.csv', 5], ['raw/days.csv', 7], ['raw/arms.csv', 2]])('changing one cell of %s changes exactly the findings that rest on it', (file, line) => {
  const study = generatedStudy({ seed: 31, measurands: 2 })
  const before = complete(checked(study)).record
  const lines = (study.files.get(file) ?? '').split('\n')
  const separator = study.study.includes('delimiter: semicolon') ? ';' : ','
  const cells = (lines[line - 1] ?? '').split(separator)
  const last = cells.at(-1) ?? ''
  // Another last digit: enough to move every number that rests on the cell, too little to change what is said.
  cells[cells.length - 1] = last.slice(0, -1) + (last.endsWith('7') ? '3' : '7')
  lines[line - 1] = cells.join(separator)
  const after = complete(checked(study, new Map([[file, lines.join('\n')]]))).record
  const dataset = before.datasets.find((each) => each.files.some((reading) => reading.file === file))
  const row = dataset?.rows.findIndex((each) => each.line === line) ?? -1
  const rests = (finding: Finding): boolean => finding.evidence.some((evidence) => evidence.dataset === dataset?.name && evidence.rows.includes(row))
  const old = new Map(before.findings.map((finding) => [finding.id, finding]))
  const changed = after.findings.filter((finding) => old.get(finding.id)?.value !== finding.value || JSON.stringify(old.get(finding.id)?.interval) !== JSON.stringify(finding.interval))
  expect(changed.length).toBeGreaterThan(0)
  expect(changed.filter((finding) => !rests(finding)).map((finding) => `${finding.id} changed without resting on the cell`)).toEqual([])
  // The other way round: what rests on the cell moves, unless the statistic is one that a single value may leave alone (a rank, a range end, a count).
  const still = after.findings.filter((finding) => rests(finding) && !changed.includes(finding)).map((finding) => finding.metric)
  expect(still.filter((metric) => !/range|straight-to|probability|levels/.test(metric))).toEqual([])
})
