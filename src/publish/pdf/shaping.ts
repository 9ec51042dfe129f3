// Text → runs with their widths, word by word. Words of plain letters are summed from their pairs; all others are laid out once.
import type { FaceName, FontFaces, TextRun } from '../fonts.ts'
import { type PairSetting, pairSetting } from './pair-setting.ts'

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

interface FaceCache {
  readonly words: Map<string, readonly ShapedRun[]>
  readonly pairs: PairSetting
}

export function shaping(fonts: FontFaces): Shaping {
  const faces = new Map<FaceName, FaceCache>()

  function cacheOf(face: FaceName): FaceCache {
    const known = faces.get(face)
    if (known !== undefined) return known
    const made = { words: new Map<string, readonly ShapedRun[]>(), pairs: pairSetting(fonts, face) }
    faces.set(face, made)
    return made
  }

  function word(text: string, face: FaceName): readonly ShapedRun[] {
    const { words, pairs } = cacheOf(face)
    const known = words.get(text)
    if (known !== undefined) return known
    const plain = pairs.width(text)
    const made = plain === undefined ? fonts.runs(text, face).map((run): ShapedRun => ({ ...run, width: fonts.measure(run.text, run.face, 1) })) : [{ face, text, width: plain }]
    words.set(text, made)
    return made
  }

  return {
    fonts, word,
    isWhole: (text, face) => wordsAndSpaces(text).every((part) => word(part, face).every((run) => run.face === face)),
    width(text, face, size) {
      let width = 0
      for (const part of wordsAndSpaces(text)) for (const run of word(part, face)) width += run.width
      return width * size
    },
  }
}

/** Words and spaces are measured and drawn apart, so that both agree. */
export function wordsAndSpaces(text: string): readonly string[] {
  return text.includes(' ') ? (text.match(/[^ ]+| +/g) ?? []) : text === '' ? [] : [text]
}
