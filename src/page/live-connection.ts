/** The line to the server. It is taken up again by itself, at the same address, after the server was started anew. */
import type { Hello, Update } from '../serve/message.ts'

export interface Heard {
  readonly hello: (hello: Hello) => void
  /** @param heard when it came, by the system's clock in milliseconds, for the bench */
  readonly update: (update: Update | string, heard: number) => void
  readonly lost: () => void
}

const AGAIN = 1000

/** @param of where the server tells of the page, such as `/d/3f/` @param at what the page was built from, as `run.version` */
export function connect(of: string, at: string, heard: Heard): void {
  let has = at
  const open = (): void => {
    const events = new EventSource(`${of}events?at=${encodeURIComponent(has)}`)
    // What the server says is its own JSON.
    events.addEventListener('hello', ({ data }) => heard.hello(JSON.parse(data) as Hello))
    events.addEventListener('message', ({ data, lastEventId }) => {
      const now = performance.timeOrigin + performance.now()
      has = lastEventId
      heard.update(JSON.parse(data) as Update | string, now)
    })
    events.addEventListener('error', () => {
      heard.lost()
      // Left to itself a browser may give up, or ask with what it had at first.
      events.close()
      setTimeout(open, AGAIN)
    })
  }
  open()
}
