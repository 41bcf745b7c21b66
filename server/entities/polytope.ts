import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** A reflexive polytope, stored once under the key of its normal form. */
@Entity('polytope')
@Index(['h11', 'h21'])
export class PolytopeRecord {
  /** 32 hexadecimal digits: hash of the normal form under GL(4,Z). */
  @PrimaryColumn({ type: 'varchar' })
  key!: string

  /** Bundled name; for imports the name of the first import (each campaign keeps its own). */
  @Column({ type: 'varchar' })
  name!: string

  /** `bundled`: site-wide. `imported`: visible to the campaigns that imported it. */
  @Index()
  @Column({ type: 'varchar' })
  origin!: 'bundled' | 'imported'

  @Column({ type: 'integer' })
  h11!: number

  @Column({ type: 'integer' })
  h21!: number

  @Column({ type: 'integer' })
  points!: number

  @Column({ type: 'integer' })
  vertices!: number

  @Column({ type: 'integer' })
  facets!: number

  @Column({ type: 'integer' })
  latticePoints!: number

  @Column({ type: 'integer' })
  dualLatticePoints!: number

  @Column({ type: 'boolean' })
  favourable!: boolean

  @Column({ type: 'integer' })
  symmetryOrder!: number

  @Column({ type: 'simple-json', nullable: true })
  weights!: number[] | null

  @Column({ type: 'varchar', nullable: true })
  side!: 'fan' | 'newton' | null

  /** Vertices in normal-form coordinates. */
  @Column({ type: 'simple-json' })
  coordinates!: number[][]

  @Column({ type: 'integer', nullable: true })
  edges!: number | null

  @Column({ type: 'integer', nullable: true })
  faces!: number | null

  /** Lattice points interior to an edge, to a 2-face, and to a facet. */
  @Column({ type: 'integer', nullable: true })
  edgePoints!: number | null

  @Column({ type: 'integer', nullable: true })
  facePoints!: number | null

  @Column({ type: 'integer', nullable: true })
  facetPoints!: number | null

  @Column({ type: 'integer', nullable: true })
  normalisedVolume!: number | null

  @Column({ type: 'integer', nullable: true })
  dualNormalisedVolume!: number | null

  /** Reflexive sections through the origin, of dimension two and three, and pairs of one inside the other. */
  @Column({ type: 'integer', nullable: true })
  planarSections!: number | null

  @Column({ type: 'integer', nullable: true })
  solidSections!: number | null

  @Column({ type: 'integer', nullable: true })
  nestedSections!: number | null

  @Column({ type: 'integer', nullable: true })
  rigidDivisors!: number | null

  @Column({ type: 'integer', nullable: true })
  splitDivisors!: number | null

  /** Components of split divisors, all of them rigid, and the rank of all rigid classes together. */
  @Column({ type: 'integer', nullable: true })
  rigidComponents!: number | null

  @Column({ type: 'integer', nullable: true })
  rigidRank!: number | null

  /** Types of the two-dimensional sections, each once, as ' 1 5 10 '. */
  @Column({ type: 'varchar', nullable: true })
  fibreTypes!: string | null

  /** log10 of an upper bound on the number of 2-face classes. */
  @Column({ type: 'real', nullable: true })
  classBound!: number | null

  /** Version of the numbers above; null or an older one: they are still to be computed. */
  @Index()
  @Column({ type: 'integer', nullable: true })
  summaryVersion!: number | null

  /**
   * Number of 2-face classes, before and modulo symmetry, where they have been counted; to the nearest number beyond
   * 2^53, where `classDigits` has the first exactly.
   */
  @Column({ type: 'integer', nullable: true })
  classes!: number | null

  @Column({ type: 'integer', nullable: true })
  classOrbits!: number | null

  @Column({ type: 'varchar', nullable: true })
  classDigits!: string | null

  /** How many classes the longest count had seen when it was stopped; null when none was. */
  @Column({ type: 'integer', nullable: true })
  classesSeen!: number | null
}
