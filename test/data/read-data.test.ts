// Raw files → datasets, whole: what becomes of each row, or what is told. Studies and files are written here; expected values by hand.
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { readData } from '../../src/data/index.ts'
import type { DatasetSource, Exclusion, FileSource, StudyDefinition } from '../../src/definition/study.ts'
import type { Dataset } from '../../src/data/dataset.ts'
import type { Diagnostic } from '../../src/diagnostics/diagnostic.ts'

const place = { file: 'study.yaml', line: 1, column: 1 }
const encoder = new TextEncoder()

interface Given {
  readonly files: Readonly<Record<string, string | Uint8Array>>
  /** Per file, when other than found out. */
  readonly written?: Readonly<Record<string, Partial<FileSource>>>
  readonly columns?: Readonly<Record<string, string | Readonly<Record<string, string>>>>
  readonly rows?: Readonly<Record<string, readonly string[]>>
  readonly measurands?: readonly string[]
  readonly exclusions?: readonly Partial<Exclusion>[]
  readonly average?: readonly string[]
}

function source(name: string, given: Given): DatasetSource {
  return {
    name, place, average: (given.average ?? []).map((value) => ({ value, place })), tokens: { notDetected: [], missing: [] },
    files: Object.keys(given.files).map((path) => ({ path, place, fixed: {}, ...given.written?.[path] })),
    rows: Object.entries(given.rows ?? {}).map(([column, accepted]) => ({ column, accepted, place })),
    columns: Object.fromEntries(Object.entries(given.columns ?? { level: 'Level', response: 'Area' }).map(([field, choice]) => [field, typeof choice === 'string'
      ? { kind: 'one' as const, column: choice, place }
      : { kind: 'per measurand' as const, columns: Object.fromEntries(Object.entries(choice).map(([measurand, value]) => [measurand, { value, place }])), place }])),
  }
}

function read(given: Given, more: readonly DatasetSource[] = []): { readonly datasets: readonly Dataset[] | undefined; readonly diagnostics: readonly Diagnostic[] } {
  const exclusions = (given.exclusions ?? []).map((each, index) => ({ number: index + 1, dataset: { value: 'main', place }, row: { matches: [], rows: 1 }, class: 'assignable cause', reason: 'bubble', requestedBy: 'a', approvedBy: 'b', date: '2026-05-04', place, ...each }))
  const study = { datasets: [source('main', given), ...more], exclusions, measurands: (given.measurands ?? ['dye']).map((id) => ({ id, name: id, unit: 'mg/L', place })) } as unknown as StudyDefinition
  const files = new Map(Object.entries(given.files).map(([path, content]) => [path, typeof content === 'string' ? encoder.encode(content) : content]))
  const { value, diagnostics } = readData(study, files)
  return { datasets: value, diagnostics }
}

/** Each observation as `line: field=value …`. */
function told(dataset: Dataset | undefined): readonly string[] {
  return (dataset?.observations ?? []).map((each) => {
    const fields = Object.entries(each.fields).map(([field, cell]) => `${field}=${cell.kind === 'number' || cell.kind === 'label' ? cell.value : cell.kind === 'below' || cell.kind === 'above' ? `${cell.kind} ${cell.bound}` : cell.kind}`)
    return `${dataset?.rows[each.row]?.line} ${each.measurand}: ${fields.join(' ')}${each.excluded === undefined ? '' : ` excluded ${each.excluded}`}`
  })
}

