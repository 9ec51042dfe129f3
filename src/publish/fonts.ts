// Font bytes → faces that measure text and split it into runs by the glyphs each face has. A character that no face of the chain
// has throws: the PDF writer would otherwise draw an empty box without a word.
import * as fontkit from 'fontkit'
import type { Font } from 'fontkit'

export const faceNames = ['serif', 'serif-italic', 'serif-bold', 'sans', 'sans-bold', 'sans-italic', 'mono', 'fallback', 'fallback-bold'] as const
export type FaceName = (typeof faceNames)[number]

/** A piece of text that one face can draw. */
export interface TextRun {
  readonly face: FaceName
  readonly text: string
}

/** Heights above (below, negative) the baseline in units of the font size. */
export interface FaceMetrics {
  readonly ascent: number
  readonly descent: number
  readonly capHeight: number
  readonly xHeight: number
}

/** Width of a text in the unit of `size`, over all the runs that it needs. */
export type MeasureText = (text: string, face: FaceName, size: number) => number

export interface FontFaces {
  /** The parsed font, for embedding and for glyph outlines. */
  font(face: FaceName): Font
  /** The bytes that the face was given. */
  bytes(face: FaceName): Uint8Array
  metrics(face: FaceName): FaceMetrics
  /** Splits a text into the fewest runs; throws MissingGlyph. */
  runs(text: string, face: FaceName): readonly TextRun[]
  /** Characters that no face of the chain has, each once; for a check before anything is drawn. */
  missing(text: string, face: FaceName): readonly string[]
  readonly measure: MeasureText
}

export class MissingGlyph extends Error {
  readonly character: string
  constructor(character: string, face: FaceName, text: string) {
    const codes = [...character].map((each) => `U+${each.codePointAt(0)?.toString(16).toUpperCase().padStart(4, '0') ?? ''}`).join(' ')
    super(`no font has a glyph for \`${character}\` (${codes}), in \`${text}\` set in ${face}`)
    this.name = 'MissingGlyph'
    this.character = character
  }
}

/** Where a face looks for what it lacks, in order. */
const chains: Readonly<Record<FaceName, readonly FaceName[]>> = {
  'serif': ['serif', 'sans', 'fallback'],
  'serif-italic': ['serif-italic', 'sans-italic', 'fallback'],
  'serif-bold': ['serif-bold', 'sans-bold', 'fallback-bold', 'fallback'],
  'sans': ['sans', 'fallback'],
  'sans-bold': ['sans-bold', 'fallback-bold', 'fallback'],
  'sans-italic': ['sans-italic', 'sans', 'fallback'],
  'mono': ['mono', 'fallback'],
  'fallback': ['fallback'],
  'fallback-bold': ['fallback-bold', 'fallback'],
}

/** The serif faces have no anchors for marks on Greek letters, so such a mark would stand beside its letter. */
const facesWithoutAnchors: ReadonlySet<FaceName> = new Set(['serif', 'serif-italic', 'serif-bold'])

/** A base character with all marks, joiners and variation selectors that follow it. */
const cluster = /[\s\S](?:\p{M}|\u200D|[\uFE00-\uFE0F])*/gu

/** Enough for a long report; the cache is dropped when full, so that memory stays bounded. */
const cacheLimit = 60_000

export function loadFonts(bytes: Readonly<Record<FaceName, Uint8Array>>): FontFaces {
  const parsed = new Map<FaceName, Font>()
  const coverage = new Map<FaceName, Map<string, FaceName | undefined>>()
  const advances = new Map<FaceName, Map<string, number>>()

  function font(face: FaceName): Font {
    const known = parsed.get(face)
    if (known !== undefined) return known
    const given = bytes[face]
    const created = fontkit.create(Buffer.from(given.buffer, given.byteOffset, given.byteLength))
    if (!('layout' in created)) throw new Error(`the bytes of ${face} are a collection of fonts, expected one font`)
    parsed.set(face, created)
    return created
  }

  function faceOf(text: string, face: FaceName): FaceName | undefined {
    const known = cached(coverage, face)
    if (known.has(text)) return known.get(text)
    const points = [...text].map((each) => each.codePointAt(0) ?? 0)
    const marked = points.length > 1 && text.normalize('NFC').length > 1
    const found = chains[face].find((candidate) => !(marked && facesWithoutAnchors.has(candidate)) && points.every((point) => font(candidate).hasGlyphForCodePoint(point)))
    known.set(text, found)
    return found
  }

  function runs(text: string, face: FaceName): readonly TextRun[] {
    const found: { face: FaceName; text: string }[] = []
    for (const [piece] of text.matchAll(cluster)) {
      const last = found.at(-1)
      const chosen = faceOf(piece, face)
      if (chosen === undefined) throw new MissingGlyph(piece, face, text)
      if (last?.face === chosen) last.text += piece
      else found.push({ face: chosen, text: piece })
    }
    return found
  }

  /** In units of the font size. Words are laid out apart, with the space after them, as the PDF writer does. */
  function advance(text: string, face: FaceName): number {
    const known = cached(advances, face)
    const before = known.get(text)
    if (before !== undefined) return before
    let sum = 0
    for (const run of runs(text, face)) {
      const { unitsPerEm } = font(run.face)
      for (const [word] of run.text.matchAll(/[^ \t]*[ \t]|[^ \t]+/g)) sum += font(run.face).layout(word).advanceWidth / unitsPerEm
    }
    known.set(text, sum)
    return sum
  }

  return {
    font, runs,
    bytes: (face) => bytes[face],
    metrics(face) {
      const { ascent, descent, capHeight, xHeight, unitsPerEm } = font(face)
      return { ascent: ascent / unitsPerEm, descent: descent / unitsPerEm, capHeight: capHeight / unitsPerEm, xHeight: xHeight / unitsPerEm }
    },
    missing: (text, face) => [...new Set([...text.matchAll(cluster)].map(([piece]) => piece).filter((piece) => faceOf(piece, face) === undefined))],
    measure: (text, face, size) => (text === '' ? 0 : advance(text, face) * size),
  }
}

function cached<T>(caches: Map<FaceName, Map<string, T>>, face: FaceName): Map<string, T> {
  const known = caches.get(face)
  if (known !== undefined && known.size < cacheLimit) return known
  const fresh = new Map<string, T>()
  caches.set(face, fresh)
  return fresh
}
