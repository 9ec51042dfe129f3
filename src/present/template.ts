// A report template (Markdown with directives) → its parts in order: ordinary Markdown, headings and directives, each with its place.
// The directive syntax also swallows texts such as `10:30`; those are put back letter by letter.
import type { Nodes, Root, RootContent } from 'mdast'
import remarkDirective from 'remark-directive'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import type { Place } from '../diagnostics/place.ts'

export type TemplatePart =
  | { readonly kind: 'heading'; readonly depth: 1 | 2 | 3; readonly text: string; readonly place: Place }
  /** `hasContent`: written as `:::name` with something inside, which no directive takes. */
  | { readonly kind: 'directive'; readonly name: string; readonly attributes: Readonly<Record<string, string>>; readonly hasContent: boolean; readonly place: Place }
  | { readonly kind: 'paragraph'; readonly pieces: readonly TemplatePiece[]; readonly place: Place }
  | { readonly kind: 'block'; readonly node: RootContent; readonly place: Place }

/** Running text of a template; `value` asks the record for something by its path. */
export type TemplatePiece =
  | { readonly kind: 'text' | 'emphasis' | 'strong' | 'code'; readonly text: string }
  | { readonly kind: 'value'; readonly path: string; readonly place: Place }

/** Parsing is by far the dearest part of a small report, so one processor serves every template. */
const processor = unified().use(remarkParse).use(remarkGfm, { singleTilde: false }).use(remarkDirective)

export function parseTemplate(template: { readonly file: string; readonly text: string }): readonly TemplatePart[] {
  const text = template.text.replace(/^\uFEFF/, '')
  const tree: Root = processor.parse(text)
  return tree.children.map((node): TemplatePart => {
    const place = placeOf(node, template.file)
    switch (node.type) {
      case 'heading': return { kind: 'heading', depth: node.depth > 3 ? 3 : (node.depth as 1 | 2 | 3), text: plainText(node, text), place }
      case 'paragraph': return { kind: 'paragraph', pieces: node.children.flatMap((child) => pieces(child, template.file, text)), place }
      case 'leafDirective': case 'containerDirective':
        return { kind: 'directive', name: node.name, attributes: Object.fromEntries(Object.entries(node.attributes ?? {}).map(([key, value]) => [key, value ?? ''])), hasContent: node.type === 'containerDirective', place }
      default: return { kind: 'block', node, place }
    }
  })
}

function pieces(node: Nodes, file: string, source: string): readonly TemplatePiece[] {
  switch (node.type) {
    case 'text': return [{ kind: 'text', text: node.value.replace(/\n/g, ' ') }]
    case 'inlineCode': return [{ kind: 'code', text: node.value }]
    case 'emphasis': case 'strong': return [{ kind: node.type, text: plainText(node, source) }]
    case 'break': return [{ kind: 'text', text: ' ' }]
    case 'textDirective':
      return node.name === 'value'
        ? [{ kind: 'value', path: plainText(node, source), place: placeOf(node, file) }]
        : [{ kind: 'text', text: slice(node, source) }]
    default: return 'children' in node ? node.children.flatMap((child) => pieces(child, file, source)) : [{ kind: 'text', text: slice(node, source) }]
  }
}

function plainText(node: Nodes, source: string): string {
  if ('children' in node) return node.children.map((child) => (child.type === 'textDirective' ? slice(child, source) : plainText(child, source))).join('')
  return 'value' in node ? node.value : slice(node, source)
}

function slice(node: Nodes, source: string): string {
  return source.slice(node.position?.start.offset ?? 0, node.position?.end.offset ?? 0)
}

function placeOf(node: Nodes, file: string): Place {
  return { file, line: node.position?.start.line, column: node.position?.start.column }
}