describe('one file', () => {
  test.each<readonly [string, string | Uint8Array, Given['columns'], readonly string[]]>([
    ['comma and point', 'Level,Area\n1,10.4\n2,20.9\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9']],
    ['semicolon and comma', 'Level;Area\n1;10,4\n0,5;5,25\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=0.5 response=5.25']],
    ['tab and comma', 'Level\tArea\n1\t10,4\n', undefined, ['2 dye: level=1 response=10.4']],
    ['pipe and comma', 'Level|Area\n1|10,4\n', undefined, ['2 dye: level=1 response=10.4']],
    ['comma, and commas in quotes', 'Level,Area\n"1,0","10,4"\n2,"20,9"\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9']],
    ['a line that says the delimiter', 'sep=;\nLevel;Area\n1;10,4\n', undefined, ['3 dye: level=1 response=10.4']],
    ['carriage returns alone', 'Level,Area\r1,10.4\r2,20.9\r', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9']],
    ['mixed line ends', 'Level,Area\r\n1,10.4\n2,20.9\r3,31\r\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9', '4 dye: level=3 response=31']],
    ['a heading of two lines', 'Level,"Peak\nArea"\n1,10.4\n', { level: 'Level', response: 'Peak Area' }, ['3 dye: level=1 response=10.4']],
    ['one column', 'Area\n10.4\n20.9\n', { response: 'Area' }, ['2 dye: response=10.4', '3 dye: response=20.9']],
    ['one column with commas', 'Area\n10,4\n20,9\n', { response: 'Area' }, ['2 dye: response=10.4', '3 dye: response=20.9']],
    ['trailing delimiters', 'Level,Area,\n1,10.4,\n2,20.9,,\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9']],
    ['trailing delimiters of rows only', 'Level,Area\n1,10.4,\n2,20.9,,\n', undefined, ['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9']],
    ['blank lines and lines of delimiters', '\n\nLevel,Area\n\n1,10.4\n,\n2,20.9\n\n', undefined, ['5 dye: level=1 response=10.4', '7 dye: level=2 response=20.9']],
    ['headings in line 40', `${Array.from({ length: 39 }, (_, index) => `Setting ${index + 1}: on\n`).join('')}Level,Area\n1,10.4\n2,20.9\n`, undefined, ['41 dye: level=1 response=10.4', '42 dye: level=2 response=20.9']],
    ['a byte order mark and quoted headings', '\ufeff"Level","Area"\n"1","10.4"\n', undefined, ['2 dye: level=1 response=10.4']],
    ['no-break spaces and a typographic minus', 'Level\u00a0,Area\n\u00a01,\u221210.4\n', undefined, ['2 dye: level=1 response=-10.4']],
    ['censored and empty', 'Level,Area\n1,<0.05\n2,>500\n3,ND\n4,\n5,0\n6,-0\n', undefined, ['2 dye: level=1 response=below 0.05', '3 dye: level=2 response=above 500', '4 dye: level=3 response=not detected', '5 dye: level=4 response=missing', '6 dye: level=5 response=0', '7 dye: level=6 response=0']],
    ['a heading that every object has', 'constructor,__proto__\n1,10.4\n', { level: 'constructor', response: '__proto__' }, ['2 dye: level=1 response=10.4']],
    ['an unmapped heading twice', 'Level,Note,Note,Area\n1,a,b,10.4\n', undefined, ['2 dye: level=1 response=10.4']],
  ])('%s', (_, content, columns, expected) => {
    const { datasets, diagnostics } = read({ files: { 'a.csv': content }, ...(columns === undefined ? {} : { columns }) })
    expect(diagnostics.filter((each) => each.severity === 'error')).toEqual([])
    expect(told(datasets?.[0])).toEqual(expected)
  })

  test('in UTF-16 and windows-1252', () => {
    const text = 'Level;Fl\u00e4che \u00b5S\n1;10,4\n'
    const little = Uint8Array.from([...text].flatMap((character) => [character.charCodeAt(0), 0]))
    const big = Uint8Array.from([...text].flatMap((character) => [0, character.charCodeAt(0)]))
    const western = Uint8Array.from([...text].map((character) => character.charCodeAt(0)))
    for (const bytes of [little, big, western]) expect(told(read({ files: { 'a.csv': bytes }, columns: { level: 'Level', response: 'Fläche µS' } }).datasets?.[0])).toEqual(['2 dye: level=1 response=10.4'])
  })
})

