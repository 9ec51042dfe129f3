// Inline nodes → what they say, without style; a page reference says nothing, since only the PDF has pages.
import type { PhrasingContent } from 'mdast'
import type { Inline } from '../present/document.ts'

export function plainInline(inlines: readonly (Inline | PhrasingContent)[]): string {
  return inlines.map((inline) => {
    switch (inline.type) {
      case 'number': return inline.text
      case 'verdict': return inline.word
      case 'reference': return inline.text ?? inline.target
      case 'pageReference': return ''
      case 'break': return ' '
      case 'image': return inline.alt ?? ''
      default: return 'children' in inline ? plainInline(inline.children) : 'value' in inline ? inline.value : ''
    }
  }).join('')
}
