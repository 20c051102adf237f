/** What both editions of ASCE 7 share; each has a file of its own for what differs. */
import { together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { SettingRule } from '../model/seismic.ts'
import { type Ground, groundOf, type Motion } from './asce-ground.ts'
import { directionOf, type Numbering } from './asce-shear.ts'
import type { Desk, Profile, Rules } from './profile.ts'

interface Edition {
  readonly name: string
  readonly aliases: readonly string[]
  readonly numbering: Numbering
  readonly motion: Motion
  readonly settings: readonly SettingRule[]
  /** What it takes for granted of the procedure in a design category. */
  readonly procedure?: (desk: Desk, category: string) => void
  readonly rules: Rules
}

export const asceProfile = ({ name, aliases, numbering, motion, settings, procedure, rules }: Edition): Profile => ({
  name,
  aliases,
  settings,
  rules,
  design: desk => {
    const ground = groundOf(name, desk, motion)
    if (!ground.ok) return ground
    procedure?.(desk, ground.value.category)
    const along = (made: Ground) => ({
      x: directionOf(name, numbering, desk, made, 'x'),
      y: directionOf(name, numbering, desk, made, 'y'),
    })
    const directions = together(along(ground.value))
    return directions.ok ? good({ ground: ground.value.said, directions: directions.value }) : directions
  },
})
