import type { AxionSector } from '../geometry/axions.ts'
import type { Candidate } from './candidate.ts'
import { ofAxions, SOURCES } from './described.ts'
import type { RecordSet, ValueField, ValueType } from './observable.ts'
import { memberLists } from './sections.ts'

type Read = (candidate: Candidate, scale: number) => AxionSector | undefined

/** Closer than a factor of e in Lambda^4, scales are not widely separated. */
const closeScales = Math.LOG10E / 4

const CONVENTION =
  'M_pl = 1, L = -G dtheta dtheta - sum Lambda^4 (1 - cos 2 pi q theta), theta of period 1; prefactors of order one set to 1'
const NEEDS = 'the polytope is not favourable, so toric divisors do not give all axions'

const none = new Float64Array(0)

/** A set of axions with its fields; the instantons on `of` count. */
function axionSet(name: string, description: string, read: Read): RecordSet {
  const field = (
    entry: Parameters<typeof ofAxions>[0],
    column: (sector: AxionSector) => ArrayLike<number>,
    type: ValueType = 'number',
    undefinedWhen?: string,
  ): ValueField => ({
    kind: 'value',
    type,
    ...ofAxions({ convention: CONVENTION, source: SOURCES.axions, ...entry }),
    ...(undefinedWhen ? { undefinedWhen } : {}),
    column: (candidate, scale) => {
      const sector = read(candidate, scale)
      return sector === undefined ? none : column(sector)
    },
  })
  return {
    kind: 'records',
    ...ofAxions({
      name,
      description,
      convention:
        'independent divisors by falling Lambda; those whose scales are equal are diagonalised together',
      formula: '\\{\\theta_a\\}',
      source: SOURCES.axions,
    }),
    undefinedWhen: NEEDS,
    size: (candidate, scale) => read(candidate, scale)?.decayConstants.length ?? NaN,
    fields: [
      field(
        {
          name: 'decayConstant',
          description: 'Decay constant, with the heavier axions frozen.',
          unit: 'M_pl',
          formula: 'f_a = \\frac{1}{2\\pi L_{aa}},\\quad \\tfrac12 M = L L^T',
        },
        ({ decayConstants }) => decayConstants,
      ),
      field(
        {
          name: 'log10Mass',
          description: 'log10 of the mass in units of M_pl.',
          formula: '\\log_{10} m_a,\\quad m_a = \\Lambda_a^2 / f_a',
        },
        ({ logMasses }) => logMasses,
      ),
      field(
        {
          name: 'log10Lambda',
          description: 'log10 of the scale Lambda in units of M_pl; the potential has its fourth power.',
          formula: '\\log_{10} \\Lambda_a,\\quad \\Lambda_a^4 = 8\\pi \\tau_a e^{-2\\pi\\tau_a} / V^2',
        },
        ({ logScales }) => logScales,
      ),
      field(
        {
          name: 'separation',
          description: 'Distance to the nearest other axion in log10 Lambda: zero for tied scales.',
          formula: '\\min_{b \\ne a} |\\log_{10} \\Lambda_a - \\log_{10} \\Lambda_b|',
        },
        ({ separations }) => separations,
        'number',
        'there is no other axion',
      ),
      field(
        {
          name: 'tied',
          description:
            'Another axion has nearly the same scale, within a factor of e in Lambda^4: mass and decay constant are then rough.',
          formula: '|\\ln \\Lambda_a^4 - \\ln \\Lambda_b^4| < 1',
        },
        ({ separations }) => separations.map((separation) => (separation < closeScales ? 1 : 0)),
        'truth',
      ),
      {
        kind: 'members',
        of: 'divisors',
        ...ofAxions({
          name: 'divisors',
          description: 'The divisors whose instantons give it its mass: all of the same scale.',
          formula: '\\{D_i : \\Lambda_i = \\Lambda_a\\}',
          source: SOURCES.axions,
        }),
        members: (candidate, scale) => memberLists(read(candidate, scale)?.divisors ?? []),
      },
    ],
  }
}

/** The axions of the four-form and their masses from instantons on prime toric divisors. */
export const axions: readonly RecordSet[] = [
  axionSet(
    'axions',
    'The axions, h11 of them, with masses from instantons on all prime toric divisors. Favourable polytopes only.',
    (candidate, scale) => candidate.axions(scale, 'all'),
  ),
  axionSet(
    'rigidAxions',
    'The axions that instantons on rigid prime toric divisors make massive; the others stay massless. Favourable polytopes only.',
    (candidate, scale) => candidate.axions(scale, 'rigid'),
  ),
]