describe('what is refused', () => {
  test.each<readonly [string, string, readonly string[]]>([
    ['a number that could be read in two ways', 'Level;Area\n1;1,234\n2;2,345\n', ['data/ambiguous-decimal 2:3']],
    ['both decimal marks', 'Level;Area\n1;10,4\n2;20.95\n', ['data/mixed-decimal 2:3']],
    ['a row that is short', 'Level,Day,Area\n1,a\n2,a,20.9\n', ['data/broken-row 2:1']],
    ['a row that is long', 'Level,Area\n1,10,4\n2,20.9\n', ['data/broken-row 2:1']],
    ['texts for numbers', 'Level,Area\n1,NaN\n2,Infinity\n3,1e400\n4,=A1\n5,10 %\n6,#N/A\n', ['data/not-a-number 2:3', 'data/not-a-number 3:3', 'data/not-a-number 4:3', 'data/not-a-number 5:3', 'data/unit-in-cell 6:3', 'data/spreadsheet-error 7:3']],
    ['a cell behind a quoted line end', 'Day,Level,Area\n"a\nb",1,x\n', ['data/not-a-number 3:6']],
    ['a level that is censored', 'Level,Area\n<1,10.4\n', ['data/not-a-number 2:1']],
    ['a repeated heading', 'Level,Area,Area\n1,10.4,10.5\n', ['data/repeated-heading 1:12']],
    ['headings only', 'Level,Area\n', ['data/no-rows 1:-']],
    ['no headings', '1,10.4\n2,20.9\n', ['data/no-header 1:1']],
    ['a quote left open in the last row', 'Level,Area\n1,"10.4\n', ['data/broken-row 2:3']],
    ['a heading that differs by its last letter', 'Level,Areas\n1,10.4\n', ['data/missing-column 1:1']],
  ])('%s', (_, content, expected) => {
    const { datasets, diagnostics } = read({ files: { 'a.csv': content } })
    expect(datasets).toBeUndefined()
    expect(diagnostics.map((each) => `${each.code} ${each.place?.line ?? '-'}:${each.place?.column ?? '-'}`)).toEqual(expected)
  })
})

describe('several files', () => {
  const a = 'Level,Area\n1,10.4\n2,20.9\n'

  test('each in its own way, with values stated for each', () => {
    const { datasets } = read({ files: { 'a.csv': a, 'b.csv': 'x\nLevel;Area\n1;10,4\n' }, written: { 'a.csv': { fixed: { day: 'one' } }, 'b.csv': { fixed: { day: 'two' }, headerRow: 2 } } })
    expect(told(datasets?.[0])).toEqual(['2 dye: day=one level=1 response=10.4', '3 dye: day=one level=2 response=20.9', '3 dye: day=two level=1 response=10.4'])
    expect(datasets?.[0]?.files).toMatchObject([{ file: 'a.csv', delimiter: 'comma', decimal: 'point', headerRow: 1, rowsRead: 2, used: 2 }, { file: 'b.csv', delimiter: 'semicolon', decimal: 'comma', headerRow: 2, rowsRead: 1, used: 1 }])
  })

  test('a number stated for a file is a number', () => {
    const stated = (level: string): ReturnType<typeof read> => read({ files: { 'a.csv': a }, written: { 'a.csv': { fixed: { level } } }, columns: { response: 'Area' } })
    expect(told(stated('5.0').datasets?.[0])[0]).toBe('2 dye: level=5 response=10.4')
    for (const level of ['five', '0x10', '1e400', '5,0', '']) expect(stated(level).diagnostics.map((each) => each.code), level).toEqual(['data/not-a-number'])
  })

  test('with the same bytes are refused, unless something is stated that tells them apart', () => {
    expect(read({ files: { 'a.csv': a, 'b.csv': a } }).diagnostics.map((each) => `${each.code} ${each.place?.file}`)).toEqual(['data/repeated-row b.csv'])
    expect(read({ files: { 'a.csv': a, 'b.csv': a }, written: { 'b.csv': { fixed: { day: '2' } } } }).diagnostics).toEqual([])
  })

  test('a row of five cells in both is told with both places', () => {
    const long = 'Level,Area,Day,By,Vial\n1,10.4,mon,ak,A1\n'
    const { diagnostics } = read({ files: { 'a.csv': long, 'b.csv': `${long}2,20.9,mon,ak,A2\n` } })
    expect(diagnostics).toMatchObject([{ code: 'data/repeated-row', place: { file: 'b.csv', line: 2 }, related: [{ place: { file: 'a.csv', line: 2 } }] }])
  })

  test('one file for two datasets is read for each, and what is wrong with it is told once', () => {
    const content = 'Kind,Level,Area\nSTD,1,10.4\nBLK,,0.3\n'
    const files = { 'a.csv': content }
    const { datasets, diagnostics } = read({ files, rows: { Kind: ['STD'] } }, [source('blanks', { files, rows: { Kind: ['BLK'] }, columns: { response: 'Area' } })])
    expect(diagnostics).toEqual([])
    expect(datasets?.map(told)).toEqual([['2 dye: level=1 response=10.4'], ['3 dye: response=0.3']])
    expect(datasets?.[1]?.rows.map((row) => row.fate)).toEqual([{ kind: 'not used', rule: 'Kind is not BLK' }, { kind: 'used' }])
    const broken = { 'a.csv': 'Level,Area\n1,"10.4\n' }
    expect(read({ files: broken }, [source('again', { files: broken })]).diagnostics.map((each) => each.code)).toEqual(['data/broken-row'])
  })
})

