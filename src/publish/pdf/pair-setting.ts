// Plain words set pair by pair: the width of each letter and the kerning to the next, learnt from the first word that holds the pair.
// Same result as laying out every word, in a fraction of the time; a word with a ligature is always left to the font.
import type { FaceName, FontFaces } from '../fonts.ts'

export interface PairSetting {
  /** Shifts after each letter but the last, in thousandths of the size; undefined where pairs do not tell the whole. */
  shifts(word: string): readonly number[] | undefined
  /** In units of the size. */
  width(word: string): number | undefined
}

/** Letters, figures and marks that stand alone: no script but Latin, no combining marks. */
const simple = /^[\x21-\x7e\u2212]+$/

const settings = new WeakMap<FontFaces, Map<FaceName, PairSetting>>()

/** One for each face of the fonts given, so that drawing knows what measuring has learnt. */
export function pairSetting(fonts: FontFaces, face: FaceName): PairSetting {
  const known = settings.get(fonts) ?? new Map<FaceName, PairSetting>()
  settings.set(fonts, known)
  const before = known.get(face)
  if (before !== undefined) return before
  const made = createSetting(fonts.font(face))
  known.set(face, made)
  return made
}

function createSetting(font: ReturnType<FontFaces['font']>): PairSetting {
  const advances = new Map<string, number>()
  const shiftsOfPairs = new Map<string, number>()

  /** Lays the word out and keeps its pairs, if every letter is a glyph of its own and stands on the line. */
  function learn(word: string): boolean {
    const { glyphs, positions } = font.layout(word)
    const isPlain = glyphs.length === word.length && glyphs.every((glyph, index) => {
      const position = positions[index]
      return glyph.id !== 0 && glyph.id === font.glyphForCodePoint(word.charCodeAt(index)).id && position?.xOffset === 0 && position.yOffset === 0
    })
    if (!isPlain || positions.at(-1)?.xAdvance !== glyphs.at(-1)?.advanceWidth) return false
    glyphs.forEach((glyph, index) => {
      advances.set(word.charAt(index), glyph.advanceWidth / font.unitsPerEm)
      if (index < word.length - 1) shiftsOfPairs.set(word.slice(index, index + 2), (((positions[index]?.xAdvance ?? 0) - glyph.advanceWidth) * 1000) / font.unitsPerEm)
    })
    return true
  }

  function known(word: string): readonly number[] | undefined {
    const found: number[] = []
    for (let index = 0; index < word.length - 1; index += 1) {
      const shift = shiftsOfPairs.get(word.slice(index, index + 2))
      if (shift === undefined) return undefined
      found.push(shift)
    }
    return word.length > 1 || advances.has(word) ? found : undefined
  }

  function shifts(word: string): readonly number[] | undefined {
    if (!simple.test(word)) return undefined
    return known(word) ?? (learn(word) ? known(word) : undefined)
  }

  return {
    shifts,
    width(word) {
      const between = shifts(word)
      if (between === undefined) return undefined
      let width = between.reduce((sum, shift) => sum + shift / 1000, 0)
      for (const letter of word) width += advances.get(letter) ?? 0
      return width
    },
  }
}
