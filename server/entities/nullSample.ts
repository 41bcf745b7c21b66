import { Column, Entity, PrimaryColumn, Unique } from 'typeorm'
import type { NullSummary } from '../../shared/nullSamples.ts'

/** What a rule gives on candidates of a scope that nobody selected. */
@Entity('null_sample')
@Unique(['scopeHash', 'scoringHash'])
export class NullSample {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Column({ type: 'varchar' })
  scopeHash!: string

  @Column({ type: 'varchar' })
  scoringHash!: string

  @Column({ type: 'integer' })
  seed!: number

  @Column({ type: 'integer' })
  size!: number

  @Column({ type: 'boolean' })
  complete!: boolean

  /** The engine's state as JSON text, opaque here; null before the first chunk and when complete. */
  @Column({ type: 'text', nullable: true })
  state!: string | null

  /** Null before the first piece. */
  @Column({ type: 'simple-json', nullable: true })
  summary!: NullSummary | null

  /** Reason why it cannot be completed, if so. */
  @Column({ type: 'text', nullable: true })
  failure!: string | null
}
