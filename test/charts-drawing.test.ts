// The recording canvas against the geometry of a canvas, and the axes and offsets that charts rest on.
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { axisDomain, positionOn, spansDecades } from '../src/present/charts/axis-domain.ts'
import { namesBelow, spread } from '../src/present/charts/categories.ts'
import { drawingToSvg } from '../src/publish/svg.ts'
import type { PathOperation } from '../src/publish/drawing.ts'
import { RecordingContext } from '../src/publish/recording-context.ts'

const measure = (text: string, _: string, size: number): number => text.length * size * 0.5

function recorded(draw: (context: RecordingContext) => void): RecordingContext {
  const context = new RecordingContext(measure)
  context.fillStyle = '#123456'
  context.strokeStyle = '#123456'
  draw(context)
  return context
}

describe('recording canvas', () => {
  test('a point is transformed when it is added, not when the path is painted', () => {
    const { operations } = recorded((context) => {
      context.save()
      context.translate(10, 20)
      context.rotate(Math.PI / 2)
      context.moveTo(5, 0)
      context.restore()
      context.lineTo(1, 1)
      context.stroke()
    })
    const [path] = operations as readonly PathOperation[]
    expect(path?.segments[0]?.[0]).toBe('M')
    expect(path?.segments[0]?.[1]).toBeCloseTo(10, 12)
    expect(path?.segments[0]?.[2]).toBeCloseTo(25, 12)
    expect(path?.segments[1]).toEqual(['L', 1, 1])
  })

  // A cubic through a quarter turn with handles of 4/3 tan(90°/4) stays within 2.8 parts in ten thousand of the radius (standard result; from memory).
  test('an arc stays on its circle', () => {
    const [path] = recorded((context) => {
      context.arc(3, -4, 10, 0, 2 * Math.PI)
      context.fill()
    }).operations as readonly PathOperation[]
    let [x, y] = [0, 0]
    for (const segment of path?.segments ?? []) {
      if (segment[0] === 'C') {
        for (let t = 0; t <= 1; t += 0.05) {
          const at = (a: number, b: number, c: number, d: number): number => (1 - t) ** 3 * a + 3 * (1 - t) ** 2 * t * b + 3 * (1 - t) * t ** 2 * c + t ** 3 * d
          expect(Math.abs(Math.hypot(at(x, segment[1], segment[3], segment[5]) - 3, at(y, segment[2], segment[4], segment[6]) + 4) / 10 - 1)).toBeLessThan(2.8e-4)
        }
        ;[x, y] = [segment[5], segment[6]]
      } else if (segment[0] !== 'Z') [x, y] = [segment[1], segment[2]]
    }
    expect(path?.segments.filter((segment) => segment[0] === 'C')).toHaveLength(4)
  })

  test('text is anchored by its measured width and carries its turn', () => {
    const { operations } = recorded((context) => {
      context.font = 'bold 8px Source Sans 3'
      context.textAlign = 'right'
      context.translate(100, 50)
      context.rotate(-Math.PI / 2)
      context.fillText('abcd', 0, 0)
    })
    expect(operations[0]).toMatchObject({ kind: 'text', face: 'sans-bold', size: 8, width: 16 })
    const [text] = operations
    expect(text?.kind === 'text' ? [text.x, text.y, text.rotation].map((each) => Number(each.toFixed(9))) : []).toEqual([100, 66, -90])
  })

  test('clips hold what is drawn until they are restored', () => {
    const { operations } = recorded((context) => {
      context.save()
      context.rect(0, 0, 5, 5)
      context.clip()
      context.fillRect(0, 0, 9, 9)
      context.restore()
      context.fillRect(1, 1, 2, 2)
    })
    expect(operations.map((operation) => operation.kind)).toEqual(['clip', 'path'])
    expect(operations[0]?.kind === 'clip' ? operations[0].operations.length : 0).toBe(1)
  })

  test('refuses what a Drawing cannot say', () => {
    expect(() => recorded((context) => context.moveTo(Number.NaN, 1))).toThrow(/without a place/)
    expect(() => recorded((context) => { context.fillStyle = 'red'; context.fillRect(0, 0, 1, 1) })).toThrow(/#1a2b3c/)
    expect(() => recorded((context) => context.restore())).toThrow(/never saved/)
  })
})

test('a title with markup in it stays a title', () => {
  const svg = drawingToSvg({ width: 10, height: 5, operations: [] }, { title: 'A < B & "C"', description: 'x > y' })
  expect(svg).toContain('A &lt; B &amp; &quot;C&quot;')
  expect(svg).toContain('x &gt; y')
})

describe('axes', () => {
  test('hold every value, with linear and with logarithmic ends', () => {
    const values = fc.array(fc.double({ min: -1e9, max: 1e9, noNaN: true }), { minLength: 1, maxLength: 20 })
    fc.assert(fc.property(values, fc.constantFrom<'ticks' | 'open'>('ticks', 'open'), (given, ends) => {
      const domain = axisDomain(given, { ticks: 5, ends })
      expect(domain.low).toBeLessThan(domain.high)
      for (const value of given) expect(positionOn(domain, value)).toSatisfy((position: number) => position >= -1e-9 && position <= 1 + 1e-9)
    }), { seed: 1 })
    fc.assert(fc.property(fc.array(fc.double({ min: 1e-9, max: 1e9, noNaN: true }), { minLength: 1, maxLength: 20 }), (given) => {
      const domain = axisDomain(given, { ticks: 5, logarithmic: true })
      for (const value of given) expect(positionOn(domain, value)).toSatisfy((position: number) => position > 0 && position < 1)
    }), { seed: 1 })
  })

  test('are logarithmic beyond two decades and above zero only', () => {
    expect(spansDecades([0.1, 10])).toBe(false)
    expect(spansDecades([0.1, 10.1])).toBe(true)
    expect(spansDecades([0, 1000])).toBe(false)
    expect(spansDecades([-1, 1000])).toBe(false)
    expect(spansDecades([])).toBe(false)
  })

  test('end on round numbers', () => {
    expect(axisDomain([0.3, 9.7], { ticks: 5 })).toEqual({ low: 0, high: 10, logarithmic: false })
    expect(axisDomain([98.2, 101.4], { ticks: 5 })).toEqual({ low: 98, high: 101.5, logarithmic: false })
    expect(axisDomain([0, 0], { ticks: 5 })).toMatchObject({ low: 0 })
  })
})

test('equal values stand side by side, not on one another', () => {
  const offsets = spread([10, 10, 10, 10, 40], 20)
  expect(new Set(offsets.slice(0, 4)).size).toBe(4)
  expect(offsets[4]).toBe(0)
  expect(Math.max(...offsets.map(Math.abs))).toBeLessThanOrEqual(20)
})

test('names wrap where they fit and turn where they do not', () => {
  expect(namesBelow(['day 1', 'day 2'], 200).axis).toMatchObject({ labelAngle: 0 })
  expect(namesBelow(Array.from({ length: 12 }, (_, index) => `borehole number ${index}`), 200).axis).toMatchObject({ labelAngle: -45 })
  expect(namesBelow(Array.from({ length: 40 }, (_, index) => `${index}`), 200).axis).toMatchObject({ labelAngle: -90 })
})
