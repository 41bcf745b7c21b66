import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ShortlistProvenance } from '../../shared/shortlists.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { TargetVersion } from './targetVersion.ts'

/** A ranked, frozen list of candidates from searches of one target version. */
@Entity('shortlist')
export class Shortlist {
  @PrimaryColumn({ type: 'varchar' })
  id!: string

  @Index()
  @Column({ type: 'varchar' })
  campaignId!: string

  @ManyToOne(() => Campaign, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'campaignId' })
  campaign?: Relation<Campaign>

  @Column({ type: 'varchar' })
  targetVersionId!: string

  @ManyToOne(() => TargetVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn({ name: 'targetVersionId' })
  targetVersion?: Relation<TargetVersion>

  @Column({ type: 'varchar' })
  name!: string

  /** The searches it was drawn from; empty when it was made from imported candidates. */
  @Column({ type: 'simple-json' })
  searchIds!: string[]

  /** Report columns in the rule's order. */
  @Column({ type: 'simple-json' })
  columns!: string[]

  @Column({ type: 'varchar' })
  scoringHash!: string

  @Column({ type: 'varchar' })
  engineVersion!: string

  /** What it was made from, as it was then; null for lists made before it was kept. */
  @Column({ type: 'simple-json', nullable: true })
  provenance!: ShortlistProvenance | null

  @Column({ type: 'varchar' })
  authorId!: string

  @ManyToOne(() => Account, { nullable: false })
  @JoinColumn({ name: 'authorId' })
  author?: Relation<Account>

  @Column({ type: 'varchar' })
  createdAt!: string

  /** The list that it is a newer issue of; the places there are kept with the entries. */
  @Column({ type: 'varchar', nullable: true })
  reissueOfId!: string | null

  /** Counts along the chain of issues, from 1. */
  @Column({ type: 'integer', default: 1 })
  issue!: number
}
