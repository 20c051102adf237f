/** Finds the value that a dotted name asks for. The manual lists these names; keep it in step. */
import type { Result } from '../base/ledger.ts'
import { bad, good } from '../base/outcome.ts'
import type { Tabulation } from '../base/tabulation.ts'
import type { Value, Word } from '../base/value.ts'
import type { Construction } from '../model/construction.ts'
import type { Distribution } from './distribution.ts'
import { axisOf, cellOf, type Found, from } from './found.ts'
import type { LevelWork } from './level.ts'
import { pierShearsOf } from './pier-shears.ts'
import type { Pierced } from './pierced.ts'
import type { Redundancy } from './redundancy.ts'
import type { Moduli } from './stiffness.ts'
import type { TiedDistribution } from './tied.ts'

export function levelValue(level: LevelWork, path: readonly string[]): Found {
  const [head, ...rest] = path
  const [a, b, c, d] = rest
  if (rest.length > (head === 'alone' ? 5 : head === 'wall' || head === 'wind' || head === 'without' ? 4 : 3))
    return undefined
  switch (head) {
    case 'area':
    case 'perimeter':
      return rest.length === 0 ? from(level.plan(), plan => plan[head]) : undefined
    case 'size':
      return from(level.plan(), ({ size }) => axisOf(size, a))
    case 'corner':
      return from(level.plan(), ({ corners }) => axisOf(corners.find(({ name }) => name === a) ?? {}, b))
    case 'areas':
      return areaValue(level, a, b)
    case 'lines':
    case 'points':
      return from(
        level.mass(),
        mass => cellOf(mass[head], a, [b ?? '']) ?? momentOf(mass.parts, `${level.name}.${head}.${a}.${b}`),
      )
    case 'W':
      return rest.length === 0 ? from(level.mass(), ({ W }) => W) : undefined
    case 'I_p':
      return rest.length === 0 ? from(level.mass(), ({ Ip }) => Ip) : undefined
    case 'CM':
      return from(level.mass(), mass => axisOf(mass, a))
    case 'K':
      return from(level.rigidity(), ({ K }) => (a === 'xx' || a === 'yy' || a === 'xy' ? K[a] : undefined))
    case 'J':
      return rest.length === 0 ? from(level.rigidity(), ({ J }) => J) : undefined
    case 'D':
      return rest.length === 0 ? from(level.rigidity(), ({ D }) => D) : undefined
    case 'alpha':
      return rest.length === 0 ? from(level.rigidity(), ({ angle }) => angle) : undefined
    case 'CR':
      return from(level.rigidity(), rigidity => axisOf(rigidity, a))
    case 'e':
      return from(level.eccentricity(), e => axisOf(e, a))
    case 'ea':
      return from(level.acting(), ({ arm }) => axisOf(arm, a))
    case 'force':
      return from(level.forces(), forces => axisOf(forces ?? {}, a))
    case 'accidental':
      return rest.length === 0 ? from(level.forces(), forces => forces?.accidental) : undefined
    case 'wind':
      return windOf(level, rest)
    case 'storey':
      return from(level.distribution(), found => storeyShearOf(found, a, b))
    case 'strength':
    case 'lengths':
      return from(level.redundancy(), ({ sums, strengthStated }) =>
        strengthStated === (head === 'strength') ? axisOf(sums, a) : undefined,
      )
    case 'without':
      return from(level.redundancy(), found => valueWithout(found, rest.join('.'), level.name))
    case 'alone':
      return valueAlone(level, rest)
    case 'height':
      return rest.length === 0 ? tiedValue(level, ({ height }) => height) : undefined
    case 'moved':
      return tiedValue(level, ({ cases }) => {
        const moved = cases.find(each => each.case.name === b)?.tied.moved
        return a === 'x' || a === 'y' || a === 'turn' ? moved?.[a] : undefined
      })
    case 'meeting':
      return tiedValue(level, ({ cases }) => cases.find(each => each.case.name === a)?.tied.meeting)
    case 'wall':
      return wallValue(level, a ?? '', b, c, d)
    case 'T':
    case 'u':
    case 'v':
    case 'phi':
      return caseValue(level, head, a)
    case 'residual':
      return from(level.distribution(), ({ cases }) => {
        const residual = cases.find(each => each.case.name === b)?.residual
        return a === 'x' || a === 'y' || a === 'M' || a === 'ratio' ? residual?.[a] : undefined
      })
    case 'displacement':
      return from(level.displacements(), all =>
        cellOf(all.find(({ result }) => result.case.name === c)?.points, a, [`delta_${b}`]),
      )
    case 'drift':
      return from(level.displacements(), all => all.find(({ result }) => result.case.name === a)?.governing.value)
    case 'governing':
      return from(level.distribution(), distribution => governing(level.name, distribution, a))
    case 'sum':
      return (
        from(level.mass(), ({ sums }) => (a === 'Wx' || a === 'Wy' ? sums[a] : undefined)) ??
        from(level.rigidity(), ({ sums }) => sums.find(({ id }) => id === `${level.name}.sum.${a}`))
      )
    default:
      return undefined
  }
}

