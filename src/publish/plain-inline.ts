// Inline nodes → what they say, without style. A page reference says nothing where there are no pages.
import type { PhrasingContent } from 'mdast'
import type { Inline } from '../present/document.ts'

export function plainInline(inlines: readonly (Inline | PhrasingContent)[], pageOf: (target: string) => string = () => ''): string {
  return inlines.map((inline) => {
    switch (inline.type) {
      case 'number': return inline.text
      case 'verdict': return inline.word
      case 'reference': return inline.text ?? inline.target
      case 'pageReference': return pageOf(inline.target)
      case 'break': return ' '
      case 'image': return inline.alt ?? ''
      default: return 'children' in inline ? plainInline(inline.children, pageOf) : 'value' in inline ? inline.value : ''
    }
  }).join('')
}
