// `npm run accept [-- <test file or -t name>]`: runs the tests once and lets each new text replace its approved file. Look at the
// difference (`git diff fixtures`) before committing: accepting is a decision, not a repair.
import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'

if (process.env['CI'] !== undefined) {
  process.stderr.write('Approved files are never changed on a build server.\n')
  process.exit(1)
}
const vitest = fileURLToPath(new URL('../../node_modules/vitest/vitest.mjs', import.meta.url))
const done = spawnSync(process.execPath, [vitest, 'run', '--config', 'test/vitest.config.ts', ...process.argv.slice(2)], {
  cwd: fileURLToPath(new URL('../..', import.meta.url)), stdio: 'inherit', env: { ...process.env, ASSAYWRIT_ACCEPT: '1' },
})
process.exit(done.status ?? 1)
