/** Files that a document names: pictures, a logo, a template. */
import { bad, type Outcome } from '../base/outcome.ts'

export interface Nearby {
  /**
   * @param path as the document writes it, relative to the folder that the document is in
   * @returns the file's bytes, or why there are none, in words that follow the path: `there is no such file`
   */
  readonly read: (path: string) => Outcome<Uint8Array>
}

/** Where a text stands alone, as in a pipeline that has no folder. */
export const nothingNearby: Nearby = { read: () => bad('files beside the document are not read here') }

/** For a pipeline that looks after its pictures itself: they stay in the tree as they are, and nothing is said of them. */
export const leftAlone: Nearby = { read: () => bad('files beside the document are left to the pipeline') }
