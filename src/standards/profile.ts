/**
 * What a published standard brings: the settings that it reads, how it goes from hazard to the force of a
 * direction, and the rules that other stages ask for. What a profile leaves out is said, never guessed.
 */
import type { Diagnostic } from '../base/diagnostic.ts'
import { type Formula, sym } from '../base/formula.ts'
import type { Display } from '../base/kind.ts'
import type { Result } from '../base/ledger.ts'
import type { Span } from '../base/span.ts'
import type { Value, Word } from '../base/value.ts'
import type { Assumption } from '../model/scope.ts'
import type { Direction, SeismicGiven, SettingRule } from '../model/seismic.ts'
import { diagnose } from '../read/text.ts'

/** What the design of a building is worked from. */
export interface Desk {
  readonly given: SeismicGiven
  readonly display: Display
  /** Effective seismic weight of the building. */
  readonly W: Value
  /** Height of the structure above its base. */
  readonly height: Value
  readonly storeys: number
  readonly assume: (assumption: Assumption) => void
  readonly warn: (fault: Diagnostic) => void
}

/** What a stage of the design says, in the order in which it is read. */
export type Said =
  | { readonly kind: 'step'; readonly value: Value }
  /** A choice that the standard makes, in whole sentences; `word` can be quoted. */
  | { readonly kind: 'choice'; readonly word: Word }
  | { readonly kind: 'note'; readonly text: string }
  | { readonly kind: 'criteria'; readonly criteria: Criteria }
  | { readonly kind: 'check'; readonly check: Limited }

/** Values side by side with their clauses, and where they are criteria, what each says and which decides. */
export interface Criteria {
  readonly id: string
  readonly caption: string
  /** Head of the column of names. */
  readonly head: string
  readonly rows: readonly {
    readonly name: string
    readonly value: Value
    readonly says?: string
    readonly clause: string
  }[]
  readonly decides?: { readonly head: string; readonly row: number }
}

export interface Limited {
  readonly id: string
  readonly what: string
  readonly demand: Value
  readonly capacity: Value
  readonly reference: string
}

/** How the base shear is shared over the levels: in proportion to W h^k, with a part set apart for the top. */
export interface Vertical {
  /** A number that is 1 or 2 wherever it is constant. */
  readonly k: Value
  /** Force that acts at the highest level alone, beside its share of the rest. */
  readonly top?: Value
  readonly source: string
}

/** Limits of the force that the diaphragm of a level is designed for, as shares of its weight. */
export interface DiaphragmRule {
  readonly source: string
  readonly least: { readonly formula: Formula; readonly inputs: Readonly<Record<string, Value>> }
  readonly most: { readonly formula: Formula; readonly inputs: Readonly<Record<string, Value>> }
}

export interface DirectionDesign {
  readonly said: readonly Said[]
  /** Base shear. */
  readonly V: Value
  readonly vertical: Vertical
  readonly diaphragm?: DiaphragmRule
}

export interface Design {
  /** Ground motion, importance, and what follows from them for both directions. */
  readonly ground: readonly Said[]
  readonly directions: Readonly<Record<Direction, DirectionDesign>>
}

/** A number of the standard with its clause. */
export interface Ruled<T> {
  readonly value: T
  readonly clause: string
}

/** What the shares of variable load in the seismic weight are called in a table of areas. */
export type VariableLoad = 'snow' | 'storage' | 'live'

/** Rules that stages beside the forces ask for. Each is left out where the profile does not cover it. */
export interface Rules {
  /** Share of the plan across the force by which the mass is moved. */
  readonly accidental?: Ruled<number>
  /** Share of a variable load that counts as seismic weight, from the load itself in Pa. */
  readonly share?: Readonly<Partial<Record<VariableLoad, Ruled<(load: number) => number>>>>
  /** Amplification of accidental torsion: threshold of largest over average displacement, and its cap. */
  readonly amplification?: Ruled<{ readonly threshold: number; readonly most: number }>
  /** Largest over average storey drift (or displacement) from which a plan is torsionally irregular, and extremely so. */
  readonly torsion?: Ruled<{ readonly irregular: number; readonly extreme?: number }>
  /** Limits of the design storey drift over the storey's height, by what they hold for. */
  readonly drift?: readonly Ruled<{ readonly of: string; readonly limit: number }>[]
  /** Load combinations with earthquake, in the standard's letters. */
  readonly combinations?: readonly Ruled<string>[]
}

/** The rules in words, as messages and tables name them. */
export const ruleNames: Readonly<Record<keyof Rules, string>> = {
  accidental: 'accidental eccentricity',
  share: 'variable load in the seismic weight',
  amplification: 'amplification of accidental torsion',
  torsion: 'torsional irregularity',
  drift: 'limits of storey drift',
  combinations: 'load combinations',
}

export interface Profile {
  readonly name: string
  /** Other spellings of the name, without regard to capitals and spaces. */
  readonly aliases: readonly string[]
  readonly settings: readonly SettingRule[]
  readonly design: (desk: Desk) => Result<Design>
  readonly rules: Rules
  /** What the standard asks of the forces that is not worked here, each in a sentence. */
  readonly cautions?: readonly string[]
}

/** Says that a standard's own rule for a thing is not among those that are worked. */
export const notCovered = ({ name }: Pick<Profile, 'name'>, thing: string, at: Span): Diagnostic =>
  diagnose(
    'error',
    'standard-not-covered',
    at,
    `${name} has no rule here for ${thing}`,
    'This version does not cover it. State what follows from the standard yourself.',
  )

/** Settings that stand beside those of any standard. */
export const commonSettings: readonly SettingRule[] = [
  {
    name: 'accidental',
    key: 'accidental',
    what: 'the share of the plan by which the mass may be off',
    sym: sym('alpha', '\\alpha', 'share'),
    share: true,
  },
]

export const step = (value: Value): Said => ({ kind: 'step', value })
