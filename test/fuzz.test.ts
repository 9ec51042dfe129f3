// Studies and raw files of fixtures/studies, damaged at random from a seed: whatever they hold, a check ends with a record of finite numbers
// or with errors that have places, and never throws. A change of white space or of the order of rows changes no finding.
// ASSAYWRIT_FUZZ=20000 runs that many cases; ASSAYWRIT_FUZZ_SEED=7 starts at another seed. A failure names its seed and what was done.
import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { diagnosticsAsJson, printDiagnostics } from '../src/diagnostics/print.ts'
import { check, type Checked } from '../src/pipeline.ts'
import { type Random, seededRandom } from './support/seeded-random.ts'
import { shippedTemplate } from './support/shipped-template.ts'

const cases = Number(process.env['ASSAYWRIT_FUZZ'] ?? 300)
const firstSeed = Number(process.env['ASSAYWRIT_FUZZ_SEED'] ?? 1)
const root = fileURLToPath(new URL('../fixtures/studies', import.meta.url))

type Files = ReadonlyMap<string, Uint8Array>

const studies = readdirSync(root).filter((name) => statSync(join(root, name)).isDirectory()).map((name): { readonly name: string; readonly files: Files } => ({
  name, files: new Map((readdirSync(join(root, name), { recursive: true }) as string[]).filter((path) => /\.(yaml|csv)$/.test(path)).map((path) => [path.split('\\').join('/'), readFileSync(join(root, name, path))])),
}))

function checked(files: Files): Checked {
  return check({ path: 'study.yaml', bytes: files.get('study.yaml') ?? new Uint8Array() }, {
    program: { name: 'Assaywrit', version: '0.0.0-test' }, templates: ['validation-report'], template: shippedTemplate,
    read: (path) => {
      const bytes = files.get(path)
      return bytes === undefined ? { problem: 'no such file', mend: 'Put the file there' } : { path, bytes }
    },
  })
}

const odd: readonly string[] = [
  '\u0000', '\u001b[31m', '\u0007', '\ufeff', '\ufffd', '\u202e', '\u200b', '\u00a0', '\r', '\n', '\r\n', '\t', '"', '""', "'", ',', ';', '|', ':', '- ', '#', '{', '}', '[', ']', '&a', '*a', '!!js', '%', '\\', '`', '$', '..', '../', '/',
  '0', '-0', '-1', '1e400', '1e-400', '1e308', '-1e308', '1e-308', 'NaN', 'Infinity', '.inf', '.nan', '0x10', '1,234', '9007199254740993', 'null', '~', 'true', 'no', '<', '<0.05', '>500', 'ND', 'n.a.', '=A1', '#REF!', '100 %', 'µ', 'é', '😀', '__proto__', 'constructor', 'x'.repeat(3000),
]

/** One change of a text, and what it was in a few words. */
const changes: readonly ((text: string, random: Random) => readonly [string, string])[] = [
  (text, random) => { const [at, length] = span(text, random, 12); return [text.slice(0, at) + text.slice(at + length), `delete ${length} at ${at}`] },
  (text, random) => { const [at, length] = span(text, random, 40); return [text.slice(0, at + length) + text.slice(at), `duplicate ${length} at ${at}`] },
  (text, random) => { const at = random.integer(0, text.length); return [text.slice(0, at), `truncate at ${at}`] },
  (text, random) => { const at = random.integer(0, text.length); const piece = random.pick(odd); return [text.slice(0, at) + piece + text.slice(at), `insert ${JSON.stringify(piece.slice(0, 12))} at ${at}`] },
  (text, random) => lineChange(text, random, 'delete a line', (lines, at) => lines.filter((_, index) => index !== at)),
  (text, random) => lineChange(text, random, 'duplicate a line', (lines, at) => lines.flatMap((line, index) => (index === at ? [line, line] : [line]))),
  (text, random) => { const other = random.next(); return lineChange(text, random, 'swap two lines', (lines, at) => { const to = Math.floor(other * lines.length); return lines.map((line, index) => (index === at ? (lines[to] ?? '') : index === to ? (lines[at] ?? '') : line)) }) },
  (text, random) => wordChange(text, random, /[^\s,;:{}[\]]+/g, (word) => { const other = random.pick(odd); return [other, `${word} becomes ${JSON.stringify(other.slice(0, 12))}`] }),
  (text, random) => wordChange(text, random, /\d+(?:[.,]\d+)?/g, (word) => { const other = random.pick(['0', '-1', '1', '1e308', '-1e308', '1e154', '1e-300', '5e-324', '99999999999999999999', word.replace(/\d/, '9'), `${word}0`, `-${word}`, '', 'ND', '<1']); return [other, `number ${word} becomes ${other}`] }),
  // A whole column or key at once: every place of one word.
  (text, random) => { const word = random.pick(text.match(/[^\s,;:{}[\]]+/g) ?? ['']); const other = random.pick(['0', '', '1', 'x', '-5', '1e200', 'ND']); return [word === '' ? text : text.replaceAll(word, other), `every ${word} becomes ${other}`] },
]

