// Plain words set pair by pair: the width of each letter and the kerning to the next, each pair asked of the font once. Same result as
// laying out the whole word, in a fraction of the time; where a pair is more than two letters side by side (a ligature), the whole word
// has to be laid out.
import type { FaceName, FontFaces } from '../fonts.ts'

export interface PairSetting {
  /** Shifts after each letter but the last, in thousandths of the size; undefined where pairs do not tell the whole. */
  shifts(text: string): readonly number[] | undefined
  /** In units of the size. */
  width(text: string): number | undefined
}

/** Letters, figures and marks that stand alone: no script but Latin, no combining marks. */
const simple = /^[\x21-\x7e\u2212]+$/

/** A face whose letters the program measures often. */
export function pairSetting(fonts: FontFaces, face: FaceName): PairSetting {
  const advances = new Map<string, number | undefined>()
  const shiftsOfPairs = new Map<string, number | undefined>()

  function advance(letter: string): number | undefined {
    if (advances.has(letter)) return advances.get(letter)
    const font = fonts.font(face)
    const point = letter.codePointAt(0) ?? 0
    const found = font.hasGlyphForCodePoint(point) ? font.glyphForCodePoint(point).advanceWidth / font.unitsPerEm : undefined
    advances.set(letter, found)
    return found
  }

  function shift(pair: string): number | undefined {
    if (shiftsOfPairs.has(pair)) return shiftsOfPairs.get(pair)
    const font = fonts.font(face)
    const { glyphs, positions } = font.layout(pair)
    const isPlain = glyphs.length === 2
      && glyphs.every((glyph, index) => glyph.id === font.glyphForCodePoint(pair.codePointAt(index) ?? 0).id)
      && positions.every((position) => position.xOffset === 0 && position.yOffset === 0)
      && positions[1]?.xAdvance === glyphs[1]?.advanceWidth
    const found = isPlain ? (((positions[0]?.xAdvance ?? 0) - (glyphs[0]?.advanceWidth ?? 0)) * 1000) / font.unitsPerEm : undefined
    shiftsOfPairs.set(pair, found)
    return found
  }

  return {
    shifts(text) {
      if (!simple.test(text)) return undefined
      const found: number[] = []
      for (let index = 0; index < text.length; index += 1) {
        if (advance(text.charAt(index)) === undefined) return undefined
        if (index === text.length - 1) return found
        const each = shift(text.slice(index, index + 2))
        if (each === undefined) return undefined
        found.push(each)
      }
      return found
    },
    width(text) {
      if (!simple.test(text)) return undefined
      let width = 0
      for (let index = 0; index < text.length; index += 1) {
        const letter = advance(text.charAt(index))
        const next = index === text.length - 1 ? 0 : shift(text.slice(index, index + 2))
        if (letter === undefined || next === undefined) return undefined
        width += letter + next / 1000
      }
      return width
    },
  }
}
