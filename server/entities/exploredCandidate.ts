import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { ExploredSample } from './exploredSample.ts'

/** One candidate of an explored sample, in the order in which it was drawn. */
@Entity('explored_candidate')
export class ExploredCandidate {
  @PrimaryColumn({ type: 'varchar' })
  sampleId!: string

  /** From 0. */
  @PrimaryColumn({ type: 'integer' })
  place!: number

  @ManyToOne(() => ExploredSample, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'sampleId' })
  sample?: Relation<ExploredSample>

  @Column({ type: 'varchar' })
  candidateKey!: string

  @Column({ type: 'varchar' })
  polytopeKey!: string

  /** Integer heights as the engine encodes them; they may tie in facets. */
  @Column({ type: 'text' })
  heights!: string

  /** Of a search: the island, and the score under the search's rule; null for what has none. */
  @Column({ type: 'integer', nullable: true })
  island!: number | null

  @Column({ type: 'real', nullable: true })
  score!: number | null
}
