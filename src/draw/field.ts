/**
 * What is already on the sheet, asked by place.
 *
 * Ink lies in square cells, so that a question looks only at its neighbours and a
 * thousand walls cost little more per label than ten.
 */
import {
  type Bounds,
  type Box,
  boundsOfBox,
  boxesMeet,
  corners,
  distance,
  type Point,
  type Segment,
  strokeBox,
  times,
  union,
} from './geometry.ts'

/** `text`: a label or a figure; `ink`: a wall, arrow or symbol; `line`: a thin line, which text crosses at a price. */
type Kind = 'text' | 'ink' | 'line'

interface Obstacle {
  readonly kind: Kind
  readonly box: Box
  readonly bounds: Bounds
  readonly price: number
  /** The last question that came upon it, so that one in several cells is counted once. */
  seenBy: number
}

const cell = 24
/** More rows of cells than any sheet has, so that a column and a row make one number. */
const rowsApart = 65536
/** What a leader pays for passing over a wall or a symbol, and over a thin line. */
const leaderOverInk = 30
const leaderOverLine = 3
/** A leader that follows a thin line is lost in it. */
const leaderAlongLine = 40

type Cells = Map<number, Obstacle[]>

const none: readonly Obstacle[] = []

export class Field {
  /** Text and ink apart from thin lines: they refuse a label at once, and most labels on a crowded sheet are refused. */
  private readonly solid: Cells = new Map()
  private readonly thin: Cells = new Map()
  private readonly set: Box[] = []
  private held: Bounds | undefined
  private question = 0

  /** @param left @param right no label reaches beyond these; up and down the sheet may grow. */
  constructor(
    private readonly left: number,
    private readonly right: number,
  ) {}

  addText(box: Box): void {
    this.set.push(box)
    this.add({ kind: 'text', box, price: Number.POSITIVE_INFINITY })
  }

  addInk(box: Box): void {
    this.add({ kind: 'ink', box, price: Number.POSITIVE_INFINITY })
  }

  /** A thin line, with the price of setting a label across it. */
  addLine({ a, b }: Segment, price: number): void {
    this.add({ kind: 'line', box: strokeBox(a, b, 0.6), price })
  }

  /** Price of setting a label here: 0 on clear paper, infinite on other text, on ink or beyond the sheet. */
  price(box: Box): number {
    const bounds = boundsOfBox(box)
    if (bounds.x0 < this.left || bounds.x1 > this.right) return Number.POSITIVE_INFINITY
    const solid = this.priceAmong(this.solid, box, bounds)
    return solid === Number.POSITIVE_INFINITY ? solid : solid + this.priceAmong(this.thin, box, bounds)
  }

  /** Asked for every spot of every label, so it goes through the cells without a generator. */
  private priceAmong(cells: Cells, box: Box, bounds: Bounds): number {
    const question = ++this.question
    let sum = 0
    for (let col = Math.floor(bounds.x0 / cell); col <= Math.floor(bounds.x1 / cell); col++) {
      for (let row = Math.floor(bounds.y0 / cell); row <= Math.floor(bounds.y1 / cell); row++) {
        for (const obstacle of cells.get(col * rowsApart + row) ?? none) {
          if (obstacle.seenBy === question) continue
          obstacle.seenBy = question
          if (overlap(obstacle.bounds, bounds) && boxesMeet(obstacle.box, box)) sum += obstacle.price
          if (sum === Number.POSITIVE_INFINITY) return sum
        }
      }
    }
    return sum
  }

  /** Price of a leader, infinite when it runs through text. */
  leaderPrice({ a, b }: Segment): number {
    const line = strokeBox(a, b, 1.5)
    let sum = 0
    const keys = cellsOf(line)
    for (const { kind, box } of [...this.within(this.solid, keys), ...this.within(this.thin, keys)]) {
      if (!boxesMeet(box, line)) continue
      if (kind === 'text') return Number.POSITIVE_INFINITY
      sum += kind === 'ink' ? leaderOverInk : isAlong(box, line) ? leaderAlongLine : leaderOverLine
    }
    return sum
  }

  /** Boxes of all texts set so far, in the order in which they were set. */
  texts(): readonly Box[] {
    return this.set
  }

  /** Everything drawn so far lies within. */
  bounds(): Bounds | undefined {
    return this.held
  }

  private add(given: Omit<Obstacle, 'bounds' | 'seenBy'>): void {
    const bounds = boundsOfBox(given.box)
    const obstacle = { ...given, bounds, seenBy: 0 }
    this.held = this.held === undefined ? bounds : union(this.held, bounds)
    const cells = obstacle.kind === 'line' ? this.thin : this.solid
    for (const key of cellsOf(obstacle.box)) {
      const present = cells.get(key)
      if (present === undefined) cells.set(key, [obstacle])
      else present.push(obstacle)
    }
  }

  /** Everything in these cells, once each. */
  private *within(cells: Cells, keys: Iterable<number>): Generator<Obstacle> {
    const question = ++this.question
    for (const key of keys) {
      for (const obstacle of cells.get(key) ?? []) {
        if (obstacle.seenBy === question) continue
        obstacle.seenBy = question
        yield obstacle
      }
    }
  }
}

const isAlong = (a: Box, b: Box): boolean => Math.abs(Math.sin(a.angle - b.angle)) < 0.12

const overlap = (a: Bounds, b: Bounds): boolean => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1

/** A long skew stroke would fill a square of cells if its bounds were taken whole, so it is taken piece by piece. */
function cellsOf(box: Box): ReadonlySet<number> {
  const pieces = Math.max(1, Math.ceil(box.halfWidth / cell))
  const [right, left] = [
    corners({ ...box, halfHeight: 0 })[0] ?? box.at,
    corners({ ...box, halfHeight: 0 })[1] ?? box.at,
  ]
  const keys = new Set<number>()
  for (let idx = 0; idx < pieces; idx++) {
    const at = alongLine(left, right, (idx + 0.5) / pieces)
    const piece = { ...box, at, halfWidth: distance(left, right) / 2 / pieces }
    for (const key of cellsWithin(boundsOfBox(piece))) keys.add(key)
  }
  return keys
}

function alongLine(a: Point, b: Point, t: number): Point {
  const part = times(b, t)
  return { x: a.x * (1 - t) + part.x, y: a.y * (1 - t) + part.y }
}

function* cellsWithin({ x0, y0, x1, y1 }: Bounds): Generator<number> {
  for (let col = Math.floor(x0 / cell); col <= Math.floor(x1 / cell); col++) {
    for (let row = Math.floor(y0 / cell); row <= Math.floor(y1 / cell); row++) yield col * rowsApart + row
  }
}
