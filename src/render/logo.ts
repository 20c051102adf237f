/** The firm's mark in the title block. */
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Nearby } from '../read/nearby.ts'
import { dataAddress, pictureOf } from '../read/picture.ts'
import { diagnose, type Text } from '../read/text.ts'

/** A mark beyond this would weigh more than the page around it. */
const LARGEST = 300_000

const HELP = 'Name a PNG, JPEG, GIF, WebP or SVG file of up to 300 kB, relative to this document.'

/** @returns its `data:` address, or nothing where the front matter names none */
export function readLogo(entry: Text | undefined, nearby: Nearby): Result<string | undefined> {
  if (!entry) return good(undefined)
  const fault = (because: string): Result<undefined> =>
    bad([diagnose('error', 'logo-unread', entry.span, `the logo ${entry.text} cannot be shown: ${because}`, HELP)])
  const file = nearby.read(entry.text)
  if (!file.ok) return fault(file.because)
  if (file.value.length > LARGEST) return fault(`it has ${Math.ceil(file.value.length / 1000)} kB`)
  const picture = pictureOf(file.value)
  return picture.ok ? good(dataAddress(picture.value)) : fault(picture.because)
}
