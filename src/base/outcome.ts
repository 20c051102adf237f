/** A value, or the reason why there is none. */
export type Outcome<T, R = string> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly because: R }

export const good = <T>(value: T): { readonly ok: true; readonly value: T } => ({ ok: true, value })
export const bad = <R>(because: R): { readonly ok: false; readonly because: R } => ({ ok: false, because })
