// The import rules of DEVELOPERS.md, the doorways of outside packages, headers, and the rule that no source knows a demo or a customary limit.
import { readdirSync, readFileSync, statSync } from 'node:fs'
import { dirname, join, posix } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'

const source = fileURLToPath(new URL('../src', import.meta.url))

function filesUnder(folder: string): readonly string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name)
    return statSync(path).isDirectory() ? filesUnder(path) : path.endsWith('.ts') ? [path] : []
  })
}

interface Import {
  readonly from: string
  readonly to: string
  readonly typeOnly: boolean
}

const files = filesUnder(source).map((path) => ({ path: path.slice(source.length + 1).split('\\').join('/'), text: readFileSync(path, 'utf8') }))

function importsOf(file: { readonly path: string; readonly text: string }): readonly Import[] {
  return [...file.text.matchAll(/^(?:import|export)\s+(type\s+)?(?:[^'"]*?\sfrom\s+)?['"]([^'"]+)['"]|\bimport\(\s*['"]([^'"]+)['"]\s*\)/gm)].map((match) => {
    const target = match[2] ?? match[3] ?? ''
    return { from: file.path, to: target.startsWith('.') ? posix.normalize(posix.join(dirname(file.path), target)) : target, typeOnly: match[1] !== undefined }
  })
}

const imports = files.flatMap(importsOf)
const inside = imports.filter((each) => files.some((file) => file.path === each.to))
const outside = imports.filter((each) => !files.some((file) => file.path === each.to))