function span(text: string, random: Random, longest: number): readonly [number, number] {
  return [random.integer(0, Math.max(0, text.length - 1)), random.integer(1, longest)]
}

function lineChange(text: string, random: Random, name: string, change: (lines: readonly string[], at: number) => readonly string[]): readonly [string, string] {
  const lines = text.split('\n')
  const at = random.integer(0, lines.length - 1)
  return [change(lines, at).join('\n'), `${name} at ${at + 1}`]
}

function wordChange(text: string, random: Random, pattern: RegExp, change: (word: string) => readonly [string, string]): readonly [string, string] {
  const found = [...text.matchAll(pattern)]
  if (found.length === 0) return [text, 'nothing']
  const match = random.pick(found)
  const [other, told] = change(match[0])
  return [text.slice(0, match.index) + other + text.slice(match.index + match[0].length), told]
}

/** Bytes that are no text need the bytes themselves. */
function damagedBytes(bytes: Uint8Array, random: Random): Uint8Array {
  const copy = Uint8Array.from(bytes)
  for (let count = random.integer(1, 4); count > 0 && copy.length > 0; count -= 1) copy[random.integer(0, copy.length - 1)] = random.integer(0, 255)
  return copy
}

function damaged(files: Files, random: Random): { readonly files: Files; readonly told: string } {
  const changed = new Map(files)
  const told: string[] = []
  for (let count = random.pick([1, 1, 1, 2, 3, 8]); count > 0; count -= 1) {
    const path = random.next() < 0.4 ? 'study.yaml' : random.pick([...files.keys()])
    const bytes = changed.get(path) ?? new Uint8Array()
    if (random.next() < 0.1) {
      changed.set(path, damagedBytes(bytes, random))
      told.push(`${path}: bytes`)
      continue
    }
    const [text, what] = random.pick(changes)(new TextDecoder('utf-8', { ignoreBOM: true }).decode(bytes), random)
    changed.set(path, new TextEncoder().encode(text))
    told.push(`${path}: ${what}`)
  }
  return { files: changed, told: told.join('; ') }
}

/** Path of the first number of a value that is not finite. */
function notFinite(value: unknown, path = ''): string | undefined {
  if (typeof value === 'number') return Number.isFinite(value) ? undefined : path
  if (typeof value !== 'object' || value === null) return undefined
  for (const [key, member] of Object.entries(value)) {
    const found = notFinite(member, `${path}.${key}`)
    if (found !== undefined) return found
  }
  return undefined
}