describe('measurands', () => {
  const wide = { level: 'Level', response: { salt: 'Salt Area', dye: 'Dye Area' }, result: { dye: 'Dye mg/L' } }

  test('a wide layout gives one observation for each, empty where a cell is', () => {
    const { datasets } = read({ files: { 'a.csv': 'Level,Salt Area,Dye Area,Dye mg/L\n1,10.4,3,0.9\n2,,4,<0.1\n,,,\n' }, columns: wide, measurands: ['salt', 'dye', 'other'] })
    expect(told(datasets?.[0])).toEqual(['2 salt: level=1 response=10.4', '2 dye: level=1 response=3 result=0.9', '3 salt: level=2 response=missing', '3 dye: level=2 response=4 result=below 0.1'])
  })

  test('each missing column is told', () => {
    const { diagnostics } = read({ files: { 'a.csv': 'Level,Salt Area\n1,10.4\n' }, columns: wide, measurands: ['salt', 'dye'] })
    expect(diagnostics.map((each) => [each.code, each.expected])).toEqual([['data/missing-column', 'Dye Area'], ['data/missing-column', 'Dye mg/L']])
  })

  test('rows of a stranger are not used, and told once', () => {
    const { datasets, diagnostics } = read({ files: { 'a.csv': 'Name,Level,Area\ndye,1,10.4\nTotal,1,30\nTotal,2,40\n' }, columns: { measurand: 'Name', level: 'Level', response: 'Area' } })
    expect(told(datasets?.[0])).toEqual(['2 dye: measurand=dye level=1 response=10.4'])
    expect(datasets?.[0]?.files[0]).toMatchObject({ rowsRead: 3, used: 1, notUsed: 2, excluded: 0 })
    expect(diagnostics.map((each) => [each.code, each.severity, each.actual])).toEqual([['data/unknown-measurand', 'note', 'Total']])
  })

  test('a file of strangers only is refused', () => {
    const { datasets, diagnostics } = read({ files: { 'a.csv': 'Name,Level,Area\nDYE,1,10.4\n,2,40\n' }, columns: { measurand: 'Name', level: 'Level', response: 'Area' } })
    expect(datasets).toBeUndefined()
    expect(diagnostics).toMatchObject([{ code: 'data/no-rows', place: { line: 2 }, actual: 'DYE, an empty cell', expected: 'dye' }])
  })
})

describe('exclusions', () => {
  const files = { 'a.csv': 'Vial,Level,Area\nA,1,10.4\nB,2,20.9\n', 'b.csv': 'Vial,Level,Area\nA,1,10.6\n' }
  const row = (text: string, more: object = {}): Partial<Exclusion> => ({ row: { matches: [{ column: 'Vial', text }], rows: 1, ...more } })

  test('take out the row of the file they name', () => {
    const { datasets } = read({ files, exclusions: [row('A', { file: 'b.csv' })] })
    expect(told(datasets?.[0])).toEqual(['2 dye: level=1 response=10.4', '3 dye: level=2 response=20.9', '2 dye: level=1 response=10.6 excluded 1'])
    expect(datasets?.[0]?.files.map((each) => [each.file, each.used, each.excluded])).toEqual([['a.csv', 2, 0], ['b.csv', 0, 1]])
  })

  test.each<readonly [string, Partial<Exclusion>, string, number]>([
    ['two rows instead of one', row('A'), '2 rows', 2], ['no row', row('C'), 'no row with Vial = C', 0], ['no row of that file', row('B', { file: 'b.csv' }), 'no row with Vial = B; the nearest is A', 0],
    ['a text with a slip', { row: { matches: [{ column: 'Area', text: '20.8' }], rows: 1 } }, 'no row with Area = 20.8; the nearest is 20.9', 0],
    ['no such file', row('B', { file: 'c.csv' }), 'no file c.csv in the dataset; there are a.csv, b.csv', 0], ['texts of two rows', { row: { matches: [{ column: 'Vial', text: 'A' }, { column: 'Level', text: '2' }], rows: 1 } }, 'each of these texts, but never in one row', 0],
    ['an unknown heading', { row: { matches: [{ column: 'Tube', text: 'A' }], rows: 1 } }, 'no column Tube; there are Vial, Level, Area', 0], ['a heading that every object has', { row: { matches: [{ column: 'constructor', text: 'A' }], rows: 1 } }, 'no column constructor; there are Vial, Level, Area', 0],
  ])('%s is an error that lists what matches', (_, exclusion, actual, related) => {
    const { datasets, diagnostics } = read({ files, exclusions: [exclusion] })
    expect(datasets).toBeUndefined()
    expect(diagnostics).toMatchObject([{ code: 'data/unmatched-exclusion', place, actual }])
    expect(diagnostics[0]?.related?.length).toBe(related)
  })

  test('are not judged when a file could not be read', () => {
    expect(read({ files: { ...files, 'b.csv': '' }, exclusions: [row('A', { file: 'b.csv' })] }).diagnostics.map((each) => each.code)).toEqual(['data/empty-file'])
  })

  test('of other measurands of one row stand side by side', () => {
    const wide: Given = { files: { 'a.csv': 'Vial,Salt,Dye\nA,1,2\n' }, columns: { response: { salt: 'Salt', dye: 'Dye' } }, measurands: ['salt', 'dye'], exclusions: [{ ...row('A'), measurands: ['dye'] }, { ...row('A'), measurands: ['salt'] }] }
    expect(told(read(wide).datasets?.[0])).toEqual(['2 salt: response=1 excluded 2', '2 dye: response=2 excluded 1'])
  })
})

