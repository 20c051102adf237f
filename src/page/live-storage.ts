/** What a page remembers when it is loaded again. Kept by the browser, apart for each document. */

const keyOf = (name: string): string => `platemark ${location.pathname} ${name}`

export function kept<T>(name: string): T | undefined {
  try {
    const text = sessionStorage.getItem(keyOf(name)) ?? localStorage.getItem(keyOf(name))
    // Written by `keep`.
    return text === null ? undefined : (JSON.parse(text) as T)
  } catch {
    return undefined
  }
}

/** @param value undefined to forget it. A choice is kept for good, a state that is compared with as long as the tab is open. */
export function keep(name: string, value: unknown): void {
  try {
    const store = typeof value === 'boolean' ? localStorage : sessionStorage
    if (value === undefined) sessionStorage.removeItem(keyOf(name))
    else store.setItem(keyOf(name), JSON.stringify(value))
  } catch {
    // A browser may be told to keep nothing; the page then forgets when it is closed.
  }
}
