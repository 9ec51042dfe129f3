// A canvas context that records instead of painting: what Vega's canvas renderer draws becomes operations of a Drawing. As on a
// canvas, a point is transformed when it is added to the path, not when the path is painted.
import type { ClipOperation, Operation, Paint, Segment, Stroke } from './drawing.ts'
import type { FaceName, MeasureText } from './fonts.ts'

type Matrix = readonly [number, number, number, number, number, number]

interface State {
  readonly matrix: Matrix
  readonly depth: number
}

/** Longest arc drawn by one Bézier curve: a quarter turn, within 0.03 % of the radius. */
const quarter = Math.PI / 2

export class RecordingContext {
  readonly operations: Operation[] = []
  pixelRatio = 1
  fillStyle: unknown = '#000000'
  strokeStyle: unknown = '#000000'
  globalAlpha = 1
  globalCompositeOperation = 'source-over'
  lineWidth = 1
  lineCap: Stroke['cap'] = 'butt'
  lineJoin: Stroke['join'] = 'miter'
  miterLimit = 4
  lineDashOffset = 0
  font = ''
  textAlign: 'left' | 'center' | 'right' = 'left'

  readonly #measure: MeasureText
  #dash: readonly number[] = []
  #matrix: Matrix = [1, 0, 0, 1, 0, 0]
  #segments: Segment[] = []
  #open: Operation[][]
  readonly #states: State[] = []

  constructor(measure: MeasureText) {
    this.#measure = measure
    this.#open = [this.operations]
  }

  save(): void {
    this.#states.push({ matrix: this.#matrix, depth: this.#open.length })
  }

  restore(): void {
    const state = this.#states.pop()
    if (state === undefined) throw new Error('the chart restores a state that it never saved')
    this.#matrix = state.matrix
    this.#open.length = state.depth
  }

  translate(x: number, y: number): void {
    this.#transform([1, 0, 0, 1, x, y])
  }

  scale(x: number, y: number): void {
    this.#transform([x, 0, 0, y, 0, 0])
  }

  rotate(angle: number): void {
    this.#transform([Math.cos(angle), Math.sin(angle), -Math.sin(angle), Math.cos(angle), 0, 0])
  }

  beginPath(): void {
    this.#segments = []
  }

  closePath(): void {
    this.#segments.push(['Z'])
  }

  moveTo(x: number, y: number): void {
    this.#segments.push(['M', ...this.#point(x, y)])
  }

  lineTo(x: number, y: number): void {
    this.#segments.push([this.#segments.length === 0 ? 'M' : 'L', ...this.#point(x, y)])
  }

  bezierCurveTo(x1: number, y1: number, x2: number, y2: number, x: number, y: number): void {
    this.#segments.push(['C', ...this.#point(x1, y1), ...this.#point(x2, y2), ...this.#point(x, y)])
  }

  rect(x: number, y: number, width: number, height: number): void {
    this.moveTo(x, y)
    this.lineTo(x + width, y)
    this.lineTo(x + width, y + height)
    this.lineTo(x, y + height)
    this.closePath()
  }

  arc(x: number, y: number, radius: number, from: number, to: number, anticlockwise = false): void {
    const sweep = anticlockwise ? -Math.min(from - to + (from < to ? 2 * Math.PI : 0), 2 * Math.PI) : Math.min(to - from + (to < from ? 2 * Math.PI : 0), 2 * Math.PI)
    const pieces = Math.max(1, Math.ceil(Math.abs(sweep) / quarter - 1e-9))
    const step = sweep / pieces
    const handle = (4 / 3) * Math.tan(step / 4) * radius
    this.lineTo(x + radius * Math.cos(from), y + radius * Math.sin(from))
    for (let piece = 0; piece < pieces; piece += 1) {
      const a = from + piece * step
      const b = a + step
      const [ax, ay, bx, by] = [x + radius * Math.cos(a), y + radius * Math.sin(a), x + radius * Math.cos(b), y + radius * Math.sin(b)]
      this.bezierCurveTo(ax - handle * Math.sin(a), ay + handle * Math.cos(a), bx + handle * Math.sin(b), by - handle * Math.cos(b), bx, by)
    }
  }