/** The whole storey shear of an earthquake, or what a case takes of that of its loading. */
function storeyShearOf(
  { loads, cases }: Distribution,
  axis: string | undefined,
  caseName: string | undefined,
): Value | undefined {
  const found =
    caseName === undefined
      ? loads.find(({ loading }) => loading === 'seismic')?.storey
      : cases.find(each => each.case.name === caseName)?.shear
  return axisOf(found ?? {}, axis)
}

/** Storey shears and eccentricities of wind hang on what stands above and on the walls; the rest on wind alone. */
function windOf(level: LevelWork, path: readonly string[]): Found {
  const least = path[0] === 'least'
  const [head, axis, ...more] = least ? path.slice(1) : path
  if (more.length === 0 && (head === 'storey' || head === 'e'))
    return from(level.distribution(), ({ loads }) => {
      const load = loads.find(({ loading }) => loading === (least ? 'least wind' : 'wind'))
      return axisOf((head === 'e' ? load?.eccentricity : load?.storey) ?? {}, axis)
    })
  return level.windValue(path)
}

function areaValue(level: LevelWork, name: string | undefined, key: string | undefined): Found {
  const part = from(level.plan(), ({ parts }) => {
    const found = parts.find(part => part.name === name)
    return key === 'A' || key === 'x' || key === 'y' ? found?.[key] : key === 'I_p' ? found?.Ip : undefined
  })
  return (
    part ??
    from(level.mass(), mass => {
      const load = cellOf(mass.areas, name, ['w'])
      return (
        cellOf(mass.areas, name, [key ?? '']) ??
        momentOf(mass.parts, `${level.name}.areas.${name}.${key}`) ??
        partOfLoad(load, key)
      )
    })
  )
}

/** What a load is worked from where part of it is variable. */
function partOfLoad(load: Value | undefined, key: string | undefined): Value | undefined {
  if (load?.origin.kind !== 'worked' || load.origin.span || !key) return undefined
  return [...load.origin.step.inputs.values()].find(({ id }) => id.endsWith(`.${key}`))
}

/** A moment of one of the parts, by its whole id: an area and a line may have one name. */
function momentOf(parts: Tabulation, id: string): Value | undefined {
  for (const { idOf, cell } of ['W_x', 'W_y', 'I'].map(name => parts.column(name))) {
    const at = parts.rows.findIndex((_, rowIdx) => idOf(rowIdx) === id)
    if (at !== -1) return cell(at)
  }
  return undefined
}

function caseValue(level: LevelWork, what: 'T' | 'u' | 'v' | 'phi', name: string | undefined): Found {
  return from(level.distribution(), ({ cases }) => {
    const found = cases.find(each => each.case.name === name)
    return what === 'T' ? found?.moment : found?.[what]
  })
}

