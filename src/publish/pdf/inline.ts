// Inline nodes → fragments of one look each: face, size, shift, colour, link. Sub- and superscripts are set smaller and shifted, with the
// text's own glyphs.
import type { PhrasingContent } from 'mdast'
import type { Inline } from '../../present/document.ts'
import { plainInline } from '../plain-inline.ts'
import { verdictMarks } from '../verdict-marks.ts'
import type { LinkBox } from './frames.ts'
import type { Shaping } from './shaping.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, emboldened, resized, script, styles, type TextStyle, tinted, verdictColours } from './style.ts'

export interface InlineContext {
  readonly shaping: Shaping
  /** Page of a target as printed; a placeholder before the pages are known. */
  pageOf(target: string): string
}

export interface Piece {
  readonly text: string
  readonly style: TextStyle
  readonly rise: number
  readonly tag: StructureNode | undefined
  readonly link?: Pick<LinkBox, 'target' | 'words'>
  readonly isStruck?: true
}

export interface Fragment extends Piece {
  /** Numbers hold on to the next word. */
  readonly isNumber?: true
}

export type AnyInline = Inline | PhrasingContent

/** Ends a line by the writer's wish (Unicode LINE SEPARATOR); a line feed in running text is only white, as in Markdown. */
export const lineEnd = '\u2028'

export function fragmentsOf(inlines: readonly AnyInline[], base: Fragment, context: InlineContext): readonly Fragment[] {
  return inlines.flatMap((inline): readonly Fragment[] => {
    switch (inline.type) {
      case 'text': return [{ ...base, text: inline.value }]
      case 'number': return [{ ...base, text: inline.text.replaceAll(' ', '\u00a0'), isNumber: true }]
      case 'emphasis': return fragmentsOf(inline.children, { ...base, style: { ...base.style, face: base.style.face === base.style.bold ? base.style.bold : base.style.italic } }, context)
      case 'strong': return fragmentsOf(inline.children, { ...base, style: emboldened(base.style) }, context)
      case 'delete': return fragmentsOf(inline.children, { ...base, isStruck: true }, context)
      case 'inlineCode': return [{ ...base, text: inline.value, style: { ...base.style, face: 'mono', size: base.style.size * 0.9 } }]
      case 'superscript': return fragmentsOf(inline.children, scripted(base, script.raise), context)
      case 'subscript': return fragmentsOf(inline.children, scripted(base, script.lower), context)
      case 'verdict':
        return [{ ...base, text: `${verdictMarks[inline.word]}\u00a0${inline.word}`, style: tinted({ ...base.style, face: styles.table.bold }, verdictColours[inline.word]) }]
      case 'reference': case 'pageReference': {
        const text = inline.type === 'reference' ? (inline.text ?? inline.target) : context.pageOf(inline.target)
        const words = inline.type === 'reference' ? text : `page ${text}`
        return [linked({ ...base, text: text.replaceAll(' ', '\u00a0') }, { target: { kind: 'inside', id: inline.target }, words })]
      }
      case 'link': {
        const link = { target: { kind: 'address' as const, url: inline.url }, words: plainInline(inline.children, context.pageOf) }
        return fragmentsOf(inline.children, linked(base, link), context)
      }
      case 'break': return [{ ...base, text: lineEnd }]
      case 'image': return [{ ...base, text: inline.alt ?? inline.url }]
      default: return 'children' in inline ? fragmentsOf(inline.children, base, context) : 'value' in inline ? [{ ...base, text: inline.value }] : []
    }
  })
}

function scripted(base: Fragment, shift: number): Fragment {
  return { ...base, rise: base.rise + shift * base.style.size, style: resized(base.style, base.style.size * script.size) }
}

function linked(base: Fragment, link: NonNullable<Piece['link']>): Fragment {
  return { ...base, link, style: tinted(base.style, colours.accent), tag: base.tag === undefined ? undefined : node('Link', base.tag) }
}
