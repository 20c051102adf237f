/** Rules of ASCE 7 that other stages ask for: shares of load, torsion, drift, combinations. */
import { unit } from '../base/unit.ts'
import type { Rules } from './profile.ts'

const psf = unit('psf').scale

/** Snow counts from a flat roof snow load of `from` psf on. */
const snow = (from: number, share: number) => (load: number) => (load > from * psf * (1 + 1e-12) ? share : 0)

export function asceRules(edition: 'ASCE 7-16' | 'ASCE 7-22'): Rules {
  const late = edition === 'ASCE 7-22'
  const drift = (of: string, limit: number) => ({
    value: { of, limit },
    clause: `${edition} Table 12.12-1 (unchecked)`,
  })
  const factors = `${edition} 2.3.6 (numbers of clauses and the factor of S unchecked)`
  const allowable = `${edition} 2.4.5 (numbers of clauses and the factor of S unchecked)`
  return {
    accidental: {
      value: 0.05,
      clause: `${edition} 12.8.4.2; taken in every case, though it may be left out of regular structures (unchecked)`,
    },
    share: {
      snow: {
        value: late ? snow(45, 0.15) : snow(30, 0.2),
        clause: `${edition} 12.7.2, ${late ? '15% where the snow load is more than 45 psf' : '20% where the snow load is more than 30 psf'} (unchecked)`,
      },
      storage: { value: () => 0.25, clause: `${edition} 12.7.2, areas of storage (unchecked)` },
      live: {
        value: () => 0,
        clause: `${edition} 12.7.2, live load of floors without storage does not count (unchecked)`,
      },
    },
    amplification: { value: { threshold: 1.2, most: 3 }, clause: `${edition} 12.8.4.3` },
    torsion: {
      value: { irregular: 1.2, extreme: 1.4 },
      clause: late ? `${edition} 12.3.2.1.1 (unchecked)` : `${edition} Table 12.3-1, types 1a and 1b`,
    },
    drift: [
      drift('up to 4 stories, not masonry, finishes that take the drift; risk category I, II', 0.025),
      drift('the same; III', 0.02),
      drift('the same; IV', 0.015),
      drift('masonry cantilever shear walls', 0.01),
      drift('other masonry shear walls', 0.007),
      drift('all other structures; risk category I, II', 0.02),
      drift('the same; III', 0.015),
      drift('the same; IV', 0.01),
    ],
    combinations: [
      { value: `1.2 D + E_v + E_h + L + ${late ? '0.15' : '0.2'} S`, clause: factors },
      { value: '0.9 D − E_v + E_h', clause: factors },
      { value: '1.0 D + 0.7 E_v + 0.7 E_h', clause: allowable },
      { value: `1.0 D + 0.525 E_v + 0.525 E_h + 0.75 L + ${late ? '0.1' : '0.75'} S`, clause: allowable },
      { value: '0.6 D − 0.7 E_v + 0.7 E_h', clause: allowable },
    ],
  }
}
