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
}
