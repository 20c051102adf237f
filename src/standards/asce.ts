/** What both editions of ASCE 7 share; each has a file of its own for what differs. */
import { together } from '../base/ledger.ts'
import { good } from '../base/outcome.ts'
import type { SettingRule } from '../model/seismic.ts'
import { type Ground, groundOf, type Motion } from './asce-ground.ts'
import { directionOf, type Numbering } from './asce-shear.ts'
import type { Profile, Rules } from './profile.ts'

interface Edition {
  readonly name: string
  readonly aliases: readonly string[]
  readonly numbering: Numbering
  readonly motion: Motion
  readonly settings: readonly SettingRule[]
  readonly rules: Rules
}

export const asceProfile = ({ name, aliases, numbering, motion, settings, rules }: Edition): Profile => ({
  name,
  aliases,
  settings,
  rules,
  design: desk => {
    const ground = groundOf(name, desk, motion)
    if (!ground.ok) return ground
    const along = (made: Ground) => ({
      x: directionOf(name, numbering, desk, made, 'x'),
      y: directionOf(name, numbering, desk, made, 'y'),
    })
    const directions = together(along(ground.value))
    return directions.ok ? good({ ground: ground.value.said, directions: directions.value }) : directions
  },
})
