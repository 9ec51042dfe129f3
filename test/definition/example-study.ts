// A study that uses every key of the format, and a catalogue that knows the options in it. Numbers and names are invented.
export const exampleStudy = `format: 1
report:
  number: GHW-VR-014
  revision: 2
  supersedes: ../revision-1/record.json
  reason: one more run of the precision design
  title: Chloride and nitrate in process water by ion chromatography
  kind: full validation            # full validation | partial validation | verification | transfer
  date: 2026-04-17
  language: en
  template: validation-report
  organisation: Greywater Hollow Works laboratory
method: { number: GHW-M-031, revision: 4, technique: ion chromatography, scope: recirculated process water }
intended-use: Monthly monitoring against the site limit of 10 mg/L chloride and 5 mg/L nitrate.
people:
  prepared: { id: ak, name: Asta Kerrow, position: analyst }
  reviewed: [{ id: bl, name: Bram Lowick, position: second analyst }, { id: dn, name: Dara Nye, position: statistician }]
  approved: { id: cm, name: Corin Maddle, position: head of laboratory }
rules: { confidence: 95 %, decide-on: unrounded values }
measurands:
  chloride: { unit: mg/L, response: µS·min, name: Chloride }
  nitrate:  { unit: mg/L, response: µS·min }
data:
  calibration:
    files:
      - raw/cal-1.csv
      - { file: raw/cal-2.csv, decimal: comma, delimiter: semicolon, encoding: windows-1252, header-row: 4, fixed: { day: 2026-03-02 } }
    rows: { Type: [STD, CAL] }
    columns: { measurand: Analyte, level: Nominal, response: Area, day: Date, analyst: By, injection: Inj, vial: Vial }
    replicate: vial
    average: [injection]
    tokens: { not-detected: [n.a.], missing: '-' }
  blanks: { files: raw/blanks.csv, columns: { measurand: Analyte, response: Area } }
  spikes:
    files: [raw/spikes.csv]
    columns: { level: Nominal, response: { chloride: Area Cl, nitrate: Area NO3 }, result: { chloride: Conc Cl, nitrate: Conc NO3 } }
    through: linearity
    subtract-blank: blanks
    reportable: recomputed
exclusions:
  - { data: calibration, row: { Inj: 41, file: raw/cal-1.csv }, measurands: [chloride], class: assignable cause, reason: air bubble in the loop, reference: DEV-9, requested-by: ak, approved-by: bl, date: 2026-03-03 }
design: { linearity: { levels: 7, replicates: 2, assumed-rsd: 2 % } }
characteristics:
  linearity:
    data: calibration
    fit: straight line
    require:
      back-calculation-error: at most 15 %
      slope: { limit: above 1.9 µS·min/(mg/L), source: GHW-SOP-7, for: { nitrate: above 0.9 µS·min/(mg/L) } }
  comparison:
    - { name: low, data: spikes, measurands: nitrate, margin: 0.2 mg/L, decide-by: interval }
    - { name: high, data: spikes, margin: 2.0 mg/L }
not-performed:
  robustness: covered by development study GHW-DR-007
texts: { discussion: The feeds differ little., conclusion: "Suitable, with the remarks above." }
deviations: []
equipment: [{ Equipment: balance, Number: B-3 }]
materials: []
`