/** A value of the storey without a wall or a line of them, by the rest of its id. */
function valueWithout({ losses, turning }: Redundancy, path: string, level: string): Value | undefined {
  for (const { rows, columns } of [losses, turning])
    for (const { idOf, cell } of columns) {
      const at = rows.findIndex((_, i) => idOf(i) === `${level}.without.${path}`)
      if (at !== -1) return cell(at)
    }
  return undefined
}

/** A value of the continuous walls; none where storeys are worked on their own. */
function tiedValue(level: LevelWork, pick: (tied: TiedDistribution) => Value | undefined): Found {
  const tied = level.tied()
  return tied && from(tied, pick)
}

/** The storey on its own, beside the distribution of continuous walls: only what is worked again has a name of its own. */
function valueAlone(level: LevelWork, path: readonly string[]): Found {
  if (!level.tied() || path[0] === 'alone') return undefined
  const id = [level.name, 'alone', ...path].join('.')
  const found = levelValue({ ...level, distribution: level.alone, tied: () => undefined }, path)
  return found?.ok && found.value.id !== id ? undefined : found
}

const tiedColumns: Readonly<Record<string, string>> = { delta: 'delta', theta: 'theta_t', M: 'M_b', Mt: 'M_t' }

function tiedWallValue(level: LevelWork, wall: string, key: string, caseName: string): Found {
  return tiedValue(level, ({ cases }) => {
    const tied = cases.find(each => each.case.name === caseName)?.tied
    const column = tiedColumns[key] ?? ''
    return cellOf(tied?.beams, wall, [column]) ?? cellOf(tied?.springs, wall, [column])
  })
}

function wallValue(
  level: LevelWork,
  wall: string,
  key: string | undefined,
  caseName: string | undefined,
  part: string | undefined,
): Found {
  const walls = level.walls()
  if (!walls.ok) return walls
  const given = walls.value.find(({ name }) => name === wall)
  if (!given) return undefined
  if (key === 'opening' || key === 'pier' || key === 'strip' || key === 'solid')
    return piercedValue(level, wall, [key, caseName ?? '', part ?? ''])
  if (part !== undefined) return undefined
  switch (key) {
    case 'k':
      return level.stiffness(wall)
    case 'h':
    case 'strength': {
      const stated = key === 'h' ? given.height : given.strength
      return stated && good(stated)
    }
    case 'L':
    case 'x':
    case 'y':
    case 'c':
    case 's': {
      const line = level.line(wall)
      return line?.ok ? good(line.value[key]) : line
    }
    case 'slenderness':
      return from(level.redundancy(), ({ walls }) => cellOf(walls, wall, ['h_L']))
    case 'EI':
    case 'GA': {
      const section = level.section(wall)
      return section && from(section, found => found?.[key])
    }
    case 'delta':
    case 'theta':
    case 'M':
    case 'Mt':
      return tiedWallValue(level, wall, key, caseName ?? '')
    case 'rho':
      return from(level.rigidity(), ({ walls }) => cellOf(walls, wall, ['rho']))
    case 'v':
      return from(level.distribution(), ({ design }) => cellOf(design, wall, ['v']))
    case 'case':
      return from(level.distribution(), ({ design, governingCase }) => governingCase(design.rows.indexOf(wall)))
    case 'V':
      if (caseName === undefined) return from(level.distribution(), ({ design }) => cellOf(design, wall, ['V']))
      return shearValue(level, wall, 'V', caseName)
    case 'Vd':
    case 'Vt':
      return shearValue(level, wall, key.replace('V', 'V_'), caseName ?? '')
    default:
      return undefined
  }
}

