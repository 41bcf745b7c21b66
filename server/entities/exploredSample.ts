import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Search } from './search.ts'

/**
 * Candidates whose observables are looked at: drawn from a scope by the null's law, or the uniform sample of a
 * search's evaluations as it stood at one time. Shared by all who ask for the same.
 */
@Entity('explored_sample')
export class ExploredSample {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  /** What the sample is of: law, engine version, scope and seed; or search and evaluations. */
  @Column({ type: 'varchar', unique: true })
  address!: string

  @Column({ type: 'varchar', nullable: true })
  searchId!: string | null

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search> | null

  /** The engine's state as JSON text, to draw on; null before the first candidate and for searches. */
  @Column({ type: 'text', nullable: true })
  state!: string | null

  /** Candidates it holds; a larger sample of the same address begins with them. */
  @Column({ type: 'integer' })
  drawn!: number

  /** Nothing is left to draw. */
  @Column({ type: 'boolean' })
  ended!: boolean

  /** Milliseconds since 1970; the samples used longest ago make room. */
  @Column({ type: 'integer' })
  usedAt!: number
}
