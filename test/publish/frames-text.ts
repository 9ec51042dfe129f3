// Frames as text that a person can compare: what stands where on each page, and the logical tree in reading order.
import type { Box, Frames } from '../../src/publish/pdf/frames.ts'
import { rolePath, type StructureNode } from '../../src/publish/pdf/structure.ts'

export function framesText(frames: Frames): string {
  return frames.pages.map((page, index) => [`page ${index + 1}`, ...[...page.header, ...page.boxes, ...page.footer].flatMap(boxText)].join('\n')).join('\n\n') + '\n'
}

function boxText(box: Box): readonly string[] {
  const at = (x: number, y: number): string => `${x.toFixed(1).padStart(6)} ${y.toFixed(1).padStart(6)}`
  switch (box.kind) {
    case 'text': return [`${at(box.x, box.y)}  ${`${box.face} ${Number(box.size.toFixed(2))}`.padEnd(16)} ${box.text.trimEnd()}${box.isStruck === true ? '  (struck)' : ''}`]
    case 'drawing': return [`${at(box.x, box.y)}  drawing ${(box.drawing.width * box.scale).toFixed(1)} × ${(box.drawing.height * box.scale).toFixed(1)}`]
    case 'link': return [`${at(box.x, box.y)}  link to ${box.target.kind === 'inside' ? box.target.id : box.target.url}`]
    case 'anchor': return box.id === '' ? [] : [`${at(0, box.y)}  anchor ${box.id}`]
    default: return []
  }
}

/** Every element once, in the order of its first content, with its text. */
export function structureText(frames: Frames): string {
  const texts = new Map<StructureNode, string>()
  const visit = (tag: StructureNode): void => {
    if (tag.parent !== undefined) visit(tag.parent)
    if (!texts.has(tag)) texts.set(tag, '')
  }
  for (const box of frames.pages.flatMap((page) => page.boxes)) {
    if (!('tag' in box) || box.tag === undefined) continue
    visit(box.tag)
    if (box.kind === 'text') texts.set(box.tag, (texts.get(box.tag) ?? '') + box.text)
  }
  return [...texts].map(([tag, text]) => {
    const depth = rolePath(tag).split('/').length - 1
    const properties = [tag.scope === undefined ? '' : ` (${tag.scope})`, tag.alternative === undefined ? '' : ` [${tag.alternative}]`].join('')
    return `${'  '.repeat(depth)}${tag.role}${properties}${text === '' ? '' : `: ${text.trim()}`}`
  }).join('\n') + '\n'
}
