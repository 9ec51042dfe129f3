// Inline nodes → words → lines of placed pieces. A number never breaks, nor does it leave the unit that follows it; sub- and
// superscripts are set smaller and shifted, with the text's own glyphs.
import type { PhrasingContent } from 'mdast'
import type { Inline } from '../../present/document.ts'
import type { Box, LinkBox } from './frames.ts'
import type { Shaping } from './shaping.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, emboldened, resized, script, styles, type TextStyle, tinted, verdictMarks } from './style.ts'

export interface InlineContext {
  readonly shaping: Shaping
  /** Page of a target as printed; a placeholder before the pages are known. */
  pageOf(target: string): string
}

interface Piece {
  readonly text: string
  readonly style: TextStyle
  readonly rise: number
  readonly tag: StructureNode | undefined
  readonly link?: Pick<LinkBox, 'target' | 'words'>
  readonly isStruck?: true
}

interface Fragment extends Piece {
  /** Numbers hold on to the next word. */
  readonly isNumber?: true
}

interface Word {
  readonly pieces: readonly Piece[]
  readonly width: number
  /** Width of the space after it; 0 where it may break without one. */
  readonly space: number
  readonly endsLine?: true
}

export interface PlacedPiece extends Piece {
  readonly x: number
  readonly width: number
}

export interface Line {
  readonly pieces: readonly PlacedPiece[]
  readonly width: number
}

type AnyInline = Inline | PhrasingContent

/** Ends a line by the writer's wish (Unicode LINE SEPARATOR); a line feed in running text is only white, as in Markdown. */
const lineEnd = '\u2028'

/** A unit after a number: short, or a quotient, product or power of units; and the short words that are none. */
const unit = /^(?:[%‰°]\p{L}?|\p{L}{1,3}|\S*[\p{L}%][·/⁻²³]\S*)[.,;:)]*$/u
const noUnit = /^(?:a|an|and|are|as|at|but|by|for|has|in|is|it|its|no|not|of|on|or|per|so|the|to|was)$/

