// Prints processor time and memory of the command on the demo and on generated studies of 1 and 60 measurands, as a table.
// It measures whole processes and never fails by time. Usage: npm run bench [-- --runs 5]
import { spawnSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { build } from 'esbuild'

const root = fileURLToPath(new URL('..', import.meta.url))
const runs = Number(process.argv[process.argv.indexOf('--runs') + 1]) || 3
const work = mkdtempSync(join(tmpdir(), 'assaywrit-bench-'))
const generator = join(root, 'out/test/generated-study.mjs')
await build({ entryPoints: [join(root, 'test/support/generated-study.ts')], outfile: generator, bundle: true, format: 'esm', platform: 'node', logLevel: 'error' })
const { generatedStudy } = await import(pathToFileURL(generator).href)

function write(measurands) {
  const folder = join(work, `of-${measurands}`)
  const study = generatedStudy({ seed: 7, measurands })
  for (const [path, text] of [['study.yaml', study.study], ...study.files]) {
    mkdirSync(dirname(join(folder, path)), { recursive: true })
    writeFileSync(join(folder, path), text)
  }
  return join(folder, 'study.yaml')
}

// The probe prints what the process used just before it ends; it is loaded by --import and changes nothing else.
const probe = join(work, 'probe.mjs')
writeFileSync(probe, `process.on('exit', () => { const used = process.resourceUsage(); process.stderr.write('\\nUSED ' + JSON.stringify({ cpu: (used.userCPUTime + used.systemCPUTime) / 1e6, memory: used.maxRSS / 1024 }) + '\\n') })\n`)

function measure(label, words) {
  const used = Array.from({ length: runs }, () => {
    const done = spawnSync(process.execPath, ['--import', pathToFileURL(probe).href, join(root, 'dist/assaywrit.js'), ...words], { encoding: 'utf8', maxBuffer: 1 << 28 })
    const match = /USED (.*)/.exec(done.stderr)
    if (match === null || done.status !== 0) throw new Error(`${label}: ${done.stderr}`)
    return JSON.parse(match[1])
  }).sort((left, right) => left.cpu - right.cpu)
  const middle = used[Math.floor(used.length / 2)]
  console.log(`${label.padEnd(34)} ${middle.cpu.toFixed(2).padStart(8)} s ${Math.max(...used.map((each) => each.memory)).toFixed(0).padStart(8)} MB`)
}

console.log(`${'command'.padEnd(34)} ${'cpu'.padStart(10)} ${'peak memory'.padStart(11)}   (median of ${runs})`)
const demo = join(root, 'fixtures/studies/process-water/study.yaml')
try {
  measure('check demo', ['check', demo])
  measure('report demo', ['report', demo, '--out', join(work, 'out')])
  for (const measurands of [1, 60]) {
    const study = write(measurands)
    measure(`check, ${measurands} measurands`, ['check', study])
    measure(`report, ${measurands} measurands`, ['report', study, '--out', join(work, 'out')])
  }
} finally {
  rmSync(work, { recursive: true, force: true })
}
