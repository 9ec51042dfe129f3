// Boxes and drawings → content-stream operators of one page, upwards from its foot. Colour, width and marked content are said only when
// they change; numbers keep three decimals.
import type { ClipOperation, Drawing, Operation, Paint, PathOperation, Segment, Stroke, TextOperation } from '../drawing.ts'
import type { FaceName } from '../fonts.ts'
import type { DrawingBox, PanelBox, RuleBox, TextBox } from './frames.ts'
import type { FontResources } from './font-resources.ts'
import { latin1 } from './pdf-writer.ts'

export interface ContentResources {
  readonly fonts: FontResources
  /** Name of the graphics state with these opacities; undefined when both are full. */
  opacity(fill: number, stroke: number): string | undefined
}

export class Content {
  readonly #lines: string[] = []
  readonly #height: number
  readonly #resources: ContentResources
  #fill = ''
  #stroke = ''
  #font = ''

  constructor(height: number, resources: ContentResources) {
    this.#height = height
    this.#resources = resources
  }

  write(operators: string): void {
    this.#lines.push(operators)
  }

  text(box: TextBox): void {
    this.#setFill(box.colour)
    this.#lines.push(`BT ${this.#show(box.text, box.face, box.size, `${number(box.x)} ${number(this.#height - box.y)} Td`)} ET`)
    if (box.isStruck === true) this.#line(box.x, box.y - box.size * 0.24, box.x + box.width, box.y - box.size * 0.24, 0.5, box.colour)
  }

  rule(box: RuleBox): void {
    if (box.dash !== undefined) this.#lines.push(`[${box.dash.map(number).join(' ')}] 0 d`)
    this.#line(box.x, box.y, box.toX, box.toY, box.width, box.colour)
    if (box.dash !== undefined) this.#lines.push('[] 0 d')
  }

  panel(box: PanelBox): void {
    this.#setFill(box.fill)
    this.#lines.push(`${number(box.x)} ${number(this.#height - box.y - box.height)} ${number(box.width)} ${number(box.height)} re f`)
  }

  /** The drawing's own coordinates, y downwards, under one matrix; colours inside do not reach outside. */
  drawing({ drawing, x, y, scale }: Pick<DrawingBox, 'x' | 'y' | 'scale'> & { readonly drawing: Drawing }): void {
    this.#lines.push(`q ${number(scale)} 0 0 ${number(-scale)} ${number(x)} ${number(this.#height - y)} cm`)
    for (const operation of drawing.operations) this.#operation(operation)
    this.#lines.push('Q')
    this.#fill = this.#stroke = this.#font = ''
  }

  bytes(): Uint8Array {
    return latin1(this.#lines.join('\n'))
  }

  #operation(operation: Operation): void {
    switch (operation.kind) {
      case 'path': return this.#path(operation)
      case 'text': return this.#chartText(operation)
      case 'clip': return this.#clip(operation)
    }
  }

  #path({ segments, fill, stroke }: PathOperation): void {
    if (segments.length === 0 || (fill === undefined && stroke === undefined)) return
    const opacity = this.#resources.opacity(fill?.opacity ?? 1, stroke?.opacity ?? 1)
    if (opacity !== undefined) this.#lines.push(`q /${opacity} gs`)
    if (fill !== undefined) this.#setFill(fill.colour)
    if (stroke !== undefined) this.#setStroke(stroke)
    this.#lines.push(`${segments.map(segmentText).join(' ')} ${fill === undefined ? 'S' : stroke === undefined ? 'f' : 'B'}`)
    if (opacity !== undefined) this.#leave()
  }

  #chartText(text: TextOperation): void {
    const opacity = this.#opaque(text.paint)
    this.#setFill(text.paint.colour)
    const angle = (text.rotation * Math.PI) / 180
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)]
    this.#lines.push(`BT ${this.#show(text.text, text.face, text.size, `${number(cosine)} ${number(sine)} ${number(sine)} ${number(-cosine)} ${number(text.x)} ${number(text.y)} Tm`)} ET`)
    if (opacity) this.#leave()
  }

  #clip(operation: ClipOperation): void {
    this.#lines.push(`q ${operation.segments.map(segmentText).join(' ')} W n`)
    this.#fill = this.#stroke = this.#font = ''
    for (const each of operation.operations) this.#operation(each)
    this.#leave()
  }

  #opaque(paint: Paint): boolean {
    const state = this.#resources.opacity(paint.opacity, paint.opacity)
    if (state === undefined) return false
    this.#lines.push(`q /${state} gs`)
    return true
  }

  #leave(): void {
    this.#lines.push('Q')
    this.#fill = this.#stroke = this.#font = ''
  }

  #line(x: number, y: number, toX: number, toY: number, width: number, colour: string): void {
    this.#setStroke({ colour, opacity: 1, width, cap: 'butt', join: 'miter', dash: [] }, false)
    this.#lines.push(`${number(x)} ${number(this.#height - y)} m ${number(toX)} ${number(this.#height - toY)} l S`)
  }

  #setFill(colour: string): void {
    if (this.#fill === colour) return
    this.#fill = colour
    this.#lines.push(`${components(colour)} rg`)
  }

  #setStroke(stroke: Stroke, withDash = true): void {
    const key = `${stroke.colour} ${stroke.width} ${stroke.cap} ${stroke.join} ${withDash ? stroke.dash.join(',') : ''}`
    if (this.#stroke === key) return
    this.#stroke = key
    const dash = withDash ? ` [${stroke.dash.map(number).join(' ')}] 0 d` : ''
    this.#lines.push(`${components(stroke.colour)} RG ${number(stroke.width)} w ${caps[stroke.cap]} J ${joins[stroke.join]} j${dash}`)
  }

  #show(text: string, face: FaceName, size: number, position: string): string {
    const { name, pieces } = this.#resources.fonts.shown(text, face)
    const font = `/${name} ${number(size)} Tf`
    const shown = pieces.map(({ rise, array }) => {
      const show = isOneString.test(array) ? `${array} Tj` : `[${array}] TJ`
      return rise === 0 ? show : `${number((rise * size) / 1000)} Ts ${show} 0 Ts`
    }).join(' ')
    if (font === this.#font) return `${position} ${shown}`
    this.#font = font
    return `${font} ${position} ${shown}`
  }
}

const isOneString = /^<[0-9a-f]*>$/

const caps = { butt: 0, round: 1, square: 2 } as const
const joins = { miter: 0, round: 1, bevel: 2 } as const

function segmentText(segment: Segment): string {
  switch (segment[0]) {
    case 'M': return `${number(segment[1])} ${number(segment[2])} m`
    case 'L': return `${number(segment[1])} ${number(segment[2])} l`
    case 'C': return `${number(segment[1])} ${number(segment[2])} ${number(segment[3])} ${number(segment[4])} ${number(segment[5])} ${number(segment[6])} c`
    case 'Z': return 'h'
  }
}

const componentsOf = new Map<string, string>()

function components(colour: string): string {
  const known = componentsOf.get(colour)
  if (known !== undefined) return known
  if (!/^#[0-9a-f]{6}$/i.test(colour)) throw new Error(`a colour is ${colour}, expected #rrggbb`)
  const text = [1, 3, 5].map((at) => number(parseInt(colour.slice(at, at + 2), 16) / 255)).join(' ')
  componentsOf.set(colour, text)
  return text
}

export function number(value: number): string {
  if (!Number.isFinite(value)) throw new Error('a coordinate of the page is not finite')
  return String(Math.round(value * 1000) / 1000 + 0)
}
