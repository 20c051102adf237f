/**
 * What an elevation of a wall shows, already worked and already printed.
 *
 * Metres: along the wall from its start, which stands on the left, and up from its foot.
 */
import type { Language } from '../base/language.ts'

/** A rectangle on the face of the wall. */
export interface FaceBox {
  readonly name: string
  readonly left: number
  readonly right: number
  readonly low: number
  readonly high: number
}

export interface ElevationView {
  /** One line for readers who cannot see the drawing, and a longer description. */
  readonly title: string
  readonly description: string
  readonly language: Language
  readonly length: number
  readonly height: number
  /** `size` is printed, such as `3 ft × 7 ft`. */
  readonly openings: readonly (FaceBox & { readonly size: string })[]
  readonly piers: readonly FaceBox[]
  /** Grid lines that the wall meets. */
  readonly grid: readonly { readonly name: string; readonly at: number }[]
  /** Levels at or above its head and at its foot, named and with their elevation where it is known. */
  readonly levels: readonly { readonly name: string; readonly elevation: string; readonly at: number }[]
  /** The shear along the head; without a direction it acts either way. */
  readonly shear?: { readonly printed: string; readonly toward?: 'start' | 'end'; readonly governs: boolean }
  /** Lines of words below: its name, then what it is made of and how it is seen. */
  readonly name: string
  readonly notes: readonly string[]
  /** Prints a length as a dimension, such as `24 ft`. */
  readonly dimension: (metres: number) => string
  readonly scaleUnit: { readonly metres: number; readonly name: string }
}