/** What is wrong with an outcome, in words; empty when nothing is. */
function faults(files: Files): readonly string[] {
  let result: Checked
  try {
    result = checked(files)
  } catch (error) {
    return [`threw ${error instanceof Error ? (error.stack ?? error.message).split('\n').slice(0, 4).join(' ') : String(error)}`]
  }
  const errors = result.diagnostics.filter((each) => each.severity === 'error')
  const infinite = notFinite(result.record)
  const linesOf = (path: string): number | undefined => {
    const bytes = files.get(path)
    return bytes === undefined ? undefined : new TextDecoder(path.endsWith('.csv') && bytes[0] === 0xff ? 'utf-16le' : 'utf-8').decode(bytes).split(/\r\n|\n|\r/).length
  }
  const sources = new Map([...files].map(([path, bytes]) => [path, new TextDecoder().decode(bytes)]))
  const printed = printDiagnostics(result.diagnostics, { sources })
  return [
    ...(result.record === undefined && errors.length === 0 ? ['no record and no error'] : []),
    ...(infinite === undefined ? [] : [`not finite: ${infinite}`]),
    ...errors.filter((each) => each.place === undefined).map((each) => `no place: ${each.code} ${each.message}`),
    ...result.diagnostics.filter((each) => (each.place?.line ?? 1) < 1 || (each.place?.column ?? 1) < 1 || (each.place?.line ?? 1) > (linesOf(each.place?.file ?? '') ?? Infinity)).map((each) => `place outside its file: ${each.code} ${JSON.stringify(each.place)}`),
    ...errors.filter((each) => !each.expected && !each.mend).map((each) => `neither expected nor mend: ${each.code} ${each.message}`),
    ...result.diagnostics.filter((each) => /\bNaN\b|\bundefined\b|\[object /.test(each.message.replace(/`[^`]*`/g, ''))).map((each) => `words of a program: ${each.message}`),
    ...(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/.test(printed) ? ['a control character is printed'] : []),
    ...(JSON.stringify(diagnosticsAsJson(result.diagnostics)).includes('"place":{}') ? ['an empty place'] : []),
  ]
}

test(`${cases} damaged studies are read or refused`, { timeout: 60_000 + cases * 1000 }, () => {
  const broken: string[] = []
  for (let seed = firstSeed; seed < firstSeed + cases; seed += 1) {
    const random = seededRandom(seed)
    const study = random.next() < 0.5 ? studies.find((each) => each.name === 'smallest') : random.pick(studies)
    if (study === undefined) throw new Error('no study to damage')
    const { files, told } = damaged(study.files, random)
    for (const fault of faults(files)) broken.push(`seed ${seed}, ${study.name}, ${told}: ${fault}`)
  }
  expect(broken).toEqual([])
})

interface Numbers {
  readonly findings: ReadonlyMap<string, readonly (number | undefined)[]>
  readonly verdicts: readonly string[]
}

function numbersOf(files: Files): Numbers {
  const { record, diagnostics } = checked(files)
  if (record === undefined) throw new Error(printDiagnostics(diagnostics, { sources: new Map() }))
  return {
    findings: new Map(record.findings.map((each) => [each.id, [each.value, each.interval?.low, each.interval?.high, each.n, each.df]])),
    verdicts: record.verdicts.map((each) => `${each.finding} ${each.verdict}`).sort(),
  }
}

/** Changes that say nothing. `headerRow` is the line of the headings. */
const idle: readonly { readonly name: string; readonly change: (text: string, headerRow: number, random: Random) => string }[] = [
  { name: 'line ends of another kind', change: (text, _, random) => text.replaceAll(/\r\n|\n/g, random.pick(['\r\n', '\r', '\n'])) },
  { name: 'blank lines', change: (text, headerRow, random) => text.split('\n').flatMap((line, index) => (index >= headerRow && random.next() < 0.2 ? [line, '', '  '] : [line])).join('\n') },
  { name: 'spaces around cells', change: (text, headerRow, random) => text.split('\n').map((line, index) => (index < headerRow - 1 || line === '' ? line : line.replaceAll(/[,;]/g, (sign, at: number) => (isMark(line, at) ? sign : ` ${sign}${random.pick([' ', '\u00a0', ''])}`)))).join('\n') },
  { name: 'rows in another order', change: (text, headerRow, random) => { const lines = text.trimEnd().split('\n'); return [...lines.slice(0, headerRow), ...random.shuffled(lines.slice(headerRow))].join('\n') } },
]

/** In a file of semicolons a comma between digits is a decimal mark. */
function isMark(line: string, at: number): boolean {
  return line.includes(';') && line[at] === ','
}

describe.each(studies)('$name', ({ files }) => {
  const before = numbersOf(files)
  const headerRows = new Map(checked(files).record?.datasets.flatMap((dataset) => dataset.files.map((each): [string, number] => [each.file, each.headerRow])))

  test.each(idle)('$name change no finding', ({ change }) => {
    for (let seed = 1; seed <= 3; seed += 1) {
      const random = seededRandom(seed)
      const changed = new Map([...files].map(([path, bytes]): [string, Uint8Array] => {
        const headerRow = headerRows.get(path)
        return [path, headerRow === undefined ? bytes : new TextEncoder().encode(change(new TextDecoder('utf-8', { ignoreBOM: true }).decode(bytes), headerRow, random))]
      }))
      expect(differences(before, numbersOf(changed)), `seed ${seed}`).toEqual([])
    }
  })
})

function differences(before: Numbers, after: Numbers): readonly string[] {
  const ids = new Set([...before.findings.keys(), ...after.findings.keys()])
  const moved = [...ids].filter((id) => {
    const [old, now] = [before.findings.get(id), after.findings.get(id)]
    return old === undefined || now === undefined || old.some((value, index) => {
      const other = now[index]
      return value === undefined || other === undefined ? value !== other : Math.abs(value - other) > 1e-9 * Math.abs(value) + 1e-15
    })
  })
  return [...moved.map((id) => `${id}: ${before.findings.get(id)?.join(' ')} became ${after.findings.get(id)?.join(' ')}`), ...(before.verdicts.join() === after.verdicts.join() ? [] : ['verdicts differ'])]
}