/** A number in running text. */
const numeral = /^[<>≤≥±(]*[\u2212-]?\d[\d.,]*$/

/** Sets inline nodes in lines no wider than `width`. At least one line, which may be empty. */
export function setLines(inlines: readonly AnyInline[], style: TextStyle, tag: StructureNode | undefined, width: number, context: InlineContext): readonly Line[] {
  const simple = simpleText(inlines)
  if (simple !== undefined && context.shaping.isWhole(simple, style.face)) {
    const simpleWidth = context.shaping.width(simple, style.face, style.size)
    if (simpleWidth <= width) return [{ pieces: [{ text: simple, style, rise: 0, tag, x: 0, width: simpleWidth }], width: simpleWidth }]
  }
  return broken(wordsOf(inlines, style, tag, context), width, context)
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
function simpleText(inlines: readonly AnyInline[]): string | undefined {
  const only = inlines[0]
  if (inlines.length !== 1 || only === undefined) return undefined
  if (only.type === 'number') return only.text.replaceAll(' ', '\u00a0')
  return only.type === 'text' && !/[\n\t\u2028]| {2}|^ | $/.test(only.value) && only.value !== '' ? only.value : undefined
}

/** What stands there, without style; references and page numbers included. */
export function plainText(inlines: readonly AnyInline[], context: Pick<InlineContext, 'pageOf'>): string {
  return inlines.map((inline) => {
    switch (inline.type) {
      case 'number': return inline.text
      case 'verdict': return `${verdictMarks[inline.word].mark} ${inline.word}`
      case 'reference': return inline.text ?? inline.target
      case 'pageReference': return context.pageOf(inline.target)
      default: return 'children' in inline ? plainText(inline.children, context) : 'value' in inline ? inline.value : ''
    }
  }).join('')
}

/** Boxes of a line that begins at `x` on `baseline`. */
export function lineBoxes(line: Line, x: number, baseline: number): readonly Box[] {
  const boxes: Box[] = []
  for (const piece of line.pieces) {
    if (piece.text === '') continue
    boxes.push({
      kind: 'text', x: x + piece.x, y: baseline - piece.rise, text: piece.text, face: piece.style.face, size: piece.style.size, width: piece.width, colour: piece.style.colour, tag: piece.tag,
      ...(piece.isStruck === true ? { isStruck: true } : {}),
    })
    if (piece.link !== undefined && piece.tag !== undefined) {
      boxes.push({ kind: 'link', x: x + piece.x, y: baseline - piece.style.size * 0.95, width: piece.width, height: piece.style.size * 1.25, tag: piece.tag, ...piece.link })
    }
  }
  return boxes
}

function fragmentsOf(inlines: readonly AnyInline[], base: Fragment, context: InlineContext): readonly Fragment[] {
  return inlines.flatMap((inline): readonly Fragment[] => {
    switch (inline.type) {
      case 'text': return [{ ...base, text: inline.value }]
      case 'number': return [{ ...base, text: inline.text.replaceAll(' ', '\u00a0'), isNumber: true }]
      case 'emphasis': return fragmentsOf(inline.children, { ...base, style: { ...base.style, face: base.style.face === base.style.bold ? base.style.bold : base.style.italic } }, context)
      case 'strong': return fragmentsOf(inline.children, { ...base, style: emboldened(base.style) }, context)
      case 'delete': return fragmentsOf(inline.children, { ...base, isStruck: true }, context)
      case 'inlineCode': return [{ ...base, text: inline.value, style: { ...base.style, face: 'mono', size: base.style.size * 0.9 } }]
      case 'superscript': return fragmentsOf(inline.children, scripted(base, script.raise), context)
      case 'subscript': return fragmentsOf(inline.children, scripted(base, script.lower), context)
      case 'verdict': {
        const { mark, colour } = verdictMarks[inline.word]
        return [{ ...base, text: `${mark}\u00a0${inline.word}`, style: tinted({ ...base.style, face: styles.table.bold }, colour) }]
      }
      case 'reference': case 'pageReference': {
        const text = inline.type === 'reference' ? (inline.text ?? inline.target) : context.pageOf(inline.target)
        const words = inline.type === 'reference' ? text : `page ${text}`
        return [linked({ ...base, text: text.replaceAll(' ', '\u00a0') }, { target: { kind: 'inside', id: inline.target }, words })]
      }
      case 'link': {
        const link = { target: { kind: 'address' as const, url: inline.url }, words: plainText(inline.children, context) }
        return fragmentsOf(inline.children, linked(base, link), context)
      }
      case 'break': return [{ ...base, text: lineEnd }]
      case 'image': return [{ ...base, text: inline.alt ?? inline.url }]
      default: return 'children' in inline ? fragmentsOf(inline.children, base, context) : 'value' in inline ? [{ ...base, text: inline.value }] : []
    }
  })
}

function scripted(base: Fragment, shift: number): Fragment {
  return { ...base, rise: base.rise + shift * base.style.size, style: resized(base.style, base.style.size * script.size) }
}

function linked(base: Fragment, link: NonNullable<Piece['link']>): Fragment {
  return { ...base, link, style: tinted(base.style, colours.accent), tag: base.tag === undefined ? undefined : node('Link', base.tag) }
}

/** Where a word may break although it holds no space: after these, unless a digit follows (a date, a number range, a formula). */
const softBreak = /[^/\-–@_.:]*[/\-–@_.:]+(?=[^/\-–@_.:\d])|[^/\-–@_.:]*[/@_]+(?=\d)|.+$/gsu

/** Only words longer than this break at such places. */
const softBreakLength = 14

function wordsOf(inlines: readonly AnyInline[], style: TextStyle, tag: StructureNode | undefined, context: InlineContext): readonly Word[] {
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

function broken(words: readonly Word[], width: number, context: InlineContext): readonly Line[] {
  const lines: Line[] = []
  let current: { pieces: readonly Piece[]; space: number }[] = []
  let filled = 0
  const finish = (isLast: boolean): void => {
    lines.push(placed(current, isLast, context))
    current = []
    filled = 0
  }
  for (const word of words) {
    const pending = current.at(-1)?.space ?? 0
    if (current.length > 0 && filled + pending + word.width > width + 0.01) {
      finish(false)
    }
    if (word.width > width + 0.01) {
      const parts = cutToFit(word, width, context)
      parts.slice(0, -1).forEach((part) => {
        current.push({ pieces: part, space: 0 })
        finish(false)
      })
      const rest = parts.at(-1) ?? []
      current.push({ pieces: rest, space: word.space })
      filled = piecesWidth(rest, context)
    } else {
      filled += (current.at(-1)?.space ?? 0) + word.width
      current.push({ pieces: word.pieces, space: word.space })
    }
    if (word.endsLine === true) finish(true)
  }
  if (current.length > 0 || lines.length === 0) finish(true)
  return lines
}

function piecesWidth(pieces: readonly Piece[], context: InlineContext): number {
  return pieces.reduce((sum, piece) => sum + context.shaping.width(piece.text, piece.style.face, piece.style.size), 0)
}

/** A word wider than the line, letter by letter. */
function cutToFit(word: Word, width: number, context: InlineContext): readonly (readonly Piece[])[] {
  const parts: Piece[][] = [[]]
  let filled = 0
  for (const piece of word.pieces) {
    let held = ''
    for (const [letter] of piece.text.matchAll(/[\s\S]\p{M}*/gu)) {
      const letterWidth = context.shaping.width(letter, piece.style.face, piece.style.size)
      if (filled + letterWidth > width && (held !== '' || (parts.at(-1)?.length ?? 0) > 0)) {
        if (held !== '') parts.at(-1)?.push({ ...piece, text: held })
        parts.push([])
        held = ''
        filled = 0
      }
      held += letter
      filled += letterWidth
    }
    if (held !== '') parts.at(-1)?.push({ ...piece, text: held })
  }
  return parts
}

/** Pieces of one look join into one run; a line that goes on keeps its space, so that copied text does too. */
function placed(words: readonly { readonly pieces: readonly Piece[]; readonly space: number }[], isLast: boolean, context: InlineContext): Line {
  const joined: { piece: Piece; text: string }[] = []
  const append = (piece: Piece, text: string): void => {
    const last = joined.at(-1)
    if (last !== undefined && last.piece.style.face === piece.style.face && last.piece.style.size === piece.style.size && last.piece.rise === piece.rise &&
      last.piece.style.colour === piece.style.colour && last.piece.tag === piece.tag && last.piece.isStruck === piece.isStruck) last.text += text
    else joined.push({ piece, text })
  }
  let owed = false
  words.forEach((word, index) => {
    word.pieces.forEach((piece, at) => {
      append(piece, owed && at === 0 ? ` ${piece.text}` : piece.text)
    })
    if (word.pieces.length > 0) owed = false
    const last = word.pieces.at(-1) ?? joined.at(-1)?.piece
    if (last === undefined || word.space === 0) return
    // The space after a link belongs to what follows: it is nothing to click.
    if (last.link !== undefined && index < words.length - 1) owed = true
    else if (index < words.length - 1 || !isLast) append(last, ' ')
  })
  let x = 0
  const pieces = joined.map(({ piece, text }, index): PlacedPiece => {
    const width = context.shaping.width(text, piece.style.face, piece.style.size)
    const seen = index === joined.length - 1 ? context.shaping.width(text.trimEnd(), piece.style.face, piece.style.size) : width
    const made = { ...piece, text, x, width: seen }
    x += width
    return made
  })
  return { pieces, width: pieces.reduce((widest, piece) => Math.max(widest, piece.x + piece.width), 0) }
}
