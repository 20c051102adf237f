/** Formulas of walls that run through several levels: slope deflection, and movements added up from the foundation. */
import { formula, sym } from '../base/formula.ts'
import { bending, shearing } from './section.ts'
import { c, k, phi, rho, s, u0, V, v0, xm, xr, ym, yr } from './symbols.ts'

export const storeyHeight = sym('h_s', 'h_s', 'length')
const z = sym('z', 'z', 'length')
const zb = sym('z_b', 'z_b', 'length')
const shearShape = sym('Phi', '\\Phi', 'number')
const sway = sym('a', 'a', 'stiffness')
const along = sym('delta', '\\delta', 'displacement')
export const foot = sym('theta_b', '\\theta_b', 'rotation')
export const head = sym('theta_t', '\\theta_t', 'rotation')
const Mt = sym('M_t', 'M_t', 'moment')
const Mb = sym('M_b', 'M_b', 'moment')
export const moved = {
  x: sym('d_x', 'd_x', 'displacement'),
  y: sym('d_y', 'd_y', 'displacement'),
  turn: sym('Theta', '\\Theta', 'rotation'),
}
export const axisMoved = { x: sym('D_x', 'D_x', 'displacement'), y: sym('D_y', 'D_y', 'displacement') }
const below = {
  x: sym('D_xb', 'D_{x,b}', 'displacement'),
  y: sym('D_yb', 'D_{y,b}', 'displacement'),
  turn: sym('Theta_b', '\\Theta_b', 'rotation'),
}
export const apart = sym('Delta_M', '\\Delta M', 'moment')
export const greatest = sym('M_max', 'M_{\\text{max}}', 'moment')
const meets = sym('R', 'R', 'residual')

const HEIGHTS = 'elevations of the levels'
const SLOPES = 'slope deflection of a beam with flexure and shear (derived)'
const RIGID = 'small rotation of a rigid diaphragm'

export const tiedFormulas = {
  height: formula({ gives: storeyHeight, body: 'z - z_b', of: [z, zb], source: HEIGHTS }),
  lowest: formula({ gives: storeyHeight, body: 'z', of: [z], source: `${HEIGHTS}; the foundation is at 0` }),
  shape: formula({
    gives: shearShape,
    body: '12*EI/(GA*h_s^2)',
    of: [bending, shearing, storeyHeight],
    source: SLOPES,
  }),
  sway: formula({
    gives: sway,
    body: '12*EI/(h_s^3*(1 + Phi))',
    of: [bending, storeyHeight, shearShape],
    source: SLOPES,
  }),
  along: formula({ gives: along, body: 'c*u_0 + s*v_0 + rho*phi', of: [c, u0, s, v0, rho, phi], source: RIGID }),
  shear: formula({
    gives: V,
    body: 'a*(delta - h_s*(theta_b + theta_t)/2)',
    of: [sway, along, storeyHeight, foot, head],
    source: SLOPES,
  }),
  stated: formula({ gives: V, body: 'k*delta', of: [k, along], source: 'stated stiffness, storey by storey' }),
  head: formula({
    gives: Mt,
    body: 'EI*(theta_t - theta_b)/h_s - V*h_s/2',
    of: [bending, head, foot, storeyHeight, V],
    source: SLOPES,
  }),
  foot: formula({ gives: Mb, body: 'M_t + V*h_s', of: [Mt, V, storeyHeight], source: 'statics' }),
  movedX: formula({ gives: axisMoved.x, body: 'D_xb + u_0 + phi*y_r', of: [below.x, u0, phi, yr], source: RIGID }),
  movedY: formula({ gives: axisMoved.y, body: 'D_yb + v_0 - phi*x_r', of: [below.y, v0, phi, xr], source: RIGID }),
  turned: formula({ gives: moved.turn, body: 'Theta_b + phi', of: [below.turn, phi], source: RIGID }),
  massX: formula({ gives: moved.x, body: 'D_x - Theta*y_m', of: [axisMoved.x, moved.turn, ym], source: RIGID }),
  massY: formula({ gives: moved.y, body: 'D_y + Theta*x_m', of: [axisMoved.y, moved.turn, xm], source: RIGID }),
  meeting: formula({
    gives: meets,
    body: 'Delta_M/M_max',
    of: [apart, greatest],
    source: 'moments meet at each level',
  }),
}
