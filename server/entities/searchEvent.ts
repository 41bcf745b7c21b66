import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm'
import type { SearchEventKind } from '../../shared/searchEvents.ts'
import { Account } from './account.ts'
import { Search } from './search.ts'

/** Something that happened to a search. Rows are only ever added; a trigger refuses changes. */
@Entity('search_event')
@Index(['searchId', 'id'])
export class SearchEvent {
  /** Ascending in the order in which things happened. */
  @PrimaryGeneratedColumn()
  id!: number

  @Column({ type: 'varchar' })
  searchId!: string

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search>

  @Column({ type: 'varchar' })
  kind!: SearchEventKind

  @Column({ type: 'varchar' })
  at!: string

  /** Who did it; null: the server by itself. */
  @Column({ type: 'varchar', nullable: true })
  accountId!: string | null

  @ManyToOne(() => Account, { nullable: true })
  @JoinColumn({ name: 'accountId' })
  account?: Relation<Account> | null

  /** Distinct evaluations that the search had committed then; null in rows made for searches of earlier versions. */
  @Column({ type: 'integer', nullable: true })
  evaluations!: number | null

  /** More about it in words, such as the message of a failure. */
  @Column({ type: 'text', nullable: true })
  note!: string | null
}
