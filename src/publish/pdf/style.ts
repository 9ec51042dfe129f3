// The look of a page: sizes, spacing, colours, in points. Running text stands on a 14-point rhythm in a measure shorter than the
// tables, which take the whole width of the text area.
import type { FaceName } from '../fonts.ts'

const millimetre = 72 / 25.4

export const page = {
  width: 595.28,
  height: 841.89,
  left: 22.5 * millimetre,
  /** Width of the text area: 165 mm. */
  textWidth: 165 * millimetre,
  /** Width of running text: about 90 characters a line. */
  measure: 150 * millimetre,
  top: 25 * millimetre,
  bottom: 841.89 - 23 * millimetre,
  headerBaseline: 14 * millimetre,
  footerBaseline: 841.89 - 12 * millimetre,
} as const

export const colours = {
  ink: '#1b2430',
  secondary: '#566170',
  faint: '#7a8492',
  accent: '#1d4f63',
  hairline: '#d5dbe1',
  rule: '#8b96a3',
  panel: '#f3f6f8',
  meets: '#1f6a45',
  misses: '#a4262c',
  undecided: '#8a5500',
} as const

export interface TextStyle {
  readonly face: FaceName
  readonly italic: FaceName
  readonly bold: FaceName
  readonly size: number
  readonly leading: number
  readonly colour: string
}

const serif = { face: 'serif', italic: 'serif-italic', bold: 'serif-bold' } as const
const sans = { face: 'sans', italic: 'sans-italic', bold: 'sans-bold' } as const
const sansBold = { face: 'sans-bold', italic: 'sans-bold', bold: 'sans-bold' } as const

export const styles = {
  body: { ...serif, size: 10, leading: 14, colour: colours.ink },
  formula: { ...serif, size: 11, leading: 16, colour: colours.ink },
  heading1: { ...sansBold, size: 16, leading: 21, colour: colours.accent },
  heading2: { ...sansBold, size: 12, leading: 16, colour: colours.ink },
  heading3: { ...sansBold, size: 10, leading: 14, colour: colours.ink },
  caption: { ...sans, size: 8.5, leading: 11.5, colour: colours.ink },
  table: { ...sans, size: 8.5, leading: 11.5, colour: colours.ink },
  tableHead: { ...sansBold, size: 8.5, leading: 11, colour: colours.ink },
  note: { ...sans, size: 7.5, leading: 10, colour: colours.secondary },
  label: { ...sansBold, size: 7, leading: 10, colour: colours.accent },
  code: { face: 'mono', italic: 'mono', bold: 'mono', size: 8, leading: 11, colour: colours.ink },
  running: { ...sans, size: 7.5, leading: 10, colour: colours.secondary },
  contents1: { ...sansBold, size: 9.5, leading: 14, colour: colours.ink },
  contents2: { ...sans, size: 9, leading: 12.5, colour: colours.ink },
  coverOrganisation: { ...sansBold, size: 10, leading: 14, colour: colours.secondary },
  coverTitle: { ...sansBold, size: 24, leading: 29, colour: colours.ink },
  coverSubtitle: { ...sans, size: 12, leading: 17, colour: colours.secondary },
  coverFact: { ...sans, size: 9, leading: 13, colour: colours.ink },
  coverLabel: { ...sans, size: 9, leading: 13, colour: colours.secondary },
  coverVerdict: { ...sansBold, size: 15, leading: 20, colour: colours.ink },
  coverSentence: { ...serif, size: 9.5, leading: 13, colour: colours.ink },
} as const satisfies Readonly<Record<string, TextStyle>>

/** Raised and lowered text: size and shift in units of the size of the text around it. */
export const script = { size: 0.68, raise: 0.33, lower: -0.13 } as const

/** Sizes that a table too wide for the page tries in turn, before it is split by columns. */
export const tableSizes = [8.5, 8, 7.5, 7] as const

export const verdictColours = {
  'meets': colours.meets,
  'misses': colours.misses,
  'not evaluable': colours.undecided,
  'not performed': colours.secondary,
  'information only': colours.secondary,
} as const

/** The same style at another size, its leading in proportion. */
export function resized(style: TextStyle, size: number): TextStyle {
  return { ...style, size, leading: Math.round((style.leading / style.size) * size * 4) / 4 }
}

export function emboldened(style: TextStyle): TextStyle {
  return { ...style, face: style.bold }
}

export function tinted(style: TextStyle, colour: string): TextStyle {
  return { ...style, colour }
}
