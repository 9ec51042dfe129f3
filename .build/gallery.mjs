// Every approved chart of fixtures/charts on one page: out/gallery/index.html, to look them over after a change.
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { fontFiles } from './fonts.mjs'

const root = fileURLToPath(new URL('..', import.meta.url))
const charts = join(root, 'fixtures/charts')
const target = join(root, 'out/gallery')
mkdirSync(target, { recursive: true })

const faces = [['Source Sans 3', 400, fontFiles['sans']], ['Source Sans 3', 600, fontFiles['sans-bold']], ['DejaVu Sans', 400, fontFiles['fallback']]]
const fontRules = faces.map(([family, weight, file]) => {
  const name = file.split('/').at(-1)
  writeFileSync(join(target, name), readFileSync(join(root, 'node_modules', file)))
  return `@font-face { font-family: '${family}'; font-weight: ${weight}; src: url('${name}'); }`
})

/** Inlined, so that the fonts of the page reach them; ids are made unique. */
const picture = (kind, name) => {
  const key = `${kind}-${name}`
  return readFileSync(join(charts, kind, name, 'chart.svg'), 'utf8').replaceAll(/\b(id="|url\(#)/g, `$1${key}-`).replace('aria-labelledby="title description"', `aria-labelledby="${key}-title ${key}-description"`)
}
const sections = readdirSync(charts).sort().map((kind) => {
  const figures = readdirSync(join(charts, kind)).sort().map((name) => `<figure><figcaption>${name.replaceAll('-', ' ')}</figcaption>${picture(kind, name)}</figure>`)
  return `<section><h2>${kind.replaceAll('-', ' ')}</h2>${figures.join('\n')}</section>`
})
writeFileSync(join(target, 'index.html'), `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><title>Charts</title><style>
${fontRules.join('\n')}
body { font: 15px/1.5 'Source Sans 3', sans-serif; color: #232b32; background: #eef1f3; margin: 2rem auto; max-width: 72rem; padding: 0 1rem; }
figure { display: inline-block; vertical-align: top; background: #fff; margin: 0 1rem 1rem 0; padding: 0.8rem 1rem; }
figcaption { color: #5d6871; font-size: 13px; margin-bottom: 0.5rem; }
.grey svg { filter: grayscale(1); }
</style></head><body><h1>Charts</h1>
<p><label><input type="checkbox" onchange="document.body.classList.toggle('grey', this.checked)"> in grey</label></p>
${sections.join('\n')}
</body></html>
`)
process.stdout.write(`out/gallery/index.html: ${sections.length} kinds of chart\n`)
