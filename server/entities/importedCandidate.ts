import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { CandidateRecord } from './candidate.ts'

/** A candidate that a campaign imported, with where it was read. The first import of it counts. */
@Entity('imported_candidate')
export class ImportedCandidate {
  @PrimaryColumn({ type: 'varchar' })
  campaignId!: string

  @Index()
  @PrimaryColumn({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  @Column({ type: 'varchar' })
  name!: string

  /** Name of the file, or what the person called the pasted text. */
  @Column({ type: 'varchar' })
  source!: string

  /** Line of the source, counted from 1. */
  @Column({ type: 'integer' })
  line!: number

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
