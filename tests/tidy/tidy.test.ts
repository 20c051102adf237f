/** Documents before and after, and what no document shows. UPDATE=1 rewrites the tidied ones on purpose. */
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { tidy } from '../../src/tidy/tidy.ts'
import { widthOf } from '../../src/tidy/width.ts'

const here = fileURLToPath(new URL('.', import.meta.url))
const root = fileURLToPath(new URL('../..', import.meta.url))

describe('a document before and after', () => {
  test.each(readdirSync(join(here, 'pairs')))('%s', name => {
    const tidied = tidy(readFileSync(join(here, 'pairs', name, 'before.md'), 'utf8'))
    const path = join(here, 'pairs', name, 'after.md')
    if (process.env.UPDATE === '1') writeFileSync(path, tidied)
    expect(existsSync(path), `${path} is missing; UPDATE=1 writes it`).toBe(true)
    expect(tidied).toBe(readFileSync(path, 'utf8'))
  })

  test('of what is not ours at the margin nothing is changed', () => {
    const text = readFileSync(join(here, 'pairs/left-alone/before.md'), 'utf8')
    expect(tidy(text)).toBe(text)
  })
})

describe('the ends of lines', () => {
  const text = '```equations  \na=1 ft  \n\nb=2 ft\n```  \nwords  '

  test('stay as they are, within a line and where the last one is missing', () => {
    expect(tidy(text)).toBe('```equations\na = 1 ft\n\nb = 2 ft\n```\nwords  ')
    expect(tidy(text.replaceAll('\n', '\r\n'))).toBe(tidy(text).replaceAll('\n', '\r\n'))
    expect(tidy('```equations\r\na=1 ft\nb=2 ft')).toBe('```equations\r\na = 1 ft\nb = 2 ft')
  })

  test('a fence with a return alone is left as it is, since editors do not agree where its lines end', () => {
    expect(tidy(text.replace('\n\n', '\r'))).toBe(text.replace('\n\n', '\r'))
  })

  test('a byte order mark stays, and what follows it is tidied', () => {
    expect(tidy(`\ufeff${text}`)).toBe(`\ufeff${tidy(text)}`)
  })
})

test('a line of marks within a fence keeps the indent without which it would close it', () => {
  const text = '```equations\na = 1 ft\n    ```\nb=1 ft\n```\n'
  expect(tidy(text)).toBe(text.replace('b=1', 'b = 1'))
})

// Unicode Standard Annex 11: wide characters take two columns of a fixed pitch, combining marks none.
test.each([
  ['wall', 4],
  ['é', 1],
  ['e\u0301', 1],
  ['作業場', 6],
  ['Ｗ', 2],
  ['12′-6″', 6],
  ['', 0],
])('%s takes %i columns', (text, columns) => {
  expect(widthOf(text)).toBe(columns)
})

describe('the house keeps to it', () => {
  const samples = readdirSync(join(root, 'samples'), { recursive: true, encoding: 'utf8' }).filter(
    path => path.endsWith('.md') && !path.endsWith('.worked.md'),
  )

  test.each(samples.sort())('%s is tidy', path => {
    const text = readFileSync(join(root, 'samples', path), 'utf8')
    expect(tidy(text)).toBe(text)
  })
})
