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

/** Hit rates on the null were measured; see the test beside them. */
export const demoTargets: readonly { readonly name: string; readonly text: string }[] = [
  {
    name: 'Long axion range',
    text: `# The longest axion range at the reference point.
require favourable                label "favourable"
score log10(metric.divisor.top)
report volume = volume, smallest = min(d in divisors : d.volume)
hit log10(metric.divisor.top) >= -5.9
`,
  },
  {
    name: 'Small volume, no small cycle',
    text: `# All prime divisors at least of a given size, and the volume as small as possible.
require min(d in divisors : d.volume) >= 0.5    label "no small cycle"
score -log10(volume)
report volume, k3 = count(d in divisors : d.k3)
`,
  },
]

/** One short search for real: well below a minute on two cores. */
export const demoSearch = {
  name: 'First run',
  polytopeName: 'w50-7-newton-2-2-3-3-7',
  method: 'annealing',
  budget: 2_000,
  seed: 11,
  islands: 2,
  keep: 100,
} as const
