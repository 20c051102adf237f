/** A building for the tests of standards: a plan of 20 m by 10 m on every level, and no walls. */
import { reading } from '../support/worked.ts'

export interface Storeys {
  /** Weight per area, from the lowest level up, with a unit. */
  readonly loads: readonly string[]
  /** Elevations, from the lowest level up, with a unit. */
  readonly elevations: readonly string[]
}

export const threeLevels: Storeys = { loads: ['6 kPa', '6 kPa', '4 kPa'], elevations: ['3 m', '6 m', '9 m'] }

const PLAN = '0 m, 0 m | 20 m, 10 m'

/** The document of a building under a standard; its levels are called L1, L2 and on. */
export function buildingUnder(
  standard: string,
  settings: string,
  { loads, elevations }: Storeys = threeLevels,
  units = 'SI',
): string {
  const names = loads.map((_, i) => `L${i + 1}`)
  return [
    `---\nstandard: ${standard}\nunits: ${units}\n---\n`,
    `\`\`\`levels\n| level | elevation |\n|---|---|\n${names.map((name, i) => `| ${name} | ${elevations[i]} |`).join('\n')}\n\`\`\`\n`,
    ...names.map(
      (name, i) =>
        `\`\`\`areas ${name}\n| area | from | to | load |\n|---|---|---|---|\n| All | ${PLAN} | ${loads[i]} |\n\`\`\`\n`,
    ),
    `\`\`\`seismic\n${settings}\n\`\`\`\n`,
    '```working\nseismic design\n```\n',
  ].join('\n')
}

export const under = (standard: string, settings: string, storeys?: Storeys, units?: string) =>
  reading(buildingUnder(standard, settings, storeys, units))
