// Names that a study gives (measurands, datasets, fields, blocks) become parts of finding ids, of file names and of records.
// A name that would break one of them, or that differs from another only in the case of letters, is refused here.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Located, Place } from '../diagnostics/place.ts'
import type { Reading } from './reading.ts'

/** `what` is the kind of thing, such as `measurand`. Returns whether all names can be used. */
export function checkNames(names: readonly Located<string>[], what: string, reading: Reading): boolean {
  const seen = new Map<string, Located<string>>()
  let isGood = true
  for (const name of names) {
    const earlier = seen.get(name.value.toLowerCase())
    const trouble = troubleOf(name.value)
    if (trouble !== undefined) {
      isGood = false
      reading.report(diagnostic('definition/unusable-name', `Unexpected name \`${name.value}\` of a ${what}: ${trouble}`, { place: name.place, actual: name.value, expected: 'letters, digits, spaces and signs such as `-` and `.`', mend: 'Write another name; a measurand can have its printed name under `name:`' }))
    } else if (earlier !== undefined) {
      isGood = false
      reading.report(diagnostic('definition/duplicate-name', `Unexpected second ${what} \`${name.value}\``, { place: name.place, actual: name.value, expected: `a name for each ${what} that differs in more than the case of letters`, mend: 'Rename one of the two', related: [{ message: `the first \`${earlier.value}\``, place: earlier.place }] }))
    }
    seen.set(name.value.toLowerCase(), earlier ?? name)
  }
  return isGood
}

function troubleOf(name: string): string | undefined {
  if (name.trim() !== name || name === '') return 'it begins or ends with a space, or is empty'
  if (/[/@\\]/.test(name)) return 'findings are numbered with `/` and `@`' // characteristic/measurand/metric@level
  if (/\p{Cc}/u.test(name)) return 'it holds an invisible character'
  if (name in {}) return 'programs keep it for themselves' // constructor, toString, …
  return name.length > 100 ? 'it is longer than 100 characters' : undefined
}

/** Reports a name that nothing of the study bears. */
export function checkKnown(name: Located<string>, known: Iterable<string>, what: string, where: string, reading: Reading): boolean {
  const names = [...known]
  if (names.includes(name.value)) return true
  const guess = nearest(name.value, names)
  const shown = 12 // names; more are no help
  reading.report(diagnostic('definition/unknown-name', `Unexpected \`${name.value}\`: no ${what} has this name`, {
    place: name.place, actual: name.value, expected: names.length === 0 ? `a ${what} of the study` : `${names.slice(0, shown).join(', ')}${names.length > shown ? ', …' : ''}`,
    mend: guess === undefined ? `Write the name of a ${what}, or add it ${where}` : `Write \`${guess}\``,
  }))
  return false
}

export function keyPlaces(entries: readonly { readonly key: string; readonly keyPlace: Place }[]): readonly Located<string>[] {
  return entries.map((each) => ({ value: each.key, place: each.keyPlace }))
}
