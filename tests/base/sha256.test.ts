import { createHash } from 'node:crypto'
import { expect, test } from 'vitest'
import { sha256 } from '../../src/base/sha256.ts'

test('the hashes of the published examples come out', () => {
  // NIST, "Secure Hash Standard" example values: SHA256.pdf, one block and two blocks.
  expect(sha256('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad')
  expect(sha256('abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq')).toBe(
    '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
  )
})

test("a text of any length and script has the hash that Node's own module gives", () => {
  const reference = (text: string) => createHash('sha256').update(text).digest('hex')
  for (let length = 0; length < 200; length++) {
    const text = 'a'.repeat(length)
    expect(sha256(text)).toBe(reference(text))
  }
  for (const text of ['κτίριο é ≤ 12 ft', '\u{1f3d7}'.repeat(99), 'lone \ud800 half', 'x'.repeat(1_000_000)])
    expect(sha256(text)).toBe(reference(text))
})
