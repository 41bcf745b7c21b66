import type { Scope } from './polytopes.ts'

/** A rule to begin from, for a hunt that people come back to. */
export interface StarterTarget {
  readonly id: string
  readonly name: string
  /** What it is for, in a sentence. */
  readonly purpose: string
  readonly text: string
  /** Polytopes on which it tells candidates apart: its previews are drawn from them until others are chosen. */
  readonly scope: Scope
}

const withH11 = (h11Min: number, h11Max: number): Scope => ({ kind: 'filter', filter: { h11Min, h11Max } })

/**
 * Starters of our own. Their windows are common practice, no source: they are set so that on the null some candidates
 * are feasible and some are not, and are meant to be changed. A test holds each against a null sample.
 */
export const starterTargets: readonly StarterTarget[] = [
  {
    id: 'axion-range',
    name: 'Long axion range',
    purpose:
      'Axions that range far in field space at a controlled size, as a bright primordial gravitational-wave signal needs.',
    text: `# Long axion range: the largest eigenvalue of the field-space metric, compared at equal volume.
at volume 1000
require favourable label "all classes are toric"
require min(d in divisors : d.volume) >= 1 label "no divisor below volume one"
let reach = log10(metric.divisor.top)
score reach
report smallest = min(d in divisors : d.volume), rigid = count(d in divisors : d.rigid)
`,
    scope: withH11(15, 30),
  },
  {
    id: 'intersection-pattern',
    name: 'Given intersection pattern',
    purpose:
      'Three divisors that meet in exactly one point, away from a rigid divisor that meets none of them; change the pattern to yours.',
    text: `# An intersection pattern: triples of divisors that meet in one point, with a rigid divisor apart from all three.
let pattern = count(t in triples where t.number == 1 :
  any(r in divisors where r.rigid : all(x in t.divisors : not meet(x, r))))
require pattern >= 3 label "the pattern occurs"
require max(d in divisors : d.cubic) <= 9 label "no cube above nine"
score pattern
report most = max(t in triples : t.number), cubes = max(d in divisors : d.cubic)
`,
    scope: withH11(12, 30),
  },
  {
    id: 'rigid-divisors',
    name: 'Many rigid divisors',
    purpose:
      'Many rigid divisors that hardly meet each other: instantons on them can make many axions massive one by one.',
    text: `# Many rigid divisors: those that meet at most two others of them count as a whole, the others a tenth.
let rigid = count(d in divisors : d.rigid)
let apart = count(d in divisors where d.rigid : count(e in d.neighbours : e.rigid) <= 2)
require rigid >= 5 label "five rigid divisors"
require apart >= 3 label "three of them apart"
score apart + 0.1 * rigid
report rigid, apart, delPezzo = count(d in divisors : d.delPezzo)
`,
    scope: withH11(15, 30),
  },
  {
    id: 'volume-hierarchy',
    name: 'Hierarchical divisor volumes',
    purpose:
      'One large divisor volume above several small ones, measured where the smallest divisor has volume one.',
    text: `# Hierarchical divisor volumes: the largest over the median, with at least two small cycles that are rigid.
at smallest divisor 1
let largest = max(d in divisors : d.volume)
let middle = quantile(0.5, d in divisors : d.volume)
require count(d in divisors where d.rigid : d.volume <= 3) >= 2 label "two small rigid cycles"
score log10(largest / middle)
report largest, middle, volume, swiss = swissCheese
`,
    scope: withH11(4, 12),
  },
  {
    id: 'fibration-window',
    name: 'Fibration in a volume window',
    purpose: 'K3 fibrations whose total volume lies in a window, with as few small curves as possible.',
    text: `# A K3 fibration, and a volume in a window where the smallest divisor has volume one.
at smallest divisor 1
let fibrations = count(f in k3Fibrations : true)
require fibrations >= 1 label "a K3 fibration"
require 5 <= volume <= 500 label "volume in the window"
score -log10(count(c in curves : c.volume <= 1) + 1)
report volume, fibrations, elliptic = any(g in genusOneFibrations : g.hasSection)
`,
    scope: withH11(3, 8),
  },
]
