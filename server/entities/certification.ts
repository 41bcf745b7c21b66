import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { CertificationState } from '../../shared/certificates.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { TargetVersion } from './targetVersion.ts'

/** A request to certify candidates, worked off one by one; what was not done when a server ended is done by the next. */
@Entity('certification')
export class Certification {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
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

  @Index()
  @Column({ type: 'varchar' })
  state!: CertificationState

  /** The process that works on it, and a number that changes while it lives. */
  @Column({ type: 'varchar', nullable: true })
  leaseOwner!: string | null

  @Column({ type: 'integer', nullable: true })
  leaseBeat!: number | null

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string

  @Column({ type: 'varchar', nullable: true })
  finishedAt!: string | null
}
