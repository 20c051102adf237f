/** A thing made when it is first asked for: most documents ask for one standard, or for none. */
export function lazily<T>(make: () => T): () => T {
  let made: { readonly value: T } | undefined
  return () => {
    made ??= { value: make() }
    return made.value
  }
}
