/** A tab of the browser that prints one page after another, with scripts off and the network cut. */
import type { Page } from 'puppeteer-core'

/** Longest that one lot may take, in ms. */
const LONGEST = 120_000

/** Without margins of the browser's own; in one answer, which is much quicker than piece by piece. */
const sheet = {
  preferCSSPageSize: true,
  generateTaggedPDF: true,
  generateDocumentOutline: false,
  marginTop: 0,
  marginBottom: 0,
  marginLeft: 0,
  marginRight: 0,
} as const

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
      // Asked of the browser from outside, so that it holds with scripts off too.
      await client.send('Runtime.evaluate', { expression: 'document.fonts.ready.then(() => 0)', awaitPromise: true })
      const { data } = await client.send('Page.printToPDF', sheet, { timeout: LONGEST })
      return Buffer.from(data, 'base64')
    },
    close: () => page.close().catch(() => undefined),
  }
}
