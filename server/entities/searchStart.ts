import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Search } from './search.ts'

/** A candidate that a search begins from. Its heights are part of what the result depends on, so they are kept. */
@Entity('search_start')
export class SearchStart {
  @PrimaryColumn({ type: 'varchar' })
  searchId!: string

  /** From 1, in the order in which they were given. */
  @PrimaryColumn({ type: 'integer' })
  place!: number

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search>

  @Column({ type: 'varchar' })
  candidateKey!: string

  @Column({ type: 'varchar' })
  polytopeKey!: string

  @Column({ type: 'simple-json' })
  heights!: number[]
}
