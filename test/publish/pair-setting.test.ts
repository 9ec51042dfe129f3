// Words set pair by pair, held to the font library's own layout of the whole word.
import { expect, test } from 'vitest'
import { faceNames, loadFonts } from '../../src/publish/fonts.ts'
import { pairSetting } from '../../src/publish/pdf/pair-setting.ts'
import { fontBytes } from './assets.ts'
import { sequence } from './sample-document.ts'

const fonts = loadFonts(fontBytes)
const words = [
  ...'The slope of the calibration AVATAR To. Ta, We’ll 1/x^2 10.1363 −0.0437187 2026-03-02 raw/kalibrierung-1.csv: 20-A-02 off fi fl ffi soft fjord 11:71 (mg/L) "quoted" f) r. y, P. 7. 4.'.split(' '),
  ...randomWords(400),
]

test.each(faceNames)('%s: widths and shifts are those of the whole word', (face) => {
  const pairs = pairSetting(fonts, face)
  const font = fonts.font(face)
  const scale = 1000 / font.unitsPerEm
  let plain = 0
  for (const word of words) {
    const width = pairs.width(word)
    if (width === undefined) continue
    plain += 1
    const { positions, glyphs, advanceWidth } = font.layout(word)
    expect(width * font.unitsPerEm, word).toBeCloseTo(advanceWidth, 6)
    expect(pairs.shifts(word)?.map((shift) => shift.toFixed(6)), word).toEqual(positions.slice(0, -1).map((position, index) => ((position.xAdvance - (glyphs[index]?.advanceWidth ?? 0)) * scale).toFixed(6)))
  }
  expect(plain).toBeGreaterThan(350)
})

test('ligatures and other scripts are left to the font', () => {
  const pairs = pairSetting(fonts, 'serif')
  for (const word of ['off', 'µg', 'ŷ', 'x\u0302', '✓', '']) expect(pairs.width(word)).toBeUndefined()
})

function randomWords(count: number): readonly string[] {
  const next = sequence(7)
  return Array.from({ length: count }, () => Array.from({ length: 2 + Math.floor(next() * 7) }, () => String.fromCharCode(33 + Math.floor(next() * 94))).join(''))
}
