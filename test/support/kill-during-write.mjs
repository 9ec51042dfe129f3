// A process that writes a dossier and kills itself just before the step asked for: `node kill-during-write.mjs WRITER PARENT STEP CONTENT`.
// It counts every call that changes the disk, so that a test can stop between each pair of them.
import fs from 'node:fs'
import { syncBuiltinESMExports } from 'node:module'

const [writer, parent, step, content] = process.argv.slice(2)
let count = 0
for (const name of ['mkdirSync', 'openSync', 'writeSync', 'fsyncSync', 'closeSync', 'renameSync', 'rmSync', 'writeFileSync']) {
  const original = fs[name]
  fs[name] = (...given) => {
    count += 1
    if (count === Number(step)) process.kill(process.pid, 'SIGKILL')
    return original(...given)
  }
}
syncBuiltinESMExports()
const { replaceDossier, underLock } = await import(writer)
const place = { parent, name: 'revision-1' }
const bytes = new TextEncoder().encode(content)
underLock(place, () => replaceDossier(place, new Map([['record.json', bytes], ['tables/one.csv', bytes], ['report.pdf', bytes]])))
process.stdout.write(`done after ${count} steps\n`)
