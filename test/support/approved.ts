// Compares a text with its approved file. On a mismatch the new text is left under out/test/ for a look; only `npm run accept` replaces
// the approved file, and never on a build server.
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { dirname, join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { expect } from 'vitest'

const root = fileURLToPath(new URL('../..', import.meta.url))
const isAccepting = process.env['ASSAYWRIT_ACCEPT'] === '1' && process.env['CI'] === undefined

/** `path` is absolute or relative to the project. */
export function expectApproved(path: string, text: string): void {
  const approvedPath = join(root, relative(root, path.startsWith('/') || /^[A-Za-z]:/.test(path) ? path : join(root, path)))
  const approved = existsSync(approvedPath) ? readFileSync(approvedPath, 'utf8') : undefined
  if (approved === text) return
  if (isAccepting) {
    mkdirSync(dirname(approvedPath), { recursive: true })
    writeFileSync(approvedPath, text)
    return
  }
  const name = relative(root, approvedPath)
  const receivedPath = join(root, 'out', 'test', name)
  mkdirSync(dirname(receivedPath), { recursive: true })
  writeFileSync(receivedPath, text)
  const hint = `See ${relative(root, receivedPath)}; after a look, \`npm run accept\` approves it`
  if (approved === undefined) expect.fail(`No approved file ${name}. ${hint}`)
  expect(text, `${name} differs. ${hint}`).toBe(approved)
}