describe('a value without a level', () => {
  const lines = (given: Given): readonly (number | undefined)[] => read(given).diagnostics.filter((each) => each.code === 'data/empty-level').map((each) => each.place?.line)

  test('is refused where others have one, each line once', () => {
    expect(lines({ files: { 'a.csv': 'Level,Area\n1,10.4\n,10.4\n,0.1\n' } })).toEqual([3, 4])
    expect(lines({ files: { 'a.csv': 'Level,Salt,Dye\n1,10.4,3\n,10.4,3\n' }, columns: { level: 'Level', response: { salt: 'Salt', dye: 'Dye' } }, measurands: ['salt', 'dye'] })).toEqual([3])
  })

  test.each<readonly [string, Given]>([
    ['when no value has one', { files: { 'a.csv': 'Level,Area\n,10.4\n,10.5\n' } }],
    ['when the row holds no value', { files: { 'a.csv': 'Day,Level,Area\n1,1,10.4\n2,,\n' }, columns: { day: 'Day', level: 'Level', response: 'Area' } }],
    ['when the row is not selected', { files: { 'a.csv': 'Kind,Level,Area\nSTD,1,10.4\nMean,,10.5\n' }, rows: { Kind: ['STD'] } }],
    ['when the row is excluded', { files: { 'a.csv': 'Vial,Level,Area\nA,1,10.4\nB,,10.5\n' }, exclusions: [{ row: { matches: [{ column: 'Vial', text: 'B' }], rows: 1 } }] }],
  ])('is none %s', (_, given) => expect(read(given).diagnostics).toEqual([]))
})

test('what is read as another character is noted once for each column', () => {
  const { datasets, diagnostics } = read({ files: { 'a.csv': 'Vial,Level,Area\nS\u20131,1,10.4\nS\u00a02,2,\u221220.9\nS3,4,41\n\u00b5\u00e9,5,50\n' }, columns: { vial: 'Vial', level: 'Level', response: 'Area' } })
  expect(told(datasets?.[0]).slice(0, 2)).toEqual(['2 dye: vial=S-1 level=1 response=10.4', '3 dye: vial=S 2 level=2 response=-20.9'])
  expect(datasets?.[0]?.observations[0]?.fields['vial']?.text).toBe('S\u20131')
  expect(diagnostics.map((each) => [each.code, each.severity, each.place?.line, each.actual])).toEqual([['data/odd-character', 'note', 2, 'S(U+2013)1'], ['data/odd-character', 'note', 3, '(U+2212)20.9']])
})

test('an exclusion that names a measurand its row does not hold is refused', () => {
  const given: Given = { files: { 'a.csv': 'Vial,Name,Area\nA,dye,1\nB,salt,2\n' }, columns: { measurand: 'Name', response: 'Area' }, measurands: ['dye', 'salt'], exclusions: [{ row: { matches: [{ column: 'Vial', text: 'A' }], rows: 1 }, measurands: ['salt'] }] }
  expect(read(given).diagnostics).toMatchObject([{ code: 'data/unmatched-exclusion', actual: 'a row about dye', related: [{ place: { file: 'a.csv', line: 2 } }] }])
})

