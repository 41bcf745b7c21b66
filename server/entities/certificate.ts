import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { CertificateReport } from '../../shared/certificates.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { CandidateRecord } from './candidate.ts'
import { TargetVersion } from './targetVersion.ts'

/**
 * What the independent road made of a candidate, never edited. One with a scoring belongs to the campaign whose target
 * it is, and no other campaign knows of it; one of the geometry alone may be read by everybody who may see the
 * candidate.
 */
@Entity('certificate')
@Index(['candidateKey', 'campaignId'])
export class CertificateRecord {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Column({ type: 'varchar' })
  candidateKey!: string

  @ManyToOne(() => CandidateRecord, { nullable: false })
  @JoinColumn({ name: 'candidateKey' })
  candidate?: Relation<CandidateRecord>

  /** Where it was asked for. */
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  /** null: geometry alone. */
  @Column({ type: 'varchar', nullable: true })
  targetVersionId!: string | null

  @ManyToOne(() => TargetVersion, { onDelete: 'CASCADE', nullable: true })
  @JoinColumn({ name: 'targetVersionId' })
  targetVersion?: Relation<TargetVersion> | null

  @Column({ type: 'varchar', nullable: true })
  scoringHash!: string | null

  @Column({ type: 'varchar' })
  engineVersion!: string

  @Column({ type: 'varchar' })
  certifierVersion!: string

  @Column({ type: 'boolean' })
  passed!: boolean

  @Column({ type: 'simple-json' })
  checks!: CertificateReport['checks']

  @Column({ type: 'simple-json' })
  notCertified!: CertificateReport['notCertified']

  /** The whole certificate as JSON text, with all compared numbers; kept out of ordinary reads. */
  @Column({ type: 'text', select: false })
  body!: string

  @Column({ type: 'integer' })
  milliseconds!: number

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string
}
