/** The rigid diaphragm solved a second way: three equations of equilibrium about the origin, eliminated with pivots. */

export interface DenseWall {
  /** Middle, direction and stiffness along it. */
  readonly x: number
  readonly y: number
  readonly c: number
  readonly s: number
  readonly k: number
}

export interface Load {
  readonly Fx: number
  readonly Fy: number
  /** About the origin. */
  readonly M: number
}

type Row = [number, number, number, number]

/** The force of each wall along its own direction. */
export function denseForces(walls: readonly DenseWall[], { Fx, Fy, M }: Load): readonly number[] {
  const rows: [Row, Row, Row] = [
    [0, 0, 0, Fx],
    [0, 0, 0, Fy],
    [0, 0, 0, M],
  ]
  for (const wall of walls) {
    const reach = [wall.c, wall.s, wall.x * wall.s - wall.y * wall.c]
    rows.forEach((row, i) => {
      reach.forEach((other, j) => {
        row[j] = (row[j] ?? 0) + wall.k * (reach[i] ?? 0) * other
      })
    })
  }
  const [u, v, phi] = solve(rows)
  return walls.map(({ x, y, c, s, k }) => k * (c * u + s * v + (x * s - y * c) * phi))
}

function solve(rows: [Row, Row, Row]): readonly [number, number, number] {
  for (let column = 0; column < 3; column++) {
    const pivot = [0, 1, 2]
      .slice(column)
      .reduce((best, i) => (Math.abs(at(rows, i, column)) > Math.abs(at(rows, best, column)) ? i : best), column)
    const [a, b] = [rows[column], rows[pivot]]
    if (!a || !b) throw new Error('three rows were expected')
    rows[column] = b
    rows[pivot] = a
    for (let i = column + 1; i < 3; i++) {
      const share = at(rows, i, column) / at(rows, column, column)
      const row = rows[i]
      if (row) for (let j = column; j < 4; j++) row[j] = (row[j] ?? 0) - share * at(rows, column, j)
    }
  }
  const phi = at(rows, 2, 3) / at(rows, 2, 2)
  const v = (at(rows, 1, 3) - at(rows, 1, 2) * phi) / at(rows, 1, 1)
  const u = (at(rows, 0, 3) - at(rows, 0, 2) * phi - at(rows, 0, 1) * v) / at(rows, 0, 0)
  return [u, v, phi]
}

const at = (rows: readonly Row[], i: number, j: number): number => rows[i]?.[j] ?? Number.NaN
