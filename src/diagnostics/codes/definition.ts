// Codes of the definition stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const definitionCodes = {
  'definition/not-yaml': { severity: 'error', help: 'The study cannot be read as YAML' },
  'definition/tab': { severity: 'error', help: 'A tab stands where YAML takes spaces only' },
  'definition/control-character': { severity: 'error', help: 'The study holds an invisible character, or is not stored as UTF-8' },
  'definition/yaml-feature': { severity: 'error', help: 'The study uses a part of YAML that programs read differently: anchors, tags, directives, keys that are no words' },
  'definition/several-documents': { severity: 'error', help: 'The file holds more than one YAML document' },
  'definition/too-deep': { severity: 'error', help: 'The study is nested deeper than any study needs' },
  'definition/too-long': { severity: 'error', help: 'The study is longer than any study needs; data belong into raw files' },
  'definition/empty-study': { severity: 'error', help: 'The study file holds no study' },
  'definition/ambiguous-word': { severity: 'error', help: 'A word that some YAML readers take for true, false or nothing stands without quotes' },
  'definition/ambiguous-number': { severity: 'error', help: 'A number is written in a form that programs read differently, such as 1,5 or 1e3' },
  'definition/duplicate-key': { severity: 'error', help: 'A key stands twice in one map, so one of the two would be lost' },
  'definition/wrong-type': { severity: 'error', help: 'A key holds another kind of value than the study format asks for' },
  'definition/unknown-unit': { severity: 'error', help: 'A unit is not in the table of units' },
  'definition/unknown-choice': { severity: 'error', help: 'A key holds a word that is not among its choices' },
  'definition/missing-key': { severity: 'error', help: 'A key that the study needs is absent' },
  'definition/unknown-key': { severity: 'error', help: 'A key is not known at this place' },
  'definition/unknown-name': { severity: 'error', help: 'A name is used that the study does not declare' },
  'definition/unusable-name': { severity: 'error', help: 'A name would break the ids of findings or the names of files' },
  'definition/duplicate-name': { severity: 'error', help: 'Two things of one kind have the same name, or names that differ only in the case of letters' },
  'definition/unreadable-criterion': { severity: 'error', help: 'A criterion is no phrase that the program knows' },
  'definition/unit-mismatch': { severity: 'error', help: 'A limit has another unit than the number it is held against' },
  'definition/contradiction': { severity: 'error', help: 'Two parts of the study cannot both hold' },
  'definition/same-person': { severity: 'error', help: 'One person stands where two different ones are needed' },
  'definition/path-outside': { severity: 'error', help: 'A path leaves the folder of the study' },
} as const satisfies Record<string, CodeEntry>
