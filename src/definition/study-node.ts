// The YAML tree of a study in which every node keeps its place. Scalars keep the text as typed, since `5.0` is not `5`.
import type { Place } from '../diagnostics/place.ts'

export type StudyNode = ScalarNode | ListNode | MapNode

export interface ScalarNode {
  readonly kind: 'scalar'
  /** As typed, without quotes. */
  readonly text: string
  readonly quoted: boolean
  readonly value: string | number | boolean | null
  readonly place: Place
}

export interface ListNode {
  readonly kind: 'list'
  readonly items: readonly StudyNode[]
  readonly place: Place
}

export interface MapNode {
  readonly kind: 'map'
  readonly entries: readonly MapEntry[]
  readonly place: Place
}

export interface MapEntry {
  readonly key: string
  readonly keyPlace: Place
  readonly value: StudyNode
}
