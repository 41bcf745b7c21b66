import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Search } from './search.ts'

/**
 * A row of an island's uniform sample of all its evaluations, with what is needed to build the candidate again. The
 * island's state has the same rows without heights.
 */
@Entity('search_sample')
export class SearchSample {
  @PrimaryColumn({ type: 'varchar' })
  searchId!: string

  @PrimaryColumn({ type: 'integer' })
  island!: number

  @PrimaryColumn({ type: 'integer' })
  place!: number

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search>

  @Column({ type: 'varchar' })
  candidateKey!: string

  @Column({ type: 'varchar' })
  polytopeKey!: string

  /** The engine's merit under the search's rule: kind and value, larger is better. */
  @Column({ type: 'integer' })
  kind!: number

  @Column({ type: 'real' })
  value!: number

  /** Integer heights as the engine encodes them; they may tie in facets. */
  @Column({ type: 'text' })
  heights!: string
}
