/** A build that follows others is, byte for byte, the build that is made from nothing. */
import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { longForm } from '../../src/base/report.ts'
import { type Compiled, compileText } from '../../src/compile.ts'
import { nearbyOf } from '../../src/files.ts'
import { createRebuilder } from '../../src/live.ts'
import { type Host, livePageOf, publish } from '../../src/publish.ts'
import { longDocument } from '../bench/generate.mjs'
import { asset } from '../render/assets.ts'
import { type Random, randomFrom } from '../support/random.ts'

const root = fileURLToPath(new URL('../../', import.meta.url))

/** A host of its own for the clean build, so that nothing that one set is there for the other. */
const newHost = (): Host => ({
  version: '0.0.0',
  asset,
  sha256: text => createHash('sha256').update(text).digest('hex'),
})

/** All that a build gives, by what it is. */
function outcome(compiled: Compiled, host: Host): ReadonlyMap<string, string> {
  const files = (['html', 'md', 'json'] as const).flatMap(format => publish(compiled, 'd', format, true, host))
  const live = livePageOf(compiled, true, host)
  return new Map([
    ['messages', compiled.diagnostics.map(each => longForm(compiled.source, each)).join('\n\n')],
    ['live page', [live.title, live.around, ...live.blocks, JSON.stringify(live.island())].join('\n')],
    ...files.map(({ name, text }) => [name, text] as const),
  ])
}

/** An edit as engineers make them, good and bad. */
function edited(text: string, random: Random, past: readonly string[]): string {
  const lines = text.split('\n')
  const at = random.whole(0, lines.length - 1)
  const line = lines[at] ?? ''
  const put = (...next: readonly string[]) => lines.toSpliced(at, 1, ...next).join('\n')
  switch (random.whole(0, 11)) {
    case 0:
    case 1:
    case 2:
    case 3: {
      // A number is changed, and may grow or shrink.
      const numbers = [...text.matchAll(/\d+/g)]
      const found = random.pick(numbers)
      const next = random.pick(['7', '12', '0', '130', String(Number(found[0]) + 1)])
      return text.slice(0, found.index) + next + text.slice(found.index + found[0].length)
    }
    case 4: {
      const from = random.whole(0, text.length - 1)
      return text.slice(0, from) + text.slice(from + random.whole(1, 3))
    }
    case 5: {
      const from = random.whole(0, text.length)
      return (
        text.slice(0, from) +
        random.pick(['x', ' ', '|', '`', '#', '\n', '1', '{{roof.W}}', '"', '-']) +
        text.slice(from)
      )
    }
    case 6:
      return put(line, line)
    case 7:
      return put()
    case 8:
      return put(
        line,
        '',
        random.pick(['Words between.', '## New heading', 'See {{roof.CR.x}}.', '```equations\nnew_one = 3 ft\n```']),
        '',
      )
    case 9: {
      // A stretch of lines is moved.
      const cut = lines.splice(at, random.whole(1, 12))
      lines.splice(random.whole(0, lines.length), 0, ...cut)
      return lines.join('\n')
    }
    case 10:
      return past.length > 0 ? random.pick(past) : text
    default: {
      // A word is renamed, everywhere or at one place.
      const words = [...text.matchAll(/\b[A-Za-z_]\w*\b/g)]
      const word = random.pick(words)
      return random.whole(0, 1) === 0
        ? text.replaceAll(word[0], `${word[0]}x`)
        : `${text.slice(0, word.index)}${word[0]}x${text.slice(word.index + word[0].length)}`
    }
  }
}

/** Edits in a row, each build held to a clean one. A text that has gone to ruins begins afresh. EDITS=5 SEED=7 makes others, and more. */
function holds(path: string, start: string, edits: number): void {
  const [more, seed] = [Number(process.env.EDITS ?? 1), Number(process.env.SEED ?? 1)]
  const random = randomFrom(seed)
  const host = newHost()
  const rebuilder = createRebuilder(path, host)
  const nearby = nearbyOf(`${root}${path}`)
  const past = [start]
  let text = start
  for (let i = 0; i < more * edits; i++) {
    const follows = outcome(rebuilder.compile(text, nearby), host)
    const clean = outcome(compileText(path, text, nearby), newHost())
    for (const [what, bytes] of clean)
      if (follows.get(what) !== bytes)
        expect.fail(
          `${what} differs after edit ${i} of ${path}, seed ${seed}:\n${firstDifference(follows.get(what) ?? '', bytes)}\n\n${text}`,
        )
    past.push(text)
    text = i % 25 === 24 ? start : edited(text, random, past.slice(-8))
  }
}

function firstDifference(a: string, b: string): string {
  let at = 0
  while (at < a.length && a[at] === b[at]) at++
  return `follows: ${a.slice(Math.max(0, at - 120), at + 200)}\nclean:   ${b.slice(Math.max(0, at - 120), at + 200)}`
}

const read = (path: string): string => readFileSync(`${root}${path}`, 'utf8')

describe('a build that follows others', () => {
  test.each([
    ['samples/starter.md', 40],
    ['samples/boatyard.md', 8],
    ['samples/observatory.md', 8],
    ['tests/golden/two-levels/input.md', 20],
    ['tests/golden/openings/input.md', 12],
    ['tests/golden/seismic/input.md', 12],
    ['samples/quay-hostel.md', 6],
    ['tests/golden/wind-gable/input.md', 4],
    ['tests/golden/wind-stated/input.md', 8],
    ['samples/millrace.md', 6],
    ['samples/lindenkai.md', 6],
    ['samples/totara.md', 6],
  ])('of %s is that made from nothing', (path, edits) => {
    holds(path, read(path), edits)
  })

  test('of a long document is that made from nothing', () => {
    holds('long.md', longDocument(12, 120), 12)
  })
})
