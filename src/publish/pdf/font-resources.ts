// Faces → fonts of the PDF, each embedded at its first use, and texts → arrays of glyphs with their shifts. Words are encoded once.
import type { FaceName, FontFaces } from '../fonts.ts'
import { type PairSetting, pairSetting } from './pair-setting.ts'
import type { PdfDocument, PdfFont, PdfReference } from './pdfkit-augmented.d.ts'
import { wordsAndSpaces } from './shaping.ts'

export interface ShownText {
  /** Name of the font resource. */
  readonly name: string
  /** Glyph arrays; one with a rise stands above or below the baseline, in thousandths of the size. */
  readonly pieces: readonly { readonly array: string; readonly rise: number }[]
}

export interface FontResources {
  shown(text: string, face: FaceName): ShownText
  /** Fonts used since the last call, by resource name: the resources of one page. */
  taken(): ReadonlyMap<string, PdfReference>
}

interface EncodedPiece {
  readonly array: string
  readonly rise: number
}

export function fontResources(pdf: PdfDocument, faces: FontFaces): FontResources {
  const opened = new Map<FaceName, OpenedFont>()
  let used = new Map<string, PdfReference>()

  function openedFont(face: FaceName): OpenedFont {
    const known = opened.get(face)
    if (known !== undefined) return known
    pdf.font(faces.font(face))
    const made = { font: pdf._font, pairs: pairSetting(faces, face), glyphs: new Map<string, string>(), words: new Map<string, readonly EncodedPiece[]>() }
    opened.set(face, made)
    return made
  }

  return {
    shown(text, face) {
      const chosen = openedFont(face)
      used.set(chosen.font.id, chosen.font.ref())
      const pieces: { array: string; rise: number }[] = []
      for (const word of wordsAndSpaces(text)) {
        for (const piece of encodedWord(word, chosen)) {
          const last = pieces.at(-1)
          if (last !== undefined && last.rise === piece.rise) last.array += ` ${piece.array}`
          else pieces.push({ ...piece })
        }
      }
      return { name: chosen.font.id, pieces: pieces.map(({ array, rise }) => ({ array: array.replaceAll('> <', ''), rise })) }
    },
    taken() {
      const taken = used
      used = new Map()
      return taken
    },
  }
}

interface OpenedFont {
  readonly font: PdfFont
  readonly pairs: PairSetting
  /** Glyph numbers of single letters. */
  readonly glyphs: Map<string, string>
  readonly words: Map<string, readonly EncodedPiece[]>
}

function encodedWord(word: string, opened: OpenedFont): readonly EncodedPiece[] {
  const known = opened.words.get(word)
  if (known !== undefined) return known
  const shifts = opened.pairs.shifts(word)
  const made = shifts === undefined ? encode(word, opened.font) : [{ array: pairArray(word, shifts, opened), rise: 0 }]
  opened.words.set(word, made)
  return made
}

function pairArray(word: string, shifts: readonly number[], { font, glyphs }: OpenedFont): string {
  let array = '<'
  for (let index = 0; index < word.length; index += 1) {
    const letter = word.charAt(index)
    let glyph = glyphs.get(letter)
    if (glyph === undefined) {
      glyph = font.encode(letter)[0].join('')
      glyphs.set(letter, glyph)
    }
    array += glyph
    const shift = Math.round(shifts[index] ?? 0)
    // A positive number in the array moves to the left.
    if (shift !== 0) array += `> ${-shift} <`
  }
  return `${array}>`
}

function encode(word: string, font: PdfFont): readonly EncodedPiece[] {
  const [glyphs, positions] = font.encode(word)
  const pieces: { array: string; rise: number }[] = []
  let shift = 0
  glyphs.forEach((glyph, index) => {
    const position = positions[index]
    if (position === undefined) throw new Error('a glyph without a position')
    const rise = Math.round(position.yOffset)
    if (pieces.at(-1)?.rise !== rise || pieces.length === 0) pieces.push({ array: '', rise })
    const piece = pieces.at(-1)
    if (piece === undefined) return
    shift -= position.xOffset
    const lead = Math.round(shift) === 0 ? '' : `${Math.round(shift)} `
    piece.array += `${piece.array === '' ? '' : ' '}${lead}<${glyph}>`
    shift = position.xOffset - (position.xAdvance - position.advanceWidth)
  })
  const piece = pieces.at(-1)
  if (piece !== undefined && Math.round(shift) !== 0) piece.array += ` ${Math.round(shift)}`
  return pieces.map(({ array, rise }) => ({ array: array.replaceAll('> <', ''), rise }))
}
