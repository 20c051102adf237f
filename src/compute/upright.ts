/**
 * One wall over its whole height as a cantilever from the foundation, with flexure and shear.
 *
 * Heights count up from the foundation. The drift δ of a storey is how far its head moves along the wall past its
 * foot; a rotation θ of the wall's section leans it the same way; V is the shear of a storey and M the overturning
 * moment at its foot or head, both positive with δ.
 *
 *        M_t                θ_t      A storey of the wall. M_b = M_t + V h, and its curvature M/EI
 *      ┌──┐ → V        u_t ╱         turns the section by θ_t − θ_b = (M_b + M_t) h / 2EI.
 *    h │  │              ╱
 *      └──┘ ← V    u_b  │ θ_b
 *        M_b
 */

/** A storey of a cantilever: height in m, E I in N·m², G A_v in N. */
export interface Section {
  readonly h: number
  readonly EI: number
  readonly GA: number
}

/** Storeys of a cantilever from the foundation up, as their slope-deflection equations need them. */
export interface Cantilever {
  readonly storeys: number
  readonly h: Float64Array
  /** EI / h. */
  readonly g: Float64Array
  /** 12 EI / (h³ (1 + Φ)), with Φ = 12 EI / (GA h²). */
  readonly a: Float64Array
  /** The equations of its rotations, factored: the diagonal, and the multiplier below it. */
  readonly pivot: Float64Array
  readonly below: Float64Array
}

/**
 * Makes a cantilever ready: the moments at each level balance, M_t of the storey below being M_b of the storey
 * above, which gives three diagonals of equations for the rotations.
 *
 * @param sections from the foundation up, at least one; every h, EI and GA above zero
 * @source derived: beam with flexure and shear; Φ as in its usual stiffness matrix
 */
export function cantilever(sections: readonly Section[]): Cantilever {
  const n = sections.length
  const [h, g, a] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)]
  sections.forEach((section, i) => {
    h[i] = section.h
    g[i] = section.EI / section.h
    a[i] = (12 * section.EI) / (section.h ** 3 * (1 + (12 * section.EI) / (section.GA * section.h ** 2)))
  })
  const [pivot, below] = [new Float64Array(n), new Float64Array(n)]
  // Near end and far end of a storey, as a moment for a rotation of one.
  const near = (i: number) => at(g, i) + (at(a, i) * at(h, i) ** 2) / 4
  const far = (i: number) => (at(a, i) * at(h, i) ** 2) / 4 - at(g, i)
  for (let i = 0; i < n; i++) {
    const diagonal = near(i) + (i + 1 < n ? near(i + 1) : 0)
    if (i === 0) pivot[i] = diagonal
    else {
      const off = far(i)
      below[i] = off / at(pivot, i - 1)
      pivot[i] = diagonal - at(below, i) * off
    }
  }
  return { storeys: n, h, g, a, pivot, below }
}

/** Rotations of the section at the head of each storey. @param drift δ of each storey in m @param into rad */
export function rotationsOf({ storeys, h, a, pivot, below }: Cantilever, drift: Readings, into: Float64Array): void {
  for (let i = 0; i < storeys; i++) {
    const own = (at(a, i) * at(h, i) * at(drift, i)) / 2
    const above = i + 1 < storeys ? (at(a, i + 1) * at(h, i + 1) * at(drift, i + 1)) / 2 : 0
    into[i] = own + above - (i > 0 ? at(below, i) * at(into, i - 1) : 0)
  }
  for (let i = storeys - 1; i >= 0; i--) {
    const above = i + 1 < storeys ? at(below, i + 1) * at(into, i + 1) : 0
    into[i] = at(into, i) / at(pivot, i) - above
  }
}

/** Shear of each storey in N, from its drift and the rotations at its foot and head. */
export function shearsOf({ storeys, h, a }: Cantilever, drift: Readings, turned: Readings, into: Float64Array): void {
  for (let i = 0; i < storeys; i++) {
    const foot = i > 0 ? at(turned, i - 1) : 0
    into[i] = at(a, i) * (at(drift, i) - (at(h, i) * (foot + at(turned, i))) / 2)
  }
}

/** Overturning moment at the foot of each storey in N·m: that of all shears above. */
export function momentsOf({ storeys, h }: Cantilever, shear: Readings, into: Float64Array): void {
  let moment = 0
  for (let i = storeys - 1; i >= 0; i--) {
    moment += at(shear, i) * at(h, i)
    into[i] = moment
  }
}

/**
 * Stiffness of a cantilever between its storeys: entry (i, j) is the shear of storey i for a drift of one in storey j
 * alone. It is full, as a drift anywhere turns what stands above it; a wall in pure shear has a diagonal alone.
 *
 * @returns n × n, row by row, symmetric, N/m
 */
export function storeyStiffness(wall: Cantilever): Float64Array {
  const n = wall.storeys
  const all = new Float64Array(n * n)
  const [drift, turned] = [new Float64Array(n), new Float64Array(n)]
  for (let j = 0; j < n; j++) {
    drift[j] = 1
    rotationsOf(wall, drift, turned)
    shearsOf(wall, drift, turned, all.subarray(j * n, (j + 1) * n))
    drift[j] = 0
  }
  return all
}

type Readings = Readonly<Float64Array>

const at = (numbers: Readings, i: number): number => numbers[i] ?? Number.NaN
