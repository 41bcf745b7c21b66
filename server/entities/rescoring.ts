import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { AssemblySettings } from '../../shared/assemblies.ts'
import type { RescoringState } from '../../shared/rescorings.ts'
import type { Entrant } from '../services/assemblies.ts'
import { Account } from './account.ts'
import { Campaign } from './campaign.ts'
import { TargetVersion } from './targetVersion.ts'

/** What is scored anew: a list, or the finds of searches, perhaps for a newer issue of a list. */
export type RescoringOrigin =
  { readonly shortlistId: string } | { readonly searchIds: readonly string[]; readonly reissueOf?: string }

/**
 * A request to score candidates by a target version and make a list of them. Its progress is the values that are
 * stored under the version's scoring hash, so that whichever process goes on knows what is left.
 */
@Entity('rescoring')
export class Rescoring {
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

  /** Of the list to come. */
  @Column({ type: 'varchar' })
  name!: string

  @Column({ type: 'simple-json' })
  origin!: RescoringOrigin

  @Column({ type: 'simple-json' })
  assembly!: AssemblySettings

  /** The candidates as they were when it was asked for, kept out of ordinary reads; searches may go on meanwhile. */
  @Column({ type: 'simple-json', select: false })
  entrants!: Entrant[]

  /** Number of entrants, and of finds among them with repetitions. */
  @Column({ type: 'integer' })
  total!: number

  @Column({ type: 'integer' })
  finds!: number

  @Index()
  @Column({ type: 'varchar' })
  state!: RescoringState

  /** Of this many candidates the computation itself went wrong. */
  @Column({ type: 'integer' })
  broken!: number

  @Column({ type: 'text', nullable: true })
  failure!: string | null

  /** The list that came of it. */
  @Column({ type: 'varchar', nullable: true })
  shortlistId!: string | null

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
