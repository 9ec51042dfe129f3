// Text → runs with their widths, word by word and each word once. Plain figures are summed from their glyphs where the face is seen to
// set them apart from each other (no kerning, no ligature): tables are full of numbers that occur only once.
import type { FaceName, FontFaces, TextRun } from '../fonts.ts'

export interface ShapedRun extends TextRun {
  /** In units of the font size. */
  readonly width: number
}

export interface Shaping {
  readonly fonts: FontFaces
  /** Runs of a text without spaces inside, or of spaces only. */
  word(text: string, face: FaceName): readonly ShapedRun[]
  /** Whether the face itself has every glyph of the text. */
  isWhole(text: string, face: FaceName): boolean
  /** Width of any text, its words and the spaces after them. */
  width(text: string, face: FaceName, size: number): number
}

/** Characters of figures in tables. */
export const figureCharacters = '0123456789.\u2212'
export const isFigure = /^[0-9.\u2212]+$/

export function shaping(fonts: FontFaces): Shaping {
  const words = new Map<FaceName, Map<string, readonly ShapedRun[]>>()
  const figures = new Map<FaceName, ReadonlyMap<string, number> | undefined>()

  function figureWidths(face: FaceName): ReadonlyMap<string, number> | undefined {
    if (figures.has(face)) return figures.get(face)
    const found = plainFigures(fonts, face)
    figures.set(face, found)
    return found
  }

  function word(text: string, face: FaceName): readonly ShapedRun[] {
    let known = words.get(face)
    if (known === undefined) words.set(face, (known = new Map()))
    const before = known.get(text)
    if (before !== undefined) return before
    if (isFigure.test(text)) {
      const widths = figureWidths(face)
      if (widths !== undefined) {
        let width = 0
        for (const character of text) width += widths.get(character) ?? 0
        return [{ face, text, width }]
      }
    }
    const made = fonts.runs(text, face).map((run): ShapedRun => ({ ...run, width: fonts.measure(run.text, run.face, 1) }))
    known.set(text, made)
    return made
  }

  return {
    fonts, word,
    isWhole(text, face) {
      return isFigure.test(text) ? figureWidths(face) !== undefined || word(text, face).every((run) => run.face === face) : [...text.matchAll(/[^ ]+| +/g)].every(([part]) => word(part, face).every((run) => run.face === face))
    },
    width(text, face, size) {
      if (!text.includes(' ')) return sum(word(text, face)) * size
      let width = 0
      for (const [part] of text.matchAll(/[^ ]+| +/g)) width += sum(word(part, face))
      return width * size
    },
  }
}

function sum(runs: readonly ShapedRun[]): number {
  let width = 0
  for (const run of runs) width += run.width
  return width
}

/** Widths of the figures, if every pair of them stands at its own widths; else undefined. */
export function plainFigures(fonts: FontFaces, face: FaceName): ReadonlyMap<string, number> | undefined {
  const characters = [...figureCharacters]
  if (fonts.missing(figureCharacters, face).length > 0 || fonts.runs(figureCharacters, face).some((run) => run.face !== face)) return undefined
  const widths = new Map(characters.map((character) => [character, fonts.measure(character, face, 1)]))
  // Every ordered pair follows somewhere in this text.
  const pairs = characters.map((first) => characters.map((second) => first + second).join('')).join('')
  const together = fonts.measure(pairs, face, 1)
  const apart = [...pairs].reduce((total, character) => total + (widths.get(character) ?? 0), 0)
  return Math.abs(together - apart) < 1e-9 ? widths : undefined
}
