/** Keeps what is being read where it is while the page changes above it. */

/** More children than this are searched by halves. */
const FEW = 16

/**
 * Does a thing to the page, and scrolls so that the first thing seen at the top of the window stays there.
 * @param page what changes
 */
export function holdStill(page: Element, act: () => void): void {
  // At its very top the page is not being read, and new things there are to be seen.
  if (scrollY < 1) {
    act()
    return
  }
  const chain = seenAtTop(page).map(element => ({ element, top: element.getBoundingClientRect().top }))
  act()
  const held = chain.find(({ element }) => element.isConnected && element.getClientRects().length > 0)
  if (!held) return
  const moved = held.element.getBoundingClientRect().top - held.top
  if (Math.abs(moved) >= 0.5) scrollBy({ top: moved, behavior: 'instant' })
}

/** The innermost element at the top of the window, and those around it. */
function seenAtTop(page: Element): readonly Element[] {
  const chain: Element[] = []
  for (let around: Element | undefined = page; around && chain.length < 8; ) {
    const inner = firstSeen([...around.children])
    // Within a formula the boxes stand in no order.
    if (!inner || inner.matches('.katex, svg')) break
    chain.unshift(inner)
    around = inner
  }
  return chain
}

function firstSeen(children: readonly Element[]): Element | undefined {
  const isSeen = (element: Element): boolean => element.getBoundingClientRect().bottom > 4
  if (children.length <= FEW) return children.find(isSeen)
  let low = 0
  let high = children.length - 1
  while (low < high) {
    const half = (low + high) >> 1
    const element = children[half]
    if (element && isSeen(element)) high = half
    else low = half + 1
  }
  return children[low]
}

/** True when some of an element is in the part of the window that nothing covers. */
export function isInSight(element: Element, covered: number): boolean {
  const { top, bottom } = element.getBoundingClientRect()
  return bottom > 0 && top < innerHeight - covered
}
