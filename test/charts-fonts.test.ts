// Fonts: which face draws which character, and widths against those of the PDF library, which reads the same files on its own.
import PDFDocument from 'pdfkit'
import { describe, expect, test } from 'vitest'
import { MissingGlyph, type FaceName } from '../src/publish/fonts.ts'
import { fontBytes } from './publish/assets.ts'
import { shippedFonts } from './support/chart-kinds.ts'

const fonts = shippedFonts()

describe('runs', () => {
  test.each<[string, FaceName, readonly string[]]>([
    // Coverage of the faces as published with them: the serif lacks the raised minus, which the sans has.
    ['µg·mL⁻¹', 'serif', ['serif:µg·mL', 'sans:⁻', 'serif:¹']],
    ['µg·mL⁻¹', 'sans', ['sans:µg·mL⁻¹']],
    ['a ∝ b', 'sans', ['sans:a ', 'fallback:∝', 'sans: b']],
    ['plain text', 'mono', ['mono:plain text']],
    // A mark stays with its letter; where the serif has no anchor for it, the letter goes with the mark.
    ['σ̂ of y', 'serif', ['sans:σ̂', 'serif: of y']],
    ['ŷ', 'serif', ['serif:ŷ']],
    ['∈', 'sans-bold', ['fallback-bold:∈']],
  ])('%s in %s', (text, face, expected) => {
    expect(fonts.runs(text, face).map((run) => `${run.face}:${run.text}`)).toEqual(expected)
  })

  test('keep every character in order', () => {
    const text = 'x̄ = 5 µg·L⁻¹ ≤ 10 ∝ σ̂² → ✓ ✗ ŷ'
    for (const face of ['serif', 'sans', 'mono', 'serif-bold'] as const) expect(fonts.runs(text, face).map((run) => run.text).join('')).toBe(text)
  })
})

test('a character without a glyph is named', () => {
  expect(() => fonts.runs('5 mg/L \u{1F9EA}', 'sans')).toThrow(MissingGlyph)
  expect(() => fonts.runs('5 mg/L \u{1F9EA}', 'sans')).toThrow(/U\+1F9EA/)
  expect(fonts.missing('a\u{1F9EA}b\nc\u{1F9EA}', 'serif')).toEqual(['\u{1F9EA}', '\n'])
  expect(fonts.missing('5 mg/L', 'serif')).toEqual([])
})

test.each<[string, FaceName, number]>([['Peak area (µS·min)', 'sans', 8], ['Value 0.0123 AV To', 'serif', 10], ['−12.50', 'sans-bold', 7.5], ['record.json', 'mono', 8]])('%s in %s is as wide as the PDF library finds', (text, face, size) => {
  const document = new PDFDocument({ font: Buffer.from(fontBytes[face]) as unknown as string })
  expect(fonts.measure(text, face, size)).toBeCloseTo(document.fontSize(size).widthOfString(text), 6)
})

test('digits of the sans are equally wide, so that columns of numbers align', () => {
  expect(new Set([...'0123456789'].map((digit) => fonts.measure(digit, 'sans', 1000))).size).toBe(1)
})
