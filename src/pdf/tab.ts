/** A tab of the browser that prints one page after another, with scripts off and the network cut. */
import type { Page } from 'puppeteer-core'

/** Longest that one lot may take, in ms. */
const LONGEST = 120_000

export interface Tab {
  /** @returns a tagged PDF of the page, on the sheets that its own style asks for */
  readonly print: (html: string) => Promise<Uint8Array>
  readonly close: () => Promise<void>
}

export async function openTab(page: Page): Promise<Tab> {
  const client = await page.createCDPSession()
  client.on('Fetch.requestPaused', ({ requestId }) => {
    // A tab that closes meanwhile has nothing to refuse any more.
    client.send('Fetch.failRequest', { requestId, errorReason: 'BlockedByClient' }).catch(() => undefined)
  })
  const [{ frameTree }] = await Promise.all([
    client.send('Page.getFrameTree'),
    client.send('Fetch.enable', { patterns: [{ urlPattern: '*' }] }),
    page.setJavaScriptEnabled(false),
    page.setOfflineMode(true),
  ])
  return {
    print: async html => {
      await client.send('Page.setDocumentContent', { frameId: frameTree.frame.id, html })
      return page.pdf({ preferCSSPageSize: true, tagged: true, outline: false, timeout: LONGEST })
    },
    close: () => page.close().catch(() => undefined),
  }
}
