/** Where a page is read: on a screen, or on the paper of a PDF. */
export type Medium = 'screen' | 'paper'
