// Readers of single values. A text is kept as typed; a number, a truth value or a quantity is taken only in the one form that every
// program reads alike, because a study must not mean another thing elsewhere (`no`, `1e3`, `1,5`).
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { parseQuantity } from './quantity.ts'
import { described, type Described, kindOf, type Reader, type Reading, unexpected } from './reading.ts'
import type { Quantity } from './study.ts'
import type { ScalarNode, StudyNode } from './study-node.ts'
import { unknownUnit } from './unknown-unit.ts'

/** Any scalar, as typed: `4` and `2026-03-02` are kept letter by letter; a bare `no` or `null` needs quotes. */
export function text(about: Described): Reader<string> {
  return {
    schema: described({ type: ['string', 'number'] }, about),
    read(node, reading) {
      if (node.kind !== 'scalar' || node.text.trim() === '') return unexpected(node, reading, 'a text')
      if (isBareWord(node)) return ambiguousWord(node, reading, 'a text in quotes', `Write \`"${node.text}"\`: without quotes some programs read it as ${meaningOf(node.text)}`)
      return node.text
    },
  }
}

/** The name of a dataset of the study; that it exists is checked once all are known. */
export function datasetName(about: Described): Reader<string> {
  const inner = text(about)
  return {
    schema: inner.schema,
    read(node, reading) {
      const name = inner.read(node, reading)
      if (name !== undefined) reading.refersTo?.({ kind: 'dataset', name, place: node.place })
      return name
    },
  }
}

/** Of YAML 1.1 and 1.2 together; the two disagree on the first line. */
const bareWords: Readonly<Record<string, string>> = {
  yes: 'true', on: 'true', no: 'false', off: 'false',
  true: 'true', false: 'false', null: 'nothing', '~': 'nothing',
}

function meaningOf(word: string): string | undefined {
  const lower = word.toLowerCase()
  return Object.hasOwn(bareWords, lower) ? bareWords[lower] : undefined
}

function isBareWord(node: ScalarNode): boolean {
  return !node.quoted && meaningOf(node.text) !== undefined
}

function ambiguousWord(node: ScalarNode, reading: Reading, expected: string, mend: string): undefined {
  reading.report(diagnostic('definition/ambiguous-word', `Unexpected bare word \`${node.text}\` for \`${reading.path}\``, { place: node.place, actual: node.text, expected, mend }))
  return undefined
}

export function flag(about: Described): Reader<boolean> {
  return {
    schema: described({ type: 'boolean' }, about),
    read(node, reading) {
      if (node.kind === 'scalar' && !node.quoted && (node.text === 'true' || node.text === 'false')) return node.text === 'true'
      const meaning = node.kind === 'scalar' ? meaningOf(node.text) : undefined
      if (node.kind !== 'scalar' || meaning === undefined || meaning === 'nothing') return unexpected(node, reading, 'true or false')
      return ambiguousWord(node, reading, 'true or false', `Write \`${meaning}\`, in small letters and without quotes: other words are texts to some programs`)
    },
  }
}

export function oneOf<const T extends string>(choices: readonly T[], about: Described): Reader<T> {
  return {
    schema: described({ enum: choices }, about),
    read(node, reading) {
      const typed = node.kind === 'scalar' ? node.text : undefined
      const match = choices.find((choice) => choice === typed)
      if (match !== undefined) return match
      const guess = typed === undefined ? undefined : nearest(typed, choices)
      reading.report(diagnostic('definition/unknown-choice', `Unexpected ${kindOf(node)} for \`${reading.path}\``, {
        place: node.place, actual: kindOf(node), expected: choices.join(' | '), mend: guess === undefined ? `Write one of: ${choices.join(', ')}` : `Write \`${guess}\``,
      }))
      return undefined
    },
  }
}

export function date(about: Described): Reader<string> {
  return {
    schema: described({ type: 'string', pattern: '^\\d{4}-\\d{2}-\\d{2}$' }, about),
    read(node, reading) {
      if (node.kind !== 'scalar' || !isCalendarDate(node.text)) return unexpected(node, reading, 'a date as year-month-day, such as 2026-04-17')
      return node.text
    },
  }
}

function isCalendarDate(candidate: string): boolean {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(candidate)
  if (match === null) return false
  const [year, month, day] = [Number(match[1]), Number(match[2]), Number(match[3])]
  const leap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0
  const lengths = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]
  return month >= 1 && month <= 12 && day >= 1 && day <= (lengths[month - 1] ?? 0)
}

