import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Search } from './search.ts'

/** The state of one island after its last committed segment: all that is needed to go on. */
@Entity('search_island')
export class SearchIsland {
  @PrimaryColumn({ type: 'varchar' })
  searchId!: string

  @PrimaryColumn({ type: 'integer' })
  number!: number

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search>

  /** Segments committed so far. */
  @Column({ type: 'integer' })
  segment!: number

  /** The engine's state as JSON text, opaque here; null before the first segment. */
  @Column({ type: 'text', nullable: true })
  state!: string | null

  /** Progress of this island as the engine reported it last, JSON text. */
  @Column({ type: 'text', nullable: true })
  progress!: string | null

  @Column({ type: 'boolean' })
  done!: boolean
}