  setLineDash(dash: readonly number[]): void {
    this.#dash = dash
  }

  fill(): void {
    const fill = this.#paint(this.fillStyle)
    if (fill !== undefined && this.#segments.length > 0) this.#emit({ kind: 'path', segments: this.#segments, fill })
  }

  stroke(): void {
    const paint = this.#paint(this.strokeStyle)
    if (paint === undefined || this.#segments.length === 0) return
    if (this.lineDashOffset !== 0) throw new Error('the chart shifts a dash, which a Drawing cannot say')
    this.#emit({ kind: 'path', segments: this.#segments, stroke: { ...paint, width: this.lineWidth, cap: this.lineCap, join: this.lineJoin, dash: [...this.#dash] } })
  }

  fillRect(x: number, y: number, width: number, height: number): void {
    this.beginPath()
    this.rect(x, y, width, height)
    this.fill()
  }

  clip(): void {
    const inner: Operation[] = []
    const group: ClipOperation = { kind: 'clip', segments: this.#segments, operations: inner }
    this.#emit(group)
    this.#open.push(inner)
  }

  fillText(text: string, x: number, y: number): void {
    const paint = this.#paint(this.fillStyle)
    if (paint === undefined || text === '') return
    const { face, size } = faceOf(this.font)
    const width = this.#measure(text, face, size)
    const start = this.textAlign === 'center' ? x - width / 2 : this.textAlign === 'right' ? x - width : x
    const [left, baseline] = this.#point(start, y)
    this.#emit({ kind: 'text', text, face, size, paint, x: left, y: baseline, rotation: (Math.atan2(this.#matrix[1], this.#matrix[0]) * 180) / Math.PI, width })
  }

  #emit(operation: Operation): void {
    this.#open.at(-1)?.push(operation)
  }

  #paint(style: unknown): Paint | undefined {
    if (style === 'transparent' || this.globalAlpha === 0) return undefined
    if (typeof style !== 'string' || !/^#[0-9a-f]{6}$/.test(style)) throw new Error(`the chart paints with \`${String(style)}\`, expected a colour such as #1a2b3c`)
    return { colour: style, opacity: this.globalAlpha }
  }

  #point(x: number, y: number): [number, number] {
    const [a, b, c, d, e, f] = this.#matrix
    const point: [number, number] = [a * x + c * y + e, b * x + d * y + f]
    if (!Number.isFinite(point[0]) || !Number.isFinite(point[1])) throw new Error('the chart has a point without a place')
    return point
  }

  #transform([a, b, c, d, e, f]: Matrix): void {
    const [A, B, C, D, E, F] = this.#matrix
    this.#matrix = [A * a + C * b, B * a + D * b, A * c + C * d, B * c + D * d, A * e + C * f + E, B * e + D * f + F]
  }
}

/** A CSS font such as `italic 600 9px Source Sans 3` as one of our faces. */
function faceOf(font: string): { readonly face: FaceName; readonly size: number } {
  const match = /^(.*?)([\d.]+)px (.*)$/.exec(font)
  if (match === null) throw new Error(`the chart asks for the font \`${font}\``)
  const [, before = '', size = '', family = ''] = match
  return { face: faceFor(family, /\b(bold|[6-9]00)\b/.test(before), before.includes('italic')), size: Number(size) }
}

export function faceFor(family: string, bold: boolean, italic: boolean): FaceName {
  if (family.includes('Code')) return 'mono'
  const kind = family.includes('Serif') ? 'serif' : 'sans'
  return bold ? `${kind}-bold` : italic ? `${kind}-italic` : kind
}