export function number(about: Described & { readonly minimum?: number; readonly maximum?: number; readonly integer?: true }): Reader<number> {
  const bounds = [...(about.minimum === undefined ? [] : [`of at least ${about.minimum}`]), ...(about.maximum === undefined ? [] : [`of at most ${about.maximum}`])].join(' and ')
  const isFixed = about.minimum !== undefined && about.minimum === about.maximum
  const expected = isFixed ? `the number ${about.minimum}` : `${about.integer ? 'a whole number' : 'a number'}${bounds === '' ? '' : ` ${bounds}`}`
  return {
    schema: described({
      type: about.integer ? 'integer' : 'number',
      ...(about.minimum === undefined ? {} : { minimum: about.minimum }), ...(about.maximum === undefined ? {} : { maximum: about.maximum }),
    }, about),
    read(node, reading) {
      const value = plainNumber(node, reading, expected)
      if (value === undefined) return undefined
      const isWithin = value >= (about.minimum ?? -Infinity) && value <= (about.maximum ?? Infinity)
      return isWithin && (!about.integer || Number.isInteger(value)) ? value : unexpected(node, reading, expected)
    },
  }
}

/** Digits with a point, or with a point and a signed exponent: what YAML 1.1 and 1.2 both read as the same number. */
const sharedForm = /^[+-]?(?:(?:0|[1-9]\d*)(?:\.\d*)?|\.\d+)$|^[+-]?(?:0|[1-9]\d*)\.\d+[eE][+-]\d+$/

function plainNumber(node: StudyNode, reading: Reading, expected: string): number | undefined {
  if (node.kind !== 'scalar') return unexpected(node, reading, expected)
  if (sharedForm.test(node.text) && Number.isFinite(Number(node.text))) {
    return node.quoted ? unexpected(node, reading, expected, `Write ${node.text} without quotes`) : Number(node.text)
  }
  const meant = node.quoted ? undefined : otherForm(node)
  if (meant === undefined) return unexpected(node, reading, expected)
  reading.report(diagnostic('definition/ambiguous-number', `Unexpected form of number \`${node.text}\` for \`${reading.path}\``, {
    place: node.place, actual: node.text, expected: `${expected}, in digits with a point`, mend: `Write \`${meant}\` if that is meant: programs read \`${node.text}\` differently`,
  }))
  return undefined
}

/** What a number in a form that programs disagree on most likely means: `1,5`, `1e3`, `0x1F`, `010`, `1_000`. */
function otherForm(node: ScalarNode): string | undefined {
  const typed = node.text
  if (/^[+-]?\d+,\d+$/.test(typed)) return typed.replace(',', '.')
  const value = typeof node.value === 'number' ? node.value : /^[+-]?\d[\d_]*(?:\.\d*)?$/.test(typed) ? Number(typed.replaceAll('_', '')) : NaN
  if (!Number.isFinite(value)) return undefined
  return String(value).replace(/^(-?\d+)e/, '$1.0e')
}

/**
 * A number with its unit, such as `0.2 mg/L` or `5 %`. `unit` fixes the unit that must be typed ('' for none); `of: 'measurand'` demands the
 * unit of the results of every measurand of the block, since nothing is converted. With neither any known unit is read.
 */
export function quantity(about: Described & { readonly unit?: string; readonly of?: 'measurand' }): Reader<Quantity> {
  return {
    schema: described({ type: ['string', 'number'] }, about),
    read(node, reading) {
      const expected = about.unit === '' ? 'a number without unit' : `a number with its unit${about.unit === undefined ? '' : ` ${about.unit}`}, such as ${String(about.example ?? '0.2 mg/L')}`
      if (node.kind !== 'scalar') return unexpected(node, reading, expected)
      const parsed = parseQuantity(node.text)
      switch (parsed.kind) {
        case 'unknown unit': return unknownUnit(parsed, node.place, reading)
        case 'decimal comma':
          reading.report(diagnostic('definition/ambiguous-number', `Unexpected decimal comma in \`${node.text}\` for \`${reading.path}\``, { place: node.place, actual: node.text, expected, mend: `Write \`${parsed.meant}\`` }))
          return undefined
        case 'not a quantity': return unexpected(node, reading, expected)
        case 'quantity':
          if (about.unit !== undefined && parsed.quantity.unit !== about.unit) return unexpected(node, reading, expected)
          return about.of === undefined || isOfMeasurands(node, parsed.quantity, reading) ? parsed.quantity : undefined
      }
    },
  }
}

function isOfMeasurands(node: ScalarNode, { unit, text: number }: Quantity, reading: Reading): boolean {
  const other = reading.measurands?.find((each) => each.unit !== unit && !(each.unit === '1' && unit === ''))
  if (other === undefined) return true
  const [found, needed] = [unit === '' ? 'no unit' : `the unit \`${unit}\``, other.unit === '' ? 'no unit' : `\`${other.unit}\``]
  const isCommon = reading.measurands?.every((each) => each.unit === other.unit) ?? true
  reading.report(diagnostic('definition/unit-mismatch', `Unexpected unit of \`${node.text}\` for \`${reading.path}\`: it has ${found}, and the results of \`${other.id}\` have ${needed}`, {
    place: node.place, actual: found, expected: `a number with the unit of the results, ${needed}`,
    mend: !isCommon ? 'Give measurands of other units a block of their own, with `measurands:`' : unit === '' ? `Write \`${number} ${other.unit}\`` : `Convert it to ${other.unit}: nothing is converted here`,
  }))
  return false
}