test('200 000 rows are read in less than 3 s of processor time', () => {
  const lines = Array.from({ length: 200_000 }, (_, index) => `${index},${(index * 0.1).toFixed(1)},${2 ** (index % 6)},${(10.3 * 2 ** (index % 6) + (index % 97) / 50).toFixed(2)},V${index % 40}`)
  const bytes = encoder.encode(`No,Time,Level,Area,Vial\n${lines.join('\n')}\n`)
  const started = process.cpuUsage()
  const { datasets } = read({ files: { 'a.csv': bytes } })
  const used = process.cpuUsage(started)
  expect(datasets?.[0]?.observations.length).toBe(200_000)
  expect((used.user + used.system) / 1e6).toBeLessThan(3 * 2) // twice the aim, since other tests share the machine
})

test('100 000 rows that are all wrong are told, and so are 20 000 rows that an exclusion matches', () => {
  const { diagnostics } = read({ files: { 'a.csv': `Level,Area\n${'x,y\n'.repeat(100_000)}` } })
  expect(diagnostics.length).toBe(200_000)
  const excluded = read({ files: { 'a.csv': `Vial,Level,Area\n${'A,1,2\n'.repeat(20_000)}` }, exclusions: [{ row: { matches: [{ column: 'Vial', text: 'A' }], rows: 20_000 } }] })
  expect(excluded.datasets?.[0]?.files[0]).toMatchObject({ excluded: 20_000 })
})

test('every faulty folder is told with place, found, expected and how to mend', async () => {
  const { check } = await import('../../src/pipeline.ts')
  const { shippedTemplate } = await import('../support/shipped-template.ts')
  const root = new URL('../../fixtures/faulty/data/', import.meta.url)
  const poor = readdirSync(root).flatMap((name) => {
    const file = (path: string): URL => new URL(`${name}/${path}`, root)
    const { diagnostics } = check({ path: 'study.yaml', bytes: readFileSync(file('study.yaml')) }, {
      program: { name: 'Assaywrit', version: '0' }, templates: ['validation-report'], template: shippedTemplate,
      read: (path) => (existsSync(file(path)) ? { path, bytes: readFileSync(file(path)) } : { problem: 'no such file', mend: 'Put it there' }),
    })
    return diagnostics.filter((each) => each.severity === 'error' && !(each.place?.line !== undefined && each.actual && each.expected && each.mend)).map((each) => `${name}: ${each.code}`)
  })
  expect(poor).toEqual([])
})

describe('one reading told twice', () => {
  const columns = { level: 'Level', injection: 'Inj', response: 'Area' }
  const twice = 'Level,Inj,Area\n1,1,10.4\n1,2,10.5\n1,1,10.6\n'

  test('is an error that names both lines', () => {
    expect(read({ files: { 'a.csv': twice }, columns }).diagnostics).toMatchObject([{ code: 'data/repeated-key', place: { line: 4 }, related: [{ place: { line: 2 } }] }])
  })

  test.each<readonly [string, Partial<Given>]>([
    ['injections are averaged', { average: ['injection'] }],
    ['a stated value tells the two apart', { files: { 'a.csv': 'Level,Inj,Area\n1,1,10.4\n', 'b.csv': 'Level,Inj,Area\n1,1,10.6\n' }, written: { 'a.csv': { fixed: { day: '1' } }, 'b.csv': { fixed: { day: '2' } } } }],
    ['one of the two is excluded', { files: { 'a.csv': 'Note,Level,Inj,Area\n,1,1,10.4\nbubble,1,1,10.6\n' }, exclusions: [{ row: { matches: [{ column: 'Note', text: 'bubble' }], rows: 1 } }] }],
    ['one of the two holds nothing', { files: { 'a.csv': 'Level,Inj,Area\n1,1,10.4\n1,1,\n' } }],
    ['a sequence starts anew in another file', { files: { 'a.csv': 'Seq,Area\n1,10.4\n2,10.5\n', 'b.csv': 'Seq,Area\n1,10.6\n' }, columns: { order: 'Seq', response: 'Area' } }],
  ])('is none when %s', (_, more) => expect(read({ files: { 'a.csv': twice }, columns, ...more }).diagnostics).toEqual([]))
})
