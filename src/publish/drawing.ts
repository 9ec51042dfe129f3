// A chart as plain vector data, the common ground of SVG and PDF: x grows to the right, y downwards, one unit is one point of the page.
// Every coordinate is final (no transformation is left to apply), and a text starts at its left end on the baseline.
import type { FaceName } from './fonts.ts'

export type Segment =
  | readonly ['M', number, number]
  | readonly ['L', number, number]
  | readonly ['C', number, number, number, number, number, number]
  | readonly ['Z']

export interface Paint {
  /** `#rrggbb` */
  readonly colour: string
  /** 0 to 1 */
  readonly opacity: number
}

export interface Stroke extends Paint {
  readonly width: number
  readonly cap: 'butt' | 'round' | 'square'
  readonly join: 'miter' | 'round' | 'bevel'
  /** Lengths of dash and gap in turn; empty for a solid line. */
  readonly dash: readonly number[]
}

export interface PathOperation {
  readonly kind: 'path'
  readonly segments: readonly Segment[]
  /** Filled first, by the nonzero rule; then stroked. */
  readonly fill?: Paint
  readonly stroke?: Stroke
}

export interface TextOperation {
  readonly kind: 'text'
  readonly text: string
  readonly face: FaceName
  readonly size: number
  readonly paint: Paint
  /** Left end of the baseline. */
  readonly x: number
  readonly y: number
  /** Degrees clockwise about (x, y); -90 reads upwards. */
  readonly rotation: number
  /** Measured width at this size. */
  readonly width: number
}

/** Operations seen only inside the clip path. */
export interface ClipOperation {
  readonly kind: 'clip'
  readonly segments: readonly Segment[]
  readonly operations: readonly Operation[]
}

export type Operation = PathOperation | TextOperation | ClipOperation

export interface Drawing {
  readonly width: number
  readonly height: number
  /** In painting order. */
  readonly operations: readonly Operation[]
}
