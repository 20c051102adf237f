/** Reads a tape archive of plain files and folders, as POSIX 1003.1 (ustar) lays it out. */

export interface TarFile {
  /** Path within the archive, with forward slashes. */
  readonly name: string
  /** Permission bits. */
  readonly mode: number
  readonly bytes: Uint8Array
}

const BLOCK = 512

/** @returns its files; folders, links and other entries are left out */
export function filesInTar(archive: Uint8Array): readonly TarFile[] {
  const files: TarFile[] = []
  for (let at = 0; at + BLOCK <= archive.length; ) {
    const header = archive.subarray(at, at + BLOCK)
    const name = textAt(header, 0, 100)
    if (name === '') break
    const size = octalAt(header, 124, 12)
    const type = textAt(header, 156, 1)
    const prefix = textAt(header, 345, 155)
    const start = at + BLOCK
    if (type === '' || type === '0')
      files.push({
        name: prefix === '' ? name : `${prefix}/${name}`,
        mode: octalAt(header, 100, 8),
        bytes: archive.subarray(start, start + size),
      })
    at = start + Math.ceil(size / BLOCK) * BLOCK
  }
  return files
}

function textAt(header: Uint8Array, from: number, length: number): string {
  const field = header.subarray(from, from + length)
  const end = field.indexOf(0)
  return new TextDecoder().decode(end === -1 ? field : field.subarray(0, end))
}

const octalAt = (header: Uint8Array, from: number, length: number): number =>
  Number.parseInt(textAt(header, from, length).trim(), 8) || 0