/** A part of a wall with openings: `solid`, or an opening, a pier or a strip with one of its own values. */
function piercedValue(level: LevelWork, wall: string, [what, name, key]: readonly [string, string, string]): Found {
  if (what === 'opening') {
    const found = openingValue(level, wall, name, key)
    if (found) return found
  }
  if (what === 'pier' && key === 'V') return pierShear(level, wall, name)
  const id = `${level.name}.wall.${wall}.${[what, name, key].filter(word => word !== '').join('.')}`
  const cut = level.pierced(wall)
  if (!cut) return undefined
  return from(cut, pierced => pierced && valuesOf(pierced).find(value => value.id === id))
}

function openingValue(level: LevelWork, wall: string, name: string, key: string): Found {
  return from(level.openings(), all => {
    const found = all.find(opening => opening.wall === wall && opening.name === name)
    return key === 'left' || key === 'sill' || key === 'width' || key === 'height' ? found?.[key] : undefined
  })
}

function pierShear(level: LevelWork, wall: string, name: string): Found {
  const shears = pierShearsOf(level, wall)
  return shears && from(shears, all => all.map(({ table }) => cellOf(table, name, ['V'])).find(value => value))
}

/** Every value that a wall with openings is worked through. */
function valuesOf({ holes, held, whole, groups, stripTable, steps }: Pierced): readonly Value[] {
  const tables = [held, whole, stripTable, ...groups].flatMap(table => table ?? [])
  const cells = tables.flatMap(({ rows, columns }) => columns.flatMap(({ cell }) => rows.map((_, i) => cell(i))))
  return [...holes.flatMap(({ a2, z2 }) => [a2, z2]), ...cells, ...steps]
}

function shearValue(level: LevelWork, wall: string, key: string, caseName: string): Found {
  return from(level.distribution(), ({ cases }) =>
    cellOf(cases.find(each => each.case.name === caseName)?.walls, wall, [key]),
  )
}

function governing(
  level: string,
  { design, governingWall, governingCase }: Distribution,
  key: string | undefined,
): Value | Word | undefined {
  const wall = design.rows[governingWall] ?? ''
  switch (key) {
    case 'wall':
      return {
        id: `${level}.governing.wall`,
        text: wall,
        because: 'the wall of the largest shear per length',
        about: `${level}.wall.${wall}.v`,
      }
    case 'case':
      return governingCase(governingWall)
    case 'V':
    case 'v':
      return cellOf(design, wall, [key])
    default:
      return undefined
  }
}

/** A construction's own value. */
export function constructionValue(read: () => Result<Construction>, moduli: Result<Moduli>, key: string): Found {
  const construction = read()
  if (!construction.ok) return construction
  const { t, nu, strength } = construction.value
  switch (key) {
    case 't':
      return good(t)
    case 'nu':
      return nu && good(nu)
    case "f'c":
    case "f'm":
      return strength?.id.endsWith(key) ? good(strength) : undefined
    case 'E':
    case 'G':
      return moduli.ok ? good(moduli.value[key]) : bad(moduli.because)
    default:
      return undefined
  }
}

/** Ids of a level, to offer near names: those that need no work to list. */
export function levelIds({ name, walls }: LevelWork): readonly string[] {
  const given = walls()
  const own = [
    'area',
    'perimeter',
    'W',
    'CM.x',
    'CM.y',
    'CR.x',
    'CR.y',
    'e.x',
    'e.y',
    'K.xx',
    'K.xy',
    'K.yy',
    'J',
    'force.x',
    'force.y',
    'storey.x',
    'storey.y',
    'size.x',
    'size.y',
    'governing.wall',
    'governing.case',
    'governing.V',
    'governing.v',
  ]
  const ofWalls = given.ok
    ? given.value
        .slice(0, 200)
        .flatMap(({ name }) => ['k', 'L', 'h', 'V', 'v', 'case'].map(key => `wall.${name}.${key}`))
    : []
  return [...own, ...ofWalls].map(id => `${name}.${id}`)
}
