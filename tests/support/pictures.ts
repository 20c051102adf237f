/** Small pictures made as the formats have it, for an invented site. */

export const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)

export const svg = (content: string, attributes = ''): string =>
  `<svg xmlns="http://www.w3.org/2000/svg" ${attributes}>${content}</svg>`

const word = (n: number) => [n >>> 24, (n >>> 16) & 255, (n >>> 8) & 255, n & 255]
const ascii = (text: string) => Array.from(text, sign => sign.charCodeAt(0))

/** Source: PNG specification, W3C, section 5. Check sums are left at zero: they are not looked at. */
export function png(width: number, height: number): Uint8Array {
  const chunk = (name: string, data: readonly number[]) => [...word(data.length), ...ascii(name), ...data, 0, 0, 0, 0]
  return new Uint8Array([
    ...ascii('\x89PNG\r\n\x1a\n'),
    ...chunk('IHDR', [...word(width), ...word(height), 8, 2, 0, 0, 0]),
    ...chunk('IDAT', [0, 1, 2, 3, 4]),
    ...chunk('IEND', []),
  ])
}

/**
 * Source: ITU-T T.81, annex B.
 * @param orientation of the camera, as Exif has it
 */
export function jpeg(width: number, height: number, orientation?: number): Uint8Array {
  const segment = (mark: number, data: readonly number[]) => [0xff, mark, ...word(data.length + 2).slice(2), ...data]
  const exif = (turn: number) => [
    ...ascii('Exif\0\0MM\0*'),
    ...[0, 0, 0, 8, 0, 1],
    ...[0x01, 0x12, 0, 3, 0, 0, 0, 1, 0, turn, 0, 0],
    ...[0, 0, 0, 0],
  ]
  return new Uint8Array([
    ...[0xff, 0xd8],
    ...(orientation === undefined ? [] : segment(0xe1, exif(orientation))),
    ...segment(0xc4, [0, 1, 2]),
    ...segment(0xc0, [8, ...word(height).slice(2), ...word(width).slice(2), 1, 1, 0x11, 0]),
    ...segment(0xda, [1, 1, 0, 0, 63, 0]),
    ...[1, 2, 3],
    ...[0xff, 0xd9],
  ])
}
