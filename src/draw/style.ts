/** How the sketch looks. Every selector starts from the class of its root, so a page can hold it inline. */
import type { TextStyle } from './textwidth.ts'

export const rootClass = 'pm-plan'

/** Sizes of the texts, in drawing units; none is below 11. */
export const textStyles = {
  wall: { size: 12.5, weight: 'bold' },
  figure: { size: 12, weight: 'plain' },
  governing: { size: 12, weight: 'bold' },
  bubble: { size: 12.5, weight: 'bold' },
  dimension: { size: 11.5, weight: 'plain' },
  centre: { size: 12, weight: 'plain' },
  force: { size: 12.5, weight: 'bold' },
  area: { size: 11.5, weight: 'plain' },
  legend: { size: 12, weight: 'plain' },
  scale: { size: 11.5, weight: 'plain' },
  north: { size: 13, weight: 'bold' },
} as const satisfies Record<string, TextStyle>

export type TextRole = keyof typeof textStyles

/** The same colours as the page; on its own the file falls back on the light ones. */
const colours = {
  ink: 'var(--ink,#1d1c1a)',
  soft: 'var(--soft,#6b675f)',
  paper: 'var(--paper,#fffdf8)',
  copper: 'var(--copper,#99491b)',
  wash: 'var(--wash,#f5efe3)',
} as const

const textColours: Record<TextRole, string> = {
  wall: colours.ink,
  figure: colours.copper,
  governing: colours.copper,
  bubble: colours.ink,
  dimension: colours.soft,
  centre: colours.ink,
  force: colours.copper,
  area: colours.soft,
  legend: colours.soft,
  scale: colours.soft,
  north: colours.ink,
}

const { ink, soft, paper, copper, wash } = colours

const rules: readonly (readonly [string, string])[] = [
  // A name may run from right to left; set about its middle it needs no other care.
  [
    'text',
    `font-family:Label,"Source Sans 3","Segoe UI",Arial,sans-serif;text-anchor:middle;unicode-bidi:plaintext;font-variant-numeric:tabular-nums lining-nums`,
  ],
  ['text.pm-start', 'text-anchor:start'],
  ['text.pm-end', 'text-anchor:end'],
  ['.pm-t-governing', 'text-decoration:underline;text-underline-offset:2.5px;text-decoration-thickness:1.4px'],
  ['.pm-mask', `fill:${paper};stroke:none`],
  ['.pm-mask-wash', `fill:${wash};stroke:none`],
  ['.pm-sheet', `fill:${paper}`],
  ['.pm-wash', `fill:${wash};stroke:none`],
  ['.pm-hatch', `fill:none;stroke:${soft};stroke-width:.5;opacity:.62`],
  ['.pm-hatch-dashed', 'stroke-dasharray:5 4'],
  ['.pm-swatch', `fill:${wash};stroke:${soft};stroke-width:.8`],
  ['.pm-load', `fill:${paper};stroke:${ink};stroke-width:1.1`],
  ['.pm-load-cross', `fill:none;stroke:${ink};stroke-width:1.1`],
  ['.pm-edge', `fill:none;stroke:${soft};stroke-width:1;stroke-linecap:square`],
  ['.pm-seam', `fill:none;stroke:${soft};stroke-width:.45`],
  ['.pm-opening', `fill:${paper};stroke:${soft};stroke-width:.9`],
  ['.pm-crossed', `fill:none;stroke:${soft};stroke-width:.6`],
  ['.pm-gridline', `fill:none;stroke:${soft};stroke-width:.6;stroke-dasharray:12 3 2 3`],
  ['.pm-bubble', `fill:${paper};stroke:${ink};stroke-width:1`],
  ['.pm-dimension', `fill:none;stroke:${soft};stroke-width:.7`],
  ['.pm-witness', `fill:none;stroke:${soft};stroke-width:.5`],
  ['.pm-tick', `fill:none;stroke:${ink};stroke-width:1.2`],
  ['.pm-wall', `fill:none;stroke:${ink}`],
  ['.pm-wall-core', `fill:none;stroke:${paper}`],
  ['.pm-wall-tint', 'opacity:.24'],
  ['.pm-governs', `fill:none;stroke:${ink};stroke-width:1`],
  ['.pm-shear', `fill:none;stroke:${copper};stroke-width:1.5`],
  ['.pm-force', `fill:${paper};stroke:${copper};stroke-width:1.8;stroke-linejoin:miter`],
  ['.pm-rest', `fill:none;stroke:${ink};stroke-width:.7;stroke-dasharray:5 3.5`],
  ['.pm-rest-wall', `fill:none;stroke:${soft};stroke-width:2.4;stroke-dasharray:5 3.5`],
  ['.pm-wall-sample', `fill:none;stroke:${ink};stroke-width:4`],
  ['.pm-level', `fill:none;stroke:${soft};stroke-width:.6;stroke-dasharray:7 4`],
  ['.pm-ground', `fill:none;stroke:${ink};stroke-width:2`],
  ['.pm-mast', `fill:none;stroke:${ink};stroke-width:3`],
  ['.pm-step', `fill:${wash};stroke:${ink};stroke-width:1.2;stroke-linejoin:miter`],
  ['.pm-step-line', `fill:none;stroke:${ink};stroke-width:.8`],
  ['.pm-face', `fill:${paper};stroke:none`],
  ['.pm-face-edge', `fill:none;stroke:${ink};stroke-width:1.8;stroke-linejoin:miter`],
  ['.pm-pier', `fill:${wash};stroke:${soft};stroke-width:.5`],
  ['.pm-void', `fill:${paper};stroke:${ink};stroke-width:1.3`],
  ['.pm-foot', `fill:none;stroke:${ink};stroke-width:2.4`],
  ['.pm-level-line', `fill:none;stroke:${soft};stroke-width:.8`],
  ['.pm-leader', `fill:none;stroke:${soft};stroke-width:.6`],
  ['.pm-leader-end', `fill:${soft};stroke:none`],
  ['.pm-mark', `fill:${paper};stroke:${ink};stroke-width:1.4`],
  ['.pm-mark-open', `fill:none;stroke:${ink};stroke-width:1.4`],
  ['.pm-mark-casing', `fill:none;stroke:${paper};stroke-width:2.6`],
  ['.pm-mark-full', `fill:${ink};stroke:none`],
  ['.pm-mark-ring', `fill:${ink};stroke:${paper};stroke-width:1.2`],
  ['.pm-legs', `fill:none;stroke:${ink};stroke-width:1.1;stroke-dasharray:1.6 2.4`],
  ['.pm-scale', `fill:${ink};stroke:${ink};stroke-width:.8`],
  ['.pm-scale-open', `fill:${paper};stroke:${ink};stroke-width:.8`],
  ['.pm-north', `fill:none;stroke:${ink};stroke-width:1.2`],
]

const textRules = (Object.keys(textStyles) as TextRole[]).map(role => {
  const { size, weight } = textStyles[role]
  return [
    `.pm-t-${role}`,
    `font-size:${size}px;font-weight:${weight === 'bold' ? 650 : 400};fill:${textColours[role]}`,
  ] as const
})

/** The rules of the classes that a drawing uses, and of no others. */
export function stylesheetOf(classes: ReadonlySet<string>): string {
  return [...rules, ...textRules]
    .filter(([selector]) => {
      const name = /\.([a-z-]+)$/.exec(selector)?.[1]
      return name === undefined || classes.has(name)
    })
    .map(([selector, body]) => `.${rootClass} ${selector}{${body}}`)
    .join('')
}
