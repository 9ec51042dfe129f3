// A whole study made from a seed: other measurands, units, column headings, people, layouts and limits each time. Its numbers are
// invented and never test a statistic; they test that the report says what the record holds, whatever the study looks like.
import { type Random, seededRandom } from './seeded-random.ts'

export interface GeneratedStudy {
  readonly study: string
  readonly files: ReadonlyMap<string, string>
  readonly measurands: readonly string[]
}

export interface GeneratedChoice {
  readonly seed: number
  readonly measurands: number
  /** Blocks to leave out. */
  readonly without?: readonly string[]
  /** Rows in another order than they were made. */
  readonly shuffled?: boolean
}

const syllables = ['ve', 'lor', 'mi', 'tas', 'qu', 'en', 'dra', 'pol', 'ix', 'sur', 'han', 'ob', 'ri', 'cal', 'tu']
const headings = {
  measurand: ['Compound', 'Component', 'Species'], level: ['Nominal', 'Amount', 'Std conc'], response: ['Area', 'Signal', 'Counts'], result: ['Found', 'Conc', 'Value'],
  day: ['Date', 'Tag', 'Day'], analyst: ['By', 'Operator', 'Init.'], condition: ['Setup', 'Line', 'Arm'], added: ['Spiked', 'Added'], native: ['Unspiked', 'Native'],
} as const

export function generatedStudy(choice: GeneratedChoice): GeneratedStudy {
  const random = seededRandom(choice.seed)
  const heading = Object.fromEntries(Object.entries(headings).map(([field, names]) => [field, random.pick(names as readonly string[])])) as Record<keyof typeof headings, string>
  const unit = random.pick(['mg/L', 'µg/L', 'mg/kg'])
  const responseUnit = random.pick(['mAU·s', 'counts', 'µS·min'])
  const scale = random.pick([1, 10, 100])
  const names = Array.from({ length: choice.measurands }, (_, index) => `${random.pick(syllables)}${random.pick(syllables)}${random.pick(syllables)}${index + 1}`)
  const semicolon = random.next() < 0.5
  const separator = semicolon ? ';' : ','
  const written = (value: number): string => (semicolon ? String(Number(value.toPrecision(6))).replace('.', ',') : String(Number(value.toPrecision(6))))
  const file = (columns: readonly string[], rows: readonly (readonly string[])[]): string =>
    [columns, ...(choice.shuffled ? random.shuffled(rows) : rows)].map((cells) => cells.join(separator)).join('\n') + '\n'
  const sensitivity = new Map(names.map((name) => [name, 40 + 80 * random.next()]))
  const each = <T>(make: (name: string) => readonly T[]): readonly T[] => names.flatMap(make)
  const rows = makeRows(random, names, each, sensitivity, scale, written)
  const people = random.shuffled(['Ada Quill', 'Ben Marsh', 'Cleo Varga', 'Dov Hale', 'Eira Stone'])
  const limits = { backCalculation: random.pick([15, 20, 2]), repeatability: random.pick([5, 8, 0.5]), intermediate: random.pick([10, 12]), detection: scale * random.pick([0.5, 1, 0.001]), recovery: random.pick([10, 15, 1]) }
  const blocks: Readonly<Record<string, string>> = {
    linearity: `  linearity:\n    data: curve\n    weights: 1/x\n    require:\n      back-calculation-error: at most ${limits.backCalculation} %\n`,
    detection: `  detection:\n    calibration: curve\n    blanks: empties\n    by: [blank scatter, calibration scatter]\n    govern: blank scatter\n    require: { detection-limit: at most ${limits.detection} ${unit} }\n`,
    accuracy: `  accuracy:\n    data: spikes\n    require: { recovery: between ${100 - limits.recovery} % and ${100 + limits.recovery} % }\n`,
    precision: `  precision:\n    data: days\n    runs: [day, analyst]\n    require: { repeatability-rsd: at most ${limits.repeatability} %, intermediate-precision-rsd: at most ${limits.intermediate} % }\n`,
    comparison: `  comparison:\n    data: arms\n    conditions: { column: condition, reference: one, other: two }\n    question: equivalence\n    margin: ${scale} ${unit}\n`,
    range: `  range:\n    claim: ${2 * scale} ${unit} to ${8 * scale} ${unit}\n`,
  }
  const kept = Object.entries(blocks).filter(([name]) => !(choice.without ?? []).includes(name)).map(([, text]) => text).join('')
  const dialect = semicolon ? ', delimiter: semicolon, decimal: comma' : ', delimiter: comma, decimal: point'
  const study = `format: 1
report:
  number: ${random.pick(['LX', 'QR', 'VT'])}-${random.integer(100, 999)}
  revision: 1
  title: ${random.pick(['Residues in feed', 'Trace components in brine', 'Markers in broth'])}
  kind: ${random.pick(['full validation', 'partial validation', 'verification'])}
  date: 2027-0${random.integer(1, 9)}-1${random.integer(0, 9)}
  language: en
  template: validation-report
method: { number: ${random.pick(['M-7', 'P-21'])}, technique: ${random.pick(['liquid chromatography', 'capillary electrophoresis'])} }
intended-use: ${random.pick(['Release of batches', 'Monitoring of a process'])}.
people:
  prepared: { id: p1, name: ${people[0]}, position: analyst }
  reviewed: { id: p2, name: ${people[1]}, position: reviewer }
  approved: { id: p3, name: ${people[2]}, position: head of laboratory }
measurands:
${names.map((name) => `  ${name}: { unit: ${unit}, response: ${responseUnit} }`).join('\n')}
data:
  curve: { files: [raw/curve.csv]${dialect}, columns: { measurand: ${heading.measurand}, level: ${heading.level}, response: ${heading.response} } }
  empties: { files: [raw/empties.csv]${dialect}, columns: { measurand: ${heading.measurand}, response: ${heading.response} } }
  spikes: { files: [raw/spikes.csv]${dialect}, columns: { measurand: ${heading.measurand}, level: ${heading.level}, added: ${heading.added}, native: ${heading.native}, result: ${heading.result} } }
  days: { files: [raw/days.csv]${dialect}, columns: { measurand: ${heading.measurand}, level: ${heading.level}, day: ${heading.day}, analyst: ${heading.analyst}, result: ${heading.result} } }
  arms: { files: [raw/arms.csv]${dialect}, columns: { measurand: ${heading.measurand}, condition: ${heading.condition}, result: ${heading.result} } }
characteristics:
${kept}texts: { conclusion: ${random.pick(['Suitable as described.', 'Suitable after the remarks above.'])} }
`
  return {
    study, measurands: names,
    files: new Map([
      ['raw/curve.csv', file([heading.measurand, heading.level, heading.response], rows.curve)],
      ['raw/empties.csv', file([heading.measurand, heading.response], rows.empties)],
      ['raw/spikes.csv', file([heading.measurand, heading.level, heading.added, heading.native, heading.result], rows.spikes)],
      ['raw/days.csv', file([heading.measurand, heading.level, heading.day, heading.analyst, heading.result], rows.days)],
      ['raw/arms.csv', file([heading.measurand, heading.condition, heading.result], rows.arms)],
    ]),
  }
}

