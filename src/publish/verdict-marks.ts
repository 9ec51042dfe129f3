// The mark that stands before each verdict word, so that a verdict never depends on its colour.
import type { VerdictNode } from '../present/document.ts'

export const verdictMarks: Readonly<Record<VerdictNode['word'], string>> = { 'meets': '✓', 'misses': '✗', 'not evaluable': '○', 'not performed': '–', 'information only': '•' }
