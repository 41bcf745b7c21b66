import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { CandidateRecord } from './candidate.ts'

/** What a member of a campaign says about a candidate, as plain text. */
@Entity('comment')
@Index(['campaignId', 'candidateKey'])
export class Comment {
  /** Counts up: the order of what was said. */
  @PrimaryGeneratedColumn('increment', { type: 'integer' })
  id!: number

  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @Column({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  /** Empty once it has been removed. */
  @Column({ type: 'text' })
  text!: string

  @Column({ type: 'varchar' })
  createdAt!: string

  @Column({ type: 'varchar', nullable: true })
  editedAt!: string | null

  @Column({ type: 'varchar', nullable: true })
  removedAt!: string | null

  @Column({ type: 'varchar', nullable: true })
  removedById!: string | null

  @ManyToOne(() => Account, { nullable: true })
  @JoinColumn({ name: 'removedById' })
  removedBy?: Relation<Account> | null
}
