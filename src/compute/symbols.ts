/** Letters that several stages share. */
import { sym } from '../base/formula.ts'

export const x = sym('x', 'x', 'length')
export const y = sym('y', 'y', 'length')
export const x1 = sym('x_1', 'x_1', 'length')
export const y1 = sym('y_1', 'y_1', 'length')
export const x2 = sym('x_2', 'x_2', 'length')
export const y2 = sym('y_2', 'y_2', 'length')

/** Centre of mass and centre of rigidity. */
export const xm = sym('x_m', 'x_m', 'length')
export const ym = sym('y_m', 'y_m', 'length')
export const xr = sym('x_r', 'x_r', 'length')
export const yr = sym('y_r', 'y_r', 'length')

export const W = sym('W', 'W', 'force')
export const k = sym('k', 'k', 'stiffness')
export const L = sym('L', 'L', 'length')
/** Cosine and sine of a wall's direction. */
export const c = sym('c', 'c', 'number')
export const s = sym('s', 's', 'number')
/** Arm of a wall about the centre of rigidity. */
export const rho = sym('rho', '\\rho', 'length')

export const Kxx = sym('K_xx', 'K_{xx}', 'stiffness')
export const Kyy = sym('K_yy', 'K_{yy}', 'stiffness')
export const Kxy = sym('K_xy', 'K_{xy}', 'stiffness')
export const J = sym('J', 'J', 'torsionalStiffness')

export const Vx = sym('V_x', 'V_x', 'force')
export const Vy = sym('V_y', 'V_y', 'force')
export const T = sym('T', 'T', 'moment')

/** Eccentricities, inherent and accidental. */
export const ex = sym('e_x', 'e_x', 'length')
export const ey = sym('e_y', 'e_y', 'length')
export const eax = sym('e_ax', 'e_{a,x}', 'length')
export const eay = sym('e_ay', 'e_{a,y}', 'length')

/** Force of one level; V is the shear of a storey or a wall. */
export const Fx = sym('F_x', 'F_x', 'force')
export const Fy = sym('F_y', 'F_y', 'force')
export const V = sym('V', 'V', 'force')

/** Displacement of the centre of rigidity, and rotation. */
export const u0 = sym('u_0', 'u_0', 'displacement')
export const v0 = sym('v_0', 'v_0', 'displacement')
export const phi = sym('phi', '\\varphi', 'rotation')
