/** The list of documents, told anew after each build. */

import { make } from './elements.ts'
import { connect } from './live-connection.ts'
import { turnInto } from './live-morph.ts'

export function followList(page: HTMLElement, of: string): void {
  const lost = make('p.live-lost', 'Not connected: this list is as it was.')
  connect(of, '', {
    hello: () => lost.remove(),
    update: update => {
      if (typeof update !== 'string') return
      const made = page.cloneNode(false) as HTMLElement
      made.innerHTML = update
      turnInto(page, made)
    },
    lost: () => page.before(lost),
  })
}
