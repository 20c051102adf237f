/**
 * SHA-256 of a text, in hex digits. Our own, because loading Node's module of hashes takes longer
 * than working many a document.
 *
 * @param text taken as UTF-8
 * @source FIPS 180-4, section 6.2
 */
export function sha256(text: string): string {
  const bytes = padded(new TextEncoder().encode(text))
  const state = new Uint32Array(START)
  const words = new Uint32Array(64)
  for (let at = 0; at < bytes.byteLength; at += 64) takeBlock(bytes, at, state, words)
  return [...state].map(word => word.toString(16).padStart(8, '0')).join('')
}

/** The message, a one bit, zeros, and its length in bits at the end of the last block of 64 bytes. */
function padded(message: Uint8Array): DataView {
  const { length } = message
  const whole = new Uint8Array(64 * Math.ceil((length + 9) / 64))
  whole.set(message)
  whole[length] = 0x80
  const view = new DataView(whole.buffer)
  view.setUint32(whole.length - 8, Math.floor(length / 2 ** 29))
  view.setUint32(whole.length - 4, (length << 3) >>> 0)
  return view
}

/** Mixes one block into the state. @param words room for the message schedule */
function takeBlock(bytes: DataView, at: number, state: Uint32Array, words: Uint32Array): void {
  for (let t = 0; t < 16; t++) words[t] = bytes.getUint32(at + 4 * t)
  for (let t = 16; t < 64; t++) {
    const far = words[t - 15] ?? 0
    const near = words[t - 2] ?? 0
    const small0 = turned(far, 7) ^ turned(far, 18) ^ (far >>> 3)
    const small1 = turned(near, 17) ^ turned(near, 19) ^ (near >>> 10)
    words[t] = small1 + (words[t - 7] ?? 0) + small0 + (words[t - 16] ?? 0)
  }
  let [a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0] = state
  for (let t = 0; t < 64; t++) {
    const large1 = turned(e, 6) ^ turned(e, 11) ^ turned(e, 25)
    const first = (h + large1 + ((e & f) ^ (~e & g)) + (ROUND[t] ?? 0) + (words[t] ?? 0)) | 0
    const large0 = turned(a, 2) ^ turned(a, 13) ^ turned(a, 22)
    const second = (large0 + ((a & b) ^ (a & c) ^ (b & c))) | 0
    h = g
    g = f
    f = e
    e = (d + first) | 0
    d = c
    c = b
    b = a
    a = (first + second) | 0
  }
  const mixed = [a, b, c, d, e, f, g, h]
  for (let i = 0; i < 8; i++) state[i] = (state[i] ?? 0) + (mixed[i] ?? 0)
}

/** A word turned to the right. */
const turned = (word: number, by: number): number => (word >>> by) | (word << (32 - by))

/** The first 32 bits of what follows the point in the square roots of the first eight primes. */
const START: readonly number[] = [
  0x6a09e667, 0xbb67ae85, 0x3c6ef372, 0xa54ff53a, 0x510e527f, 0x9b05688c, 0x1f83d9ab, 0x5be0cd19,
]

/** The same of the cube roots of the first 64 primes. */
const ROUND: readonly number[] = [
  0x428a2f98, 0x71374491, 0xb5c0fbcf, 0xe9b5dba5, 0x3956c25b, 0x59f111f1, 0x923f82a4, 0xab1c5ed5, 0xd807aa98,
  0x12835b01, 0x243185be, 0x550c7dc3, 0x72be5d74, 0x80deb1fe, 0x9bdc06a7, 0xc19bf174, 0xe49b69c1, 0xefbe4786,
  0x0fc19dc6, 0x240ca1cc, 0x2de92c6f, 0x4a7484aa, 0x5cb0a9dc, 0x76f988da, 0x983e5152, 0xa831c66d, 0xb00327c8,
  0xbf597fc7, 0xc6e00bf3, 0xd5a79147, 0x06ca6351, 0x14292967, 0x27b70a85, 0x2e1b2138, 0x4d2c6dfc, 0x53380d13,
  0x650a7354, 0x766a0abb, 0x81c2c92e, 0x92722c85, 0xa2bfe8a1, 0xa81a664b, 0xc24b8b70, 0xc76c51a3, 0xd192e819,
  0xd6990624, 0xf40e3585, 0x106aa070, 0x19a4c116, 0x1e376c08, 0x2748774c, 0x34b0bcb5, 0x391c0cb3, 0x4ed8aa4a,
  0x5b9cca4f, 0x682e6ff3, 0x748f82ee, 0x78a5636f, 0x84c87814, 0x8cc70208, 0x90befffa, 0xa4506ceb, 0xbef9a3f7,
  0xc67178f2,
]