type Rows = readonly (readonly string[])[]

/** Six levels in triplicate, ten blanks, three days by two analysts in triplicate at three levels, recovery three by three, two conditions of eight. */
function makeRows(
  random: Random, names: readonly string[], each: (make: (name: string) => Rows) => Rows, sensitivity: ReadonlyMap<string, number>, scale: number, written: (value: number) => string,
): Readonly<Record<'curve' | 'empties' | 'spikes' | 'days' | 'arms', Rows>> {
  const triplicate = [1, 2, 3]
  const noise = (spread: number): number => 1 + spread * random.normal()
  if (names.length === 0) throw new Error('a study needs a measurand')
  return {
    curve: each((name) => [1, 2, 4, 6, 8, 10].flatMap((level) => triplicate.map(() => [name, written(level * scale), written((level * (sensitivity.get(name) ?? 1) + 2) * noise(0.01))]))),
    empties: each((name) => Array.from({ length: 10 }, () => [name, written(2 + 0.8 * random.normal())])),
    spikes: each((name) => [2, 5, 8].flatMap((level) => triplicate.map(() => [name, written(level * scale), written(level * scale), written(0.2 * scale), written((level + 0.2) * scale * noise(0.02))]))),
    days: each((name) => [2, 5, 8].flatMap((level) => ['2027-01-04', '2027-01-05', '2027-01-06'].flatMap((day) => ['AQ', 'BM'].flatMap((analyst) => {
      const run = noise(0.015)
      return triplicate.map(() => [name, written(level * scale), day, analyst, written(level * scale * run * noise(0.01))])
    })))),
    arms: each((name) => ['one', 'two'].flatMap((condition) => Array.from({ length: 8 }, () => [name, condition, written(5 * scale * noise(0.02))]))),
  }
}
