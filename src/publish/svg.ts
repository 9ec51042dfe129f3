// A Drawing → SVG text, the same bytes each time. Text stays text: it can be searched, read aloud and set in the reader's own font.
import type { Drawing, Operation, Paint, Segment, Stroke, TextOperation } from './drawing.ts'
import type { FaceName } from './fonts.ts'

export interface SvgWords {
  readonly title: string
  readonly description: string
}

export function drawingToSvg(drawing: Drawing, words: SvgWords): string {
  const { width, height } = drawing
  const clips: string[] = []
  const body = drawing.operations.map((operation) => element(operation, clips, '  ')).join('\n')
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}pt" height="${height}pt" viewBox="0 0 ${width} ${height}" role="img" aria-labelledby="title description">`,
    `  <title id="title">${escaped(words.title)}</title>`,
    `  <desc id="description">${escaped(words.description)}</desc>`,
    ...(clips.length === 0 ? [] : [`  <defs>`, ...clips.map((clip) => `    ${clip}`), `  </defs>`]),
    body,
    `</svg>\n`,
  ].join('\n')
}

function element(operation: Operation, clips: string[], indent: string): string {
  if (operation.kind === 'text') return indent + text(operation)
  const path = operation.segments.map(segmentText).join('')
  if (operation.kind === 'path') return `${indent}<path d="${path}"${fill(operation.fill)}${stroke(operation.stroke)}/>`
  const id = `clip-${clips.length + 1}`
  clips.push(`<clipPath id="${id}"><path d="${path}"/></clipPath>`)
  return [`${indent}<g clip-path="url(#${id})">`, ...operation.operations.map((each) => element(each, clips, `${indent}  `)), `${indent}</g>`].join('\n')
}

function segmentText(segment: Segment): string {
  const [letter, ...numbers] = segment
  return `${letter}${numbers.join(' ')}`
}

function fill(paint: Paint | undefined): string {
  return paint === undefined ? ' fill="none"' : ` fill="${paint.colour}"${opacity('fill-opacity', paint)}`
}

function stroke(stroke: Stroke | undefined): string {
  if (stroke === undefined) return ''
  return ` stroke="${stroke.colour}"${opacity('stroke-opacity', stroke)} stroke-width="${stroke.width}"`
    + (stroke.cap === 'butt' ? '' : ` stroke-linecap="${stroke.cap}"`) + (stroke.join === 'miter' ? '' : ` stroke-linejoin="${stroke.join}"`)
    + (stroke.dash.length === 0 ? '' : ` stroke-dasharray="${stroke.dash.join(' ')}"`)
}

function opacity(name: string, paint: Paint): string {
  return paint.opacity === 1 ? '' : ` ${name}="${paint.opacity}"`
}

const families: Readonly<Record<FaceName, { readonly family: string; readonly weight?: number; readonly italic?: true }>> = {
  'serif': { family: "'Source Serif 4', serif" }, 'serif-italic': { family: "'Source Serif 4', serif", italic: true }, 'serif-bold': { family: "'Source Serif 4', serif", weight: 600 },
  'sans': { family: "'Source Sans 3', sans-serif" }, 'sans-italic': { family: "'Source Sans 3', sans-serif", italic: true }, 'sans-bold': { family: "'Source Sans 3', sans-serif", weight: 600 },
  'mono': { family: "'Source Code Pro', monospace" }, 'fallback': { family: "'DejaVu Sans', sans-serif" }, 'fallback-bold': { family: "'DejaVu Sans', sans-serif", weight: 700 },
}

function text(operation: TextOperation): string {
  const { family, weight, italic } = families[operation.face]
  const turned = operation.rotation === 0 ? '' : ` transform="rotate(${operation.rotation} ${operation.x} ${operation.y})"`
  return `<text x="${operation.x}" y="${operation.y}"${turned} font-family="${family}" font-size="${operation.size}"${weight === undefined ? '' : ` font-weight="${weight}"`}${italic === undefined ? '' : ' font-style="italic"'}`
    + `${fill(operation.paint)} textLength="${operation.width}" lengthAdjust="spacingAndGlyphs">${escaped(operation.text)}</text>`
}

/** Characters that XML 1.0 cannot hold are left out of the words of a title; a Drawing never has them. */
function escaped(words: string): string {
  return words.replace(/[\u0000-\u0008\u000B\u000C\u000E-\u001F]/g, '').replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;')
}
