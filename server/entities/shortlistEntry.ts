import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { OutcomeView } from '../../shared/outcomes.ts'
import { CandidateRecord } from './candidate.ts'
import { Search } from './search.ts'
import { Shortlist } from './shortlist.ts'

/** One place of a shortlist, frozen with the outcome it had when the list was made. */
@Entity('shortlist_entry')
export class ShortlistEntry {
  @PrimaryColumn({ type: 'varchar' })
  shortlistId!: string

  /** From 1. */
  @PrimaryColumn({ type: 'integer' })
  rank!: number

  @ManyToOne(() => Shortlist, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'shortlistId' })
  shortlist?: Relation<Shortlist>

  @Index()
  @Column({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  /** The search that found it; null for an imported candidate. */
  @Column({ type: 'varchar', nullable: true })
  searchId!: string | null

  @ManyToOne(() => Search, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'searchId' })
  search?: Relation<Search> | null

  @Column({ type: 'simple-json' })
  outcome!: OutcomeView

  /** Number of its Pareto front; null where the list is ranked by score. */
  @Column({ type: 'integer', nullable: true })
  front!: number | null

  /** Its place in the list that was scored anew or issued anew, and what it was worth there. */
  @Column({ type: 'integer', nullable: true })
  previousRank!: number | null

  @Column({ type: 'simple-json', nullable: true })
  previousOutcome!: OutcomeView | null
}
