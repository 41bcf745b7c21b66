import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { CandidateRecord } from './candidate.ts'
import { Search } from './search.ts'

/** One of the best distinct candidates of a search so far; the outcome is the candidate's cached value. */
@Entity('find')
@Index(['searchId', 'rank'])
export class Find {
  @PrimaryColumn({ type: 'varchar' })
  searchId!: string

  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search>

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  /** 1 is the best, in the order of the scoring language. */
  @Column({ type: 'integer' })
  rank!: number

  @Column({ type: 'integer' })
  island!: number
}
