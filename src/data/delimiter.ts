// The first lines of a raw file → what separates its columns. One delimiter is chosen before anything is split: a file that two would fit
// is refused until the study says which.
import type { Delimiter } from '../definition/study.ts'
import { headingOf } from './cells.ts'

export const delimiterSigns: Readonly<Record<Delimiter, string>> = { comma: ',', semicolon: ';', tab: '\t', pipe: '|' }
const delimiters = Object.keys(delimiterSigns) as readonly Delimiter[]

const sampleLength = 256 * 1024 // characters looked at; enough for the preamble and the first rows
const sampleLines = 200

/**
 * The delimiter under which a line holds all the headings that the study maps is meant. Else one fits when most lines have one and the same
 * number of cells under it, more than one; two that fit are undecided. A comma that stands between digits only is a decimal mark and no
 * delimiter. A file without any has one column.
 */
export function sniffDelimiter(text: string, headings: readonly string[]): Delimiter | { readonly fitting: readonly Delimiter[] } {
  const said = /^sep=(.)[\r\n]/.exec(text)?.[1] // how spreadsheets are told the delimiter
  const saidDelimiter = delimiters.find((each) => delimiterSigns[each] === said)
  if (saidDelimiter !== undefined) return saidDelimiter
  const sample = text.slice(0, sampleLength)
  const [shown, ...others] = showingHeadings(sample, headings)
  if (shown !== undefined && others.length === 0) return shown
  const lines = sample.replace(/"[^"]*"/g, '').split(/\r\n|\n|\r/).filter((line) => line.trim() !== '').slice(0, sampleLines)
  const commaIsMark = lines.every((line) => !/(?:^|[^\d]),|,(?:[^\d]|$)/.test(line))
  const fitting = delimiters.filter((delimiter) => {
    const counts = new Map<number, number>()
    for (const line of lines) {
      const cells = line.split(delimiterSigns[delimiter]).length
      if (cells > 1) counts.set(cells, (counts.get(cells) ?? 0) + 1)
    }
    return Math.max(0, ...counts.values()) > lines.length / 2
  })
  const separating = fitting.filter((delimiter) => delimiter !== 'comma' || !commaIsMark)
  if (separating.length === 1 && separating[0] !== undefined) return separating[0]
  if (separating.length > 1) return { fitting: separating }
  // One column: any delimiter that does not occur leaves the lines whole.
  const absent = (['semicolon', 'tab', 'pipe'] as const).find((delimiter) => lines.every((line) => !line.includes(delimiterSigns[delimiter])))
  return commaIsMark && absent !== undefined ? absent : { fitting }
}

function showingHeadings(sample: string, headings: readonly string[]): readonly Delimiter[] {
  if (headings.length < 2) return []
  const lines = sample.split(/\r\n|\n|\r/)
  return delimiters.filter((delimiter) => lines.some((line) => {
    if (!line.includes(delimiterSigns[delimiter])) return false
    const cells = new Set(line.split(delimiterSigns[delimiter]).map((cell) => headingOf(cell.replace(/^\s*"|"\s*$/g, ''))))
    return headings.every((heading) => cells.has(heading))
  }))
}
