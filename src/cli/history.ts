// The append-only history of a dossier: one JSON object a line, each with the digest of the line before, so that order cannot be
// changed unseen. It alone holds clock and environment; nothing else of a dossier does.
import { canonicalJson } from '../assess/canonical-json.ts'
import { sha256 } from '../assess/digest.ts'

export interface HistoryEvent {
  readonly event: 'built'
  /** ISO date and time in UTC. */
  readonly at: string
  readonly record: string
  readonly report: string
  readonly program: string
  readonly environment: string
}

/** The history text with one more event at its end. */
export function appended(history: string, event: HistoryEvent): string {
  const lines = history.split('\n').filter((line) => line !== '')
  const last = lines.at(-1)
  return `${[...lines, canonicalJson({ ...event, previous: last === undefined ? null : sha256(last) })].join('\n')}\n`
}
