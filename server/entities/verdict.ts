import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm'
import type { Reader, VerdictValue } from '../../shared/verdicts.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { CandidateRecord } from './candidate.ts'
import { CertificateRecord } from './certificate.ts'
import { TargetVersion } from './targetVersion.ts'

/** A person's word on a candidate for a target in a campaign. History is kept; the latest counts. */
@Entity('verdict')
@Index(['campaignId', 'candidateKey'])
export class Verdict {
  /** Counts up: the order of the history. */
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
  targetVersionId!: string

  @ManyToOne(() => TargetVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'targetVersionId' })
  targetVersion?: Relation<TargetVersion>

  @Column({ type: 'varchar' })
  value!: VerdictValue

  @Column({ type: 'text' })
  reason!: string

  /** Verified without a passing certificate for this scoring. */
  @Column({ type: 'boolean' })
  override!: boolean

  /** The passing certificate that "verified" rests on. */
  @Column({ type: 'varchar', nullable: true })
  certificateId!: string | null

  @ManyToOne(() => CertificateRecord, { nullable: true })
  @JoinColumn({ name: 'certificateId' })
  certificate?: Relation<CertificateRecord> | null

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string

  /** Whose "verified" it rests on, where two people were asked for; else null. */
  @Column({ type: 'simple-json', nullable: true })
  readers!: Reader[] | null

  /** The entry that this one takes back; all else is then what stood before. */
  @Column({ type: 'integer', nullable: true })
  undoesId!: number | null

  /** The entry that stands again by the undoing; null: none had been given. */
  @Column({ type: 'integer', nullable: true })
  restoresId!: number | null

  @ManyToOne(() => Verdict, { nullable: true, createForeignKeyConstraints: false })
  @JoinColumn({ name: 'restoresId' })
  restores?: Relation<Verdict> | null
}