/** Folder → what its files may import of ours. Types may be imported where the second list says so. */
const rules: readonly { readonly from: RegExp; readonly may: readonly RegExp[]; readonly types?: readonly RegExp[] }[] = [
  { from: /^diagnostics\//, may: [/^diagnostics\//] },
  { from: /^statistics\//, may: [/^statistics\//] },
  { from: /^definition\//, may: [/^definition\//, /^diagnostics\//] },
  { from: /^data\//, may: [/^data\//, /^diagnostics\//], types: [/^definition\//] },
  { from: /^assess\//, may: [/^assess\//, /^data\//, /^statistics\//, /^diagnostics\//, /^definition\/metric-unit\.ts$/], types: [/^definition\//] },
  { from: /^characteristics\/[^/]+\/index\.ts$/, may: [/^characteristics\/[^/]+\//, /^definition\//, /^diagnostics\//], types: [/^characteristics\/characteristic\.ts$/, /^assess\//] },
  { from: /^characteristics\/[^/]+\/present\.ts$/, may: [/^present\//, /^diagnostics\/counted\.ts$/], types: [/^assess\//, /^definition\//, /^characteristics\//] },
  { from: /^characteristics\/[^/]+\/[^/]+\.ts$/, may: [/^statistics\//, /^diagnostics\//, /^assess\/(measurements|assessment-part)\.ts$/, /^characteristics\/[^/]+\//, /^present\//, /^definition\//], types: [/^assess\//, /^data\//, /^definition\//] },
  { from: /^characteristics\/index\.ts$/, may: [/^characteristics\//] },
  { from: /^characteristics\/characteristic\.ts$/, may: [], types: [/^assess\//, /^definition\//, /^present\//] },
  { from: /^present\//, may: [/^present\//, /^diagnostics\//, /^statistics\/rounding\.ts$/], types: [/^assess\//, /^definition\//] },
  { from: /^publish\//, may: [/^publish\//, /^diagnostics\//], types: [/^present\/document\.ts$/] },
  { from: /^pipeline\.ts$/, may: [/.*/] },
  { from: /^cli\//, may: [/.*/] },
]

test('every import follows the rules of its folder', () => {
  const broken = inside.filter((each) => {
    const rule = rules.find((candidate) => candidate.from.test(each.from))
    if (rule === undefined) return true
    if (rule.may.some((pattern) => pattern.test(each.to))) return false
    return !(each.typeOnly && (rule.types ?? []).some((pattern) => pattern.test(each.to)))
  })
  expect(broken.map((each) => `${each.from} imports ${each.to}`)).toEqual([])
})

test('a characteristic imports no other characteristic, types of its forerunners excepted', () => {
  const own = (path: string): string | undefined => /^characteristics\/([^/]+)\//.exec(path)?.[1]
  const broken = inside.filter((each) => own(each.from) !== undefined && own(each.to) !== undefined && own(each.from) !== own(each.to) && !each.typeOnly)
  expect(broken.map((each) => `${each.from} imports ${each.to}`)).toEqual([])
})

test('no stage imports the catalogue or a characteristic', () => {
  const broken = inside.filter((each) => /^(diagnostics|statistics|definition|data|assess|present|publish)\//.test(each.from) && each.to.startsWith('characteristics/'))
  expect(broken.map((each) => `${each.from} imports ${each.to}`)).toEqual([])
})

/** Each outside package has one doorway (a file, or a folder where its job needs several). */
const doorways: Readonly<Record<string, RegExp>> = {
  'yaml': /^definition\/yaml\.ts$/,
  'csv-parse/sync': /^data\/csv\.ts$/,
  'vega': /^publish\/chart\.ts$/,
  'vega-lite': /^publish\/chart\.ts$/,
  'pdfkit': /^publish\/pdf\//,
  'fontkit': /^publish\/(fonts|pdf\/pdfkit-augmented\.d)\.ts$/,
  'fflate': /^publish\/pdf\//,
  'unified': /^present\/template\.ts$/,
  'remark-parse': /^present\/template\.ts$/,
  'remark-gfm': /^present\/template\.ts$/,
  'remark-directive': /^present\/template\.ts$/,
  'mdast-util-to-markdown': /^publish\/markdown\.ts$/,
  'mdast-util-gfm': /^publish\/markdown\.ts$/,
  'mdast-util-directive': /^publish\/markdown\.ts$/,
  'mdast': /.*/, // types only
  'node:crypto': /^assess\/digest\.ts$/,
}

test('every outside package is imported through its doorway', () => {
  const broken = outside.filter((each) => {
    if (each.to.startsWith('node:')) return !(each.from.startsWith('cli/') || doorways[each.to]?.test(each.from) === true)
    if (each.to.startsWith('@stdlib/')) return !each.from.startsWith('statistics/')
    return doorways[each.to]?.test(each.from) !== true
  })
  expect(broken.map((each) => `${each.from} imports ${each.to}`)).toEqual([])
})

describe('outside cli', () => {
  const pure = files.filter((file) => !file.path.startsWith('cli/'))
  test.each([
    ['the clock', /\bDate\.now\(|\bnew Date\(\s*\)|\bperformance\.now\(/],
    ['randomness', /\bMath\.random\(|\bcrypto\.random/],
    ['the locale', /\bIntl\.|\.localeCompare\(|\.toLocale\w+\(/],
    ['the process', /\bprocess\.|\bconsole\.(log|error|warn)/],
  ])('nothing asks %s', (_, pattern) => {
    expect(pure.filter((file) => pattern.test(file.text)).map((file) => file.path)).toEqual([])
  })
})

test('every file begins with a header comment', () => {
  expect(files.filter((file) => !/^(#!.*\n)?(\/\/ |\/\*\* )/.test(file.text)).map((file) => file.path)).toEqual([])
})

test('no default export, no enum, no any', () => {
  const broken = files.filter((file) => !file.path.endsWith('.d.ts')).filter((file) => /^export default|^\s*(export )?(const )?enum |:\s*any\b|\bas any\b|<any>/m.test(file.text.replace(/\/\/.*|\/\*[\s\S]*?\*\//g, '')))
  expect(broken.map((file) => file.path)).toEqual([])
})

test('no source names a demo measurand', () => {
  expect(files.filter((file) => /\b(chloride|nitrate|sulfate|greywater)\b/i.test(file.text)).map((file) => file.path)).toEqual([])
})

test('every folder of characteristics stands in the catalogue', () => {
  const folders = [...new Set(files.flatMap((file) => /^characteristics\/([^/]+)\//.exec(file.path)?.[1] ?? []))].sort()
  const named = files.find((file) => file.path === 'characteristics/index.ts')?.text ?? ''
  expect(folders.filter((folder) => !named.includes(`./${folder}/index.ts`))).toEqual([])
  for (const folder of folders) {
    expect(files.filter((file) => file.path.startsWith(`characteristics/${folder}/`)).map((file) => file.path)).toEqual(expect.arrayContaining(['index', 'assess', 'present'].map((name) => `characteristics/${folder}/${name}.ts`)))
  }
})
