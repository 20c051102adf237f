/** Buildings with wind, for tests: boxes of plain walls with a level on each height. */

export interface Storey {
  readonly name: string
  /** Elevation, and the plan from the origin, in the unit of the building. */
  readonly at: number
  readonly size: readonly [x: number, y: number]
  /** Where the plan begins along x. */
  readonly from?: number
}

/** @param wind lines of the block `wind` @param unit of all lengths */
export function windy(storeys: readonly Storey[], wind: string, standard = 'ASCE 7-22', unit = 'ft'): string {
  const blocks = storeys.flatMap(({ name, size: [b, d], from = 0 }) => {
    const point = (x: number, y: number) => `${x} ${unit}, ${y} ${unit}`
    const wall = (wall: string, x1: number, y1: number, x2: number, y2: number, k: number) =>
      `| ${wall} | ${point(x1, y1)} | ${point(x2, y2)} | ${k} kip/in |`
    const [low, high] = [from, from + b]
    return [
      `\`\`\`areas ${name}\n| area | from | to | load |\n|---|---|---|---|\n| All | ${point(low, 0)} | ${point(high, d)} | 50 psf |\n\`\`\``,
      [
        `\`\`\`walls ${name}\n| wall | from | to | k |\n|---|---|---|---|`,
        wall('W', low, 0, low, d, 3),
        wall('E', high, 0, high, d, 1),
        wall('S', low, 0, high, 0, 2),
        wall('N', low, d, high, d, 1.5),
        '```',
      ].join('\n'),
    ]
  })
  const levels = storeys.map(({ name, at }) => `| ${name} | ${at} ${unit} |`)
  return [
    `---\nstandard: ${standard}\nunits: ${unit === 'ft' ? 'US' : 'SI'}\n---`,
    `\`\`\`levels\n| level | elevation |\n|---|---|\n${levels.join('\n')}\n\`\`\``,
    ...blocks,
    `\`\`\`wind\n${wind}\n\`\`\``,
  ].join('\n\n')
}
