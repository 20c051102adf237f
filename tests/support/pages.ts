/** Whole pages, opened in a browser, with what they complain of and what they ask the network for. */
import { createHash } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import type { Page } from 'puppeteer-core'
import { compileText } from '../../src/compile.ts'
import { nearbyOf } from '../../src/files.ts'
import { type Host, publish } from '../../src/publish.ts'
import { asset } from '../render/assets.ts'

const host: Host = {
  version: '0.0.0',
  asset,
  sha256: text => createHash('sha256').update(text).digest('hex'),
}

const root = fileURLToPath(new URL('../../', import.meta.url))

/** @param draft true to build a page with its faults in boxes */
export const htmlOf = (text: string, path = 'calc.md', draft = false): string =>
  publish(compileText(path, text, nearbyOf(`${root}${path}`)), 'calc', 'html', draft, host)[0]?.text ?? ''

export const sourceOf = (path: string): string => readFileSync(`${root}${path}`, 'utf8')

/** Every sample and every chapter of the manual, by its path. */
export const samplePaths: readonly string[] = ['samples', 'samples/manual'].flatMap(folder =>
  readdirSync(`${root}${folder}`)
    .filter(name => name.endsWith('.md'))
    .map(name => `${folder}/${name}`),
)

export const samplePages: readonly (readonly [string, string])[] = samplePaths.map(path => [
  path,
  htmlOf(sourceOf(path), path),
])

/** Records in a list what a page says to its console, throws, or asks the network for. */
export function listen(page: Page, complaints: string[]): void {
  page.on('console', message => complaints.push(message.text()))
  page.on('pageerror', error => complaints.push(String(error)))
  page.on('request', request => {
    if (!/^(?:data|about):/.test(request.url())) complaints.push(request.url())
  })
}
