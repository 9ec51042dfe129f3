// Fragments → words, the parts between which a line may break. A number never breaks, nor does it leave the unit that follows it; a long
// name may break after its slashes and hyphens.
import { type AnyInline, type Fragment, fragmentsOf, type InlineContext, lineEnd, type Piece } from './inline.ts'
import type { StructureNode } from './structure.ts'
import type { TextStyle } from './style.ts'

export interface Word {
  readonly pieces: readonly Piece[]
  readonly width: number
  /** Width of the space after it; 0 where it may break without one. */
  readonly space: number
  readonly endsLine?: true
}

/** A unit after a number: short, or a quotient, product or power of units; and the short words that are none. */
const unit = /^(?:[%‰°]\p{L}?|\p{L}{1,3}|\S*[\p{L}%][·/⁻²³]\S*)[.,;:)]*$/u
const noUnit = /^(?:a|an|and|are|as|at|but|by|for|has|in|is|it|its|no|not|of|on|or|per|so|the|to|was)$/

/** A number in running text. */
const numeral = /^[<>≤≥±(]*[\u2212-]?\d[\d.,]*$/

/** Where a word may break although it holds no space: after these, unless a digit follows (a date, a number range, a formula). */
const softBreak = /.*?(?:[/\-–@_.:]+(?=[^/\-–@_.:\d])|[/@_]+(?=\d))|.+$/gsu

/** Only words longer than this break at such places. */
const softBreakLength = 14

export function wordsOf(inlines: readonly AnyInline[], style: TextStyle, tag: StructureNode | undefined, context: InlineContext): readonly Word[] {
  const fragments = fragmentsOf(inlines, { text: '', style, rise: 0, tag }, context)
  const words: Word[] = []
  let pieces: Piece[] = []
  let width = 0
  let holds = false
  const add = (fragment: Fragment, text: string): void => {
    for (const run of context.shaping.word(text, fragment.style.face)) {
      pieces.push({ ...fragment, text: run.text, style: run.face === fragment.style.face ? fragment.style : { ...fragment.style, face: run.face } })
      width += run.width * fragment.style.size
    }
  }
  const close = (space: number, endsLine?: true): void => {
    if (pieces.length === 0 && endsLine === undefined) return
    words.push({ pieces, width, space, ...(endsLine === undefined ? {} : { endsLine }) })
    pieces = []
    width = 0
  }
  for (const fragment of fragments) {
    const { text } = fragment
    for (const match of text.matchAll(/\u2028|[ \t\n]+|[^ \t\n\u2028]+/g)) {
      const [token] = match
      if (token === lineEnd) close(0, true)
      else if (/^[ \t\n]/.test(token)) {
        if (holds && startsWithUnit(text.slice(match.index))) add(fragment, '\u00a0')
        else if (pieces.length > 0) close(context.shaping.width(' ', fragment.style.face, fragment.style.size))
        else if (words.length > 0) words.push({ pieces: [], width: 0, space: context.shaping.width(' ', fragment.style.face, fragment.style.size) })
      } else if (fragment.isNumber === true || token.length <= softBreakLength) add(fragment, token)
      else {
        const parts = [...token.matchAll(softBreak)].map(([part]) => part)
        parts.forEach((part, index) => {
          add(fragment, part)
          if (index < parts.length - 1) close(0)
        })
      }
      holds = fragment.isNumber === true || numeral.test(token)
    }
  }
  close(0)
  return words
}

/** ` mg/L of …` yes, ` of …` no. */
function startsWithUnit(text: string): boolean {
  const word = /^ ([^ \n\u2028]+)/.exec(text)?.[1]
  return word !== undefined && unit.test(word) && !noUnit.test(word)
}

export interface Extent {
  /** In one line. */
  readonly natural: number
  /** The widest part that cannot be broken. */
  readonly least: number
}

export function extentOf(inlines: readonly AnyInline[], style: TextStyle, context: InlineContext): Extent {
  const simple = simpleText(inlines)
  if (simple !== undefined && simple.length <= softBreakLength && !simple.includes(' ')) {
    const width = context.shaping.width(simple, style.face, style.size)
    return { natural: width, least: width }
  }
  let natural = 0
  let least = 0
  let lineWidth = 0
  for (const word of wordsOf(inlines, style, undefined, context)) {
    lineWidth += word.width
    natural = Math.max(natural, lineWidth)
    least = Math.max(least, word.width)
    lineWidth = word.endsLine === true ? 0 : lineWidth + word.space
  }
  return { natural, least }
}

/** The text of most cells: one number, or one text in one line without white at its ends. */
export function simpleText(inlines: readonly AnyInline[]): string | undefined {
  const only = inlines[0]
  if (inlines.length !== 1 || only === undefined) return undefined
  if (only.type === 'number') return only.text.replaceAll(' ', '\u00a0')
  return only.type === 'text' && !/[\n\t\u2028]| {2}|^ | $/.test(only.value) && only.value !== '' ? only.value : undefined
}
