// Faces → fonts of the PDF, each embedded at its first use, and texts → arrays of glyphs with their shifts. Words are encoded once.
import type { FaceName, FontFaces } from '../fonts.ts'
import { figureCharacters, isFigure, plainFigures } from './shaping.ts'
import type { PdfDocument, PdfFont, PdfReference } from './pdfkit-augmented.d.ts'

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
  const fonts = new Map<FaceName, PdfFont>()
  const words = new Map<string, readonly EncodedPiece[]>()
  const figures = new Map<FaceName, ReadonlyMap<string, string> | undefined>()
  let used = new Map<string, PdfReference>()

  function fontOf(face: FaceName): PdfFont {
    const known = fonts.get(face)
    if (known !== undefined) return known
    pdf.font(faces.font(face))
    fonts.set(face, pdf._font)
    return pdf._font
  }

  function figureGlyphs(face: FaceName): ReadonlyMap<string, string> | undefined {
    if (figures.has(face)) return figures.get(face)
    const glyphs = plainFigures(faces, face) === undefined ? undefined : new Map([...figureCharacters].map((character) => [character, fontOf(face).encode(character)[0].join('')]))
    figures.set(face, glyphs)
    return glyphs
  }

  function encodedWord(word: string, face: FaceName): readonly EncodedPiece[] {
    const glyphs = isFigure.test(word) ? figureGlyphs(face) : undefined
    if (glyphs !== undefined) {
      let array = ''
      for (const character of word) array += glyphs.get(character) ?? ''
      return [{ array: `<${array}>`, rise: 0 }]
    }
    const key = `${face} ${word}`
    const known = words.get(key)
    if (known !== undefined) return known
    const made = encode(word, fontOf(face))
    words.set(key, made)
    return made
  }

  return {
    shown(text, face) {
      const font = fontOf(face)
      used.set(font.id, font.ref())
      const pieces: { array: string; rise: number }[] = []
      // Words and spaces apart, as they are measured.
      for (const [word] of text.matchAll(/[^ ]+| +/g)) {
        for (const piece of encodedWord(word, face)) {
          const last = pieces.at(-1)
          if (last !== undefined && last.rise === piece.rise) last.array += ` ${piece.array}`
          else pieces.push({ ...piece })
        }
      }
      return { name: font.id, pieces: pieces.map(({ array, rise }) => ({ array: array.replaceAll('> <', ''), rise })) }
    },
    taken() {
      const taken = used
      used = new Map()
      return taken
    },
  }
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
    // A positive number in the array moves to the left.
    shift -= position.xOffset
    const lead = Math.round(shift) === 0 ? '' : `${Math.round(shift)} `
    piece.array += `${piece.array === '' ? '' : ' '}${lead}<${glyph}>`
    shift = position.xOffset - (position.xAdvance - position.advanceWidth)
  })
  const piece = pieces.at(-1)
  if (piece !== undefined && Math.round(shift) !== 0) piece.array += ` ${Math.round(shift)}`
  return pieces.map(({ array, rise }) => ({ array: array.replaceAll('> <', ''), rise }))
}
