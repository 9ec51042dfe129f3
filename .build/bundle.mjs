// src/ and its packages → dist/: one command that runs without node_modules, with the fonts, their licences and the colour profile beside it.
import { build } from 'esbuild'
import { chmodSync, copyFileSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { fontFiles, fontLicences } from './fonts.mjs'

const root = fileURLToPath(new URL('..', import.meta.url))
const dist = join(root, 'dist')
const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'))

rmSync(dist, { recursive: true, force: true })
mkdirSync(join(dist, 'fonts'), { recursive: true })
mkdirSync(join(dist, 'data'), { recursive: true })
const result = await build({
  entryPoints: { assaywrit: join(root, 'src/cli/assaywrit.ts') },
  outdir: dist, bundle: true, splitting: true, format: 'esm', platform: 'node', target: 'node20', minify: true, keepNames: false,
  legalComments: 'none', external: ['canvas'], define: { programVersion: JSON.stringify(version) }, metafile: true, logLevel: 'warning',
  chunkNames: 'part-[hash]',
  banner: { js: "import{createRequire as requireFrom}from'node:module';const require=requireFrom(import.meta.url);" },
})
const command = join(dist, 'assaywrit.js')
writeFileSync(command, `#!/usr/bin/env node\n${readFileSync(command, 'utf8')}`)
chmodSync(command, 0o755)
for (const [face, file] of Object.entries(fontFiles)) copyFileSync(join(root, 'node_modules', file), join(dist, 'fonts', `${face}.ttf`))
for (const [name, file] of Object.entries(fontLicences)) copyFileSync(join(root, 'node_modules', file), join(dist, 'fonts', name))
copyFileSync(join(root, 'node_modules/pdfkit/js/data/sRGB_IEC61966_2_1.icc'), join(dist, 'data/sRGB_IEC61966_2_1.icc'))
writeFileSync(join(dist, 'PACKAGES.txt'), packagesNotice(result.metafile))

/** Every bundled package with its licence text, as their licences ask. */
function packagesNotice(metafile) {
  const folders = new Set(Object.keys(metafile.inputs).flatMap((input) => /^(.*node_modules\/(?:@[^/]+\/)?[^/]+)\//.exec(input)?.[1] ?? []))
  const owners = new Map()
  const packages = [...folders].sort().map((folder) => {
    const about = JSON.parse(readFileSync(join(root, folder, 'package.json'), 'utf8'))
    const text = readdirSync(join(root, folder)).filter((name) => /^(licen[cs]e|notice)/i.test(name)).sort().map((name) => readFileSync(join(root, folder, name), 'utf8').trim())
    const name = `${about.name} ${about.version} (${typeof about.license === 'string' ? about.license : 'see below'})`
    for (const each of text) owners.set(each, [...(owners.get(each) ?? []), about.name])
    return name
  })
  const texts = [...owners].map(([text, names]) => `${names.join(', ')}\n\n${text}`)
  return `${packages.join('\n')}\n\n----\n\n${texts.join('\n\n----\n\n')}\n`
}
