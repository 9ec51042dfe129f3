// The command itself: arguments in, exit code out. It alone turns a thrown error into a sentence; a stack trace is never shown, but its
// first line is, since it is what a bug report needs.
import { catalogue } from '../characteristics/index.ts'
import { studySchema } from '../definition/schema.ts'
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import { harmless } from '../diagnostics/harmless.ts'
import { diagnosticsAsJson, printDiagnostics } from '../diagnostics/print.ts'
import { commandHelp, type Command, generalHelp, readArguments } from './arguments.ts'
import { checkStudy } from './check-command.ts'
import { type ExitCode, exitCodes } from './outcome.ts'
import { writeReport } from './report-command.ts'

declare const programVersion: string

interface StudyOutcome {
  readonly study: string
  readonly exit: ExitCode
  readonly overall?: string | undefined
  readonly dossier?: string | undefined
  /** What a fault of the program said. */
  readonly fault?: string | undefined
  readonly diagnostics: readonly Diagnostic[]
  readonly sources: ReadonlyMap<string, string>
}

async function run(words: readonly string[]): Promise<ExitCode> {
  const command = readArguments(words)
  switch (command.command) {
    case 'help': return said(commandHelp[command.about ?? ''] ?? generalHelp)
    case 'version': return said(`assaywrit ${programVersion}`)
    case 'usage':
      process.stderr.write(`assaywrit: ${command.problem}\n\n${commandHelp[command.about ?? ''] ?? generalHelp}\n`)
      return exitCodes.usage
    case 'schema': return said(JSON.stringify(studySchema(catalogue), null, 2))
    case 'check': case 'report': return studies(command)
  }
}

function said(text: string): ExitCode {
  process.stdout.write(`${text}\n`)
  return exitCodes.done
}

async function studies(command: Command & { readonly command: 'check' | 'report' }): Promise<ExitCode> {
  const outcomes: StudyOutcome[] = []
  const written = new Map<string, string>()
  for (const study of command.studies) {
    const outcome = await oneStudy(study, command, written).catch((error: unknown): StudyOutcome => ({ study, exit: exitCodes.ourBug, fault: faultText(error), diagnostics: [], sources: new Map() }))
    outcomes.push(outcome)
    if (outcome.dossier !== undefined) written.set(outcome.dossier, study)
    if (outcome.fault !== undefined) process.stderr.write(`${harmless(study)}: ${outcome.fault}\n`)
    if (!command.json) tell(outcome, command.command)
  }
  if (command.json) {
    process.stdout.write(`${JSON.stringify({ format: 1, studies: outcomes.map((each) => ({ study: each.study, exit: each.exit, overall: each.overall ?? null, dossier: each.dossier ?? null, diagnostics: diagnosticsAsJson(each.diagnostics) })) })}\n`)
  } else if (outcomes.length > 1) {
    process.stdout.write(`\n${outcomes.map((each) => `${(command.command === 'report' && each.dossier === undefined ? 'not built' : each.overall ?? 'not ready').padEnd(16)} ${harmless(each.study)}`).join('\n')}\n`)
  }
  return outcomes.reduce<ExitCode>((highest, each) => (each.exit > highest ? each.exit : highest), exitCodes.done)
}

async function oneStudy(study: string, command: Command & { readonly command: 'check' | 'report' }, written: ReadonlyMap<string, string>): Promise<StudyOutcome> {
  progress(`reading ${study}`)
  const { checked, diagnostics, sources } = checkStudy(study)
  const failed = checked?.record === undefined || checked.tell === undefined
  const overall = failed ? undefined : checked.record.overall.verdict
  if (failed || checked === undefined || command.command === 'check') {
    progress()
    return { study, exit: failed ? exitCodes.inputWrong : exitCodes.done, overall, diagnostics, sources }
  }
  const reported = await writeReport({ studyPath: study, checked, out: command.out, written, progress })
  progress()
  const exit = reported.diskRefused ? exitCodes.outside
    : reported.dossier === undefined ? exitCodes.inputWrong
      : command.failOnVerdict && overall !== 'meets' ? exitCodes.verdict : exitCodes.done
  return { study, exit, overall, dossier: reported.dossier, diagnostics: [...diagnostics, ...reported.diagnostics], sources }
}

function tell(outcome: StudyOutcome, command: 'check' | 'report'): void {
  const shown = printDiagnostics(outcome.diagnostics, { sources: outcome.sources, colour: process.stderr.isTTY === true && process.env['NO_COLOR'] === undefined })
  if (shown !== '') process.stderr.write(`${shown}\n`)
  if (outcome.overall === undefined) {
    if (outcome.fault === undefined) process.stderr.write(`${harmless(outcome.study)}: ${command === 'check' ? 'not ready for a report' : 'no dossier written'}\n`)
    return
  }
  process.stdout.write(command === 'check'
    ? `${harmless(outcome.study)}: ready; overall verdict: ${outcome.overall}\n`
    : outcome.dossier === undefined ? '' : `${harmless(outcome.dossier)}/report.pdf\noverall verdict: ${outcome.overall}\n`)
}

/** One line that overwrites itself, on a terminal only; pipes stay silent. */
function progress(step?: string): void {
  if (process.stderr.isTTY === true) process.stderr.write(step === undefined ? '\r\u001b[K' : `\r\u001b[K${harmless(step)} …`)
}

function faultText(error: unknown): string {
  const first = error instanceof Error ? `${error.message} (${error.stack?.split('\n')[1]?.trim() ?? 'no place known'})` : String(error)
  return `this is a fault of the program, not of your files. Nothing was written.\n  ${harmless(first)}\nPlease report it with this line and, if you can, the study.`
}

// A reader that has seen enough (`| head`) closes its end; what is left to print is for nobody, and the work goes on.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error
  })
}

try {
  process.exitCode = await run(process.argv.slice(2))
} catch (error) {
  process.stderr.write(`assaywrit ${programVersion}: ${faultText(error)}\n`)
  process.exitCode = exitCodes.ourBug
}
