/** Links that lead to another page, a mail, or a place in this document. */
const SAFE_LINK = /^(?:https?:|mailto:|[^:]*$|[^:]*[/?#])/i

/** True for a link that a page may hold: nothing in it acts when it is opened. */
export const isSafeLink = (url: string): boolean => SAFE_LINK.test(url)
