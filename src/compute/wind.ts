import type { Load } from './distribution.ts'
export interface Wind {
  readonly loads: readonly Load[]
}
export const windLoads = (_: Wind, __: readonly string[]): readonly Load[] => []
