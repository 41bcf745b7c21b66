import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import { ExploredSample } from './exploredSample.ts'

/** An expression evaluated on a sample, from its first candidate on. */
@Entity('explored_column')
@Unique(['sampleId', 'expressionHash'])
export class ExploredColumn {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Column({ type: 'varchar' })
  sampleId!: string

  @ManyToOne(() => ExploredSample, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'sampleId' })
  sample?: Relation<ExploredSample>

  /** Scoring hash of the rule that reports the expression: expression, place, observables, engine. */
  @Column({ type: 'varchar' })
  expressionHash!: string

  /** Candidates that have a cell. */
  @Column({ type: 'integer' })
  evaluated!: number
}
