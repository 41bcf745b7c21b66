import type { Role } from '../../shared/roles.ts'

/** Invented people at an invented address. */
export const demoTeam: readonly { readonly name: string; readonly email: string; readonly role: Role }[] = [
  { name: 'Maren Ostvik', email: 'maren@tessellary.example', role: 'lead' },
  { name: 'Teodor Valcari', email: 'teodor@tessellary.example', role: 'investigator' },
  { name: 'Ishani Brandreth', email: 'ishani@tessellary.example', role: 'reviewer' },
  { name: 'Luca Fenwarren', email: 'luca@tessellary.example', role: 'reader' },
]

/** Public, since it is printed and written here: that is why demo accounts are served on loopback only. */
export const demoPassword = 'unit triangles only'

export const demoCampaign = {
  name: 'Long axion ranges',
  description:
    'A cosmology group asked for geometries whose axions range far in field space, as a bright ' +
    'primordial gravitational-wave signal needs. We search for large eigenvalues of the field-space metric at equal volume, ' +
    'and for geometries with many K3 fibres to compare with.',
}

/**
 * Hit rates on the null, measured: 1.2 % of 2,000 candidates of the demo search's polytope for the first, 1.0 % of
 * 500 candidates with h11 = 4 for the second. A test keeps both between 0.1 % and 5 %.
 */
export const demoTargets: readonly { readonly name: string; readonly text: string }[] = [
  {
    name: 'Long axion range',
    text: `# The longest axion range at the reference point.
require favourable label "favourable"
score log10(metric.divisor.top)
report volume, smallest = min(d in divisors : d.volume)
hit log10(metric.divisor.top) >= -5.27
`,
  },
  {
    name: 'Range with K3 fibres',
    text: `# At equal volume: a long axion range on geometries with several K3 fibres.
# Meant for the polytopes with h11 = 4.
at volume 10
require favourable label "favourable"
require min(d in divisors : d.volume) >= 0.1 label "no small cycle"
let reach = log10(metric.divisor.top)
let k3 = count(d in divisors : d.k3)
score reach + 0.05 * k3
report reach, k3, smallest = min(d in divisors : d.volume)
hit k3 >= 2 and reach >= -2
`,
  },
]

/** One short search for real, well below a minute on two cores, and the shortlist that is made of it. */
export const demoSearch = {
  name: 'First run',
  polytopeName: 'w50-7-newton-2-2-3-3-7',
  method: 'annealing',
  budget: 600,
  seed: 11,
  islands: 2,
  keep: 100,
  surrogate: true,
} as const

export const demoShortlist = { name: 'First run, best 40', size: 40 } as const
