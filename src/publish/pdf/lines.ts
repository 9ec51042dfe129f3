// Words → lines no wider than asked, and the boxes of a line. Pieces of one look join into one run of text.
import type { Box } from './frames.ts'
import type { AnyInline, InlineContext, Piece } from './inline.ts'
import type { StructureNode } from './structure.ts'
import type { TextStyle } from './style.ts'
import { simpleText, type Word, wordsOf } from './words.ts'

export interface PlacedPiece extends Piece {
  readonly x: number
  readonly width: number
}

export interface Line {
  readonly pieces: readonly PlacedPiece[]
  readonly width: number
}

/** Sets inline nodes in lines no wider than `width`. At least one line, which may be empty. */
export function setLines(inlines: readonly AnyInline[], style: TextStyle, tag: StructureNode | undefined, width: number, context: InlineContext): readonly Line[] {
  const simple = simpleText(inlines)
  if (simple !== undefined && context.shaping.isWhole(simple, style.face)) {
    const simpleWidth = context.shaping.width(simple, style.face, style.size)
    if (simpleWidth <= width) return [{ pieces: [{ text: simple, style, rise: 0, tag, x: 0, width: simpleWidth }], width: simpleWidth }]
  }
  return broken(wordsOf(inlines, style, tag, context), width, context)
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
