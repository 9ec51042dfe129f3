// Words of the command line → what to do. A wrong word is told with the usage of the command it belongs to, and nothing is done.
import { parseArgs } from 'node:util'
import { nearest } from '../diagnostics/nearest.ts'

export type Command =
  | { readonly command: 'report'; readonly studies: readonly string[]; readonly out: string | undefined; readonly json: boolean; readonly failOnVerdict: boolean }
  | { readonly command: 'check'; readonly studies: readonly string[]; readonly json: boolean }
  | { readonly command: 'schema' }
  | { readonly command: 'help'; readonly about: string | undefined }
  | { readonly command: 'version' }
  | { readonly command: 'usage'; readonly problem: string; readonly about: string | undefined }

export const commandHelp: Readonly<Record<string, string>> = {
  report: `assaywrit report STUDY… [--out DIR] [--json] [--fail-on-verdict]

  Reads a study definition and its raw files and writes the whole dossier:
  report.pdf, report.md, record.json, manifest.json, tables/, charts/, inputs/.

  --out DIR           where dossiers go (default: out/ beside the study)
  --json              diagnostics and outcome as one JSON document on standard output
  --fail-on-verdict   exit with 3 when the overall verdict is not "meets"

  Example:  assaywrit report dye-2026/study.yaml --out dossiers`,
  check: `assaywrit check STUDY… [--json]

  Reads everything a report would read, says everything that is wrong, writes nothing.

  --json              diagnostics as one JSON document on standard output

  Example:  assaywrit check dye-2026/study.yaml`,
  schema: `assaywrit schema

  Prints the JSON Schema of a study definition, for editors that complete and explain YAML.

  Example:  assaywrit schema > study.schema.json`,
}

export const generalHelp = `assaywrit: one study definition and raw instrument files in, one method-validation dossier out

  assaywrit report STUDY…   write the dossier
  assaywrit check STUDY…    say everything that is wrong, write nothing
  assaywrit schema          print the JSON Schema of a study definition
  assaywrit --help, assaywrit COMMAND --help, assaywrit --version

  Exit codes: 0 done, 1 input wrong or refused, 2 usage, 3 verdict (with --fail-on-verdict), 6 disk, 70 fault of the program

  Example:  assaywrit report study.yaml`

export function readArguments(words: readonly string[]): Command {
  const [first, ...rest] = words
  if (first === undefined || first === '--help' || first === '-h' || first === 'help') return { command: 'help', about: rest[0] }
  if (first === '--version' || first === '-V') return { command: 'version' }
  if (!(first in commandHelp)) {
    const guess = nearest(first, Object.keys(commandHelp))
    return { command: 'usage', problem: `unknown command ${JSON.stringify(first)}${guess === undefined ? '' : `; did you mean ${guess}?`}`, about: undefined }
  }
  if (rest.includes('--help') || rest.includes('-h')) return { command: 'help', about: first }
  try {
    return readCommand(first, rest)
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    return { command: 'usage', problem: error.message.split('. ')[0] ?? error.message, about: first }
  }
}

function readCommand(name: string, words: readonly string[]): Command {
  const usage = (problem: string): Command => ({ command: 'usage', problem, about: name })
  if (name === 'schema') {
    parseArgs({ args: [...words], options: {}, allowPositionals: false })
    return { command: 'schema' }
  }
  const json = { type: 'boolean', default: false } as const
  if (name === 'check') {
    const { values, positionals } = parseArgs({ args: [...words], options: { json }, allowPositionals: true })
    return positionals.length === 0 ? usage('name a study') : { command: 'check', studies: positionals, json: values.json }
  }
  const { values, positionals } = parseArgs({ args: [...words], options: { json, out: { type: 'string' }, 'fail-on-verdict': { type: 'boolean', default: false } }, allowPositionals: true })
  return positionals.length === 0 ? usage('name a study') : { command: 'report', studies: positionals, out: values.out, json: values.json, failOnVerdict: values['fail-on-verdict'] }
}
