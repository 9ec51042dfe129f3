// Paths in a study: relative to its folder, with `/`, the same on every system. Only the record of an earlier revision may lie outside.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { text } from './scalars.ts'
import type { Reader, Reading } from './reading.ts'
import type { StudyNode } from './study-node.ts'

/** Read without its `.` and `..` parts, so that one file has one path. */
export function pathInside(describe: string, example = 'raw/calibration.csv'): Reader<string> {
  return path(describe, example, (plain) => plain !== undefined && !/^\.\.(\/|$)/.test(plain), 'that stays in its folder', 'Copy the file into the folder of the study and write its relative path')
}

export function pathBeside(describe: string, example: string): Reader<string> {
  return path(describe, example, (plain) => plain !== undefined, 'such as `../revision-1/record.json`', 'Write the path relative to the folder of the study, with `/`')
}

/** The name of something shipped (kept as typed), or a path inside when it looks like one. */
export function nameOrPathInside(describe: string, example: string): Reader<string> {
  const [name, inside] = [text({ describe, example }), pathInside(describe, example)]
  return {
    schema: name.schema,
    read(node, reading) {
      const typed = name.read(node, reading)
      if (typed === undefined || !/[/\\]|\.md$/.test(typed)) return typed
      return inside.read(node, reading) === undefined ? undefined : typed
    },
  }
}

function path(describe: string, example: string, isGood: (plain: string | undefined) => boolean, expected: string, mend: string): Reader<string> {
  const inner = text({ describe, example })
  return {
    schema: inner.schema,
    read(node, reading) {
      const typed = inner.read(node, reading)
      if (typed === undefined) return undefined
      const plain = plainPath(typed)
      if (isGood(plain)) return plain
      const why = plain === undefined ? 'it is absolute, or written with other signs than `/`' : 'it leaves the folder, to outside the study'
      report(typed, why, expected, mend, node, reading)
      return undefined
    },
  }
}

/** A file outside the folder of the study that is not declared to be there. */
export function reportOutside(typed: string, node: StudyNode, reading: Reading): void {
  report(typed, 'it leaves the folder, to outside the study', 'that stays in its folder', 'Copy the file into the folder of the study, or declare `outside: true` beside `file:`', node, reading)
}

function report(typed: string, why: string, expected: string, mend: string, node: StudyNode, reading: Reading): void {
  reading.report(diagnostic('definition/path-outside', `Unexpected path \`${typed}\` for \`${reading.path}\`: ${why}`, { place: node.place, actual: typed, expected: `a path relative to the study, with \`/\`, ${expected}`, mend }))
}

/** Undefined for an absolute path, a drive, a backslash, or no file name. */
function plainPath(typed: string): string | undefined {
  if (typed.startsWith('/') || typed.startsWith('~') || /^[A-Za-z]:|\\|\p{Cc}|^[a-z]+:\/\//u.test(typed)) return undefined
  const parts: string[] = []
  for (const part of typed.split('/')) {
    if (part === '..' && parts.length > 0 && parts.at(-1) !== '..') parts.pop()
    else if (part !== '.' && part !== '') parts.push(part)
  }
  return parts.length === 0 ? undefined : parts.join('/')
}
